/** Lists that stand beside a detail on a laptop. */
export type ListName = 'readings' | 'places' | 'sources';
