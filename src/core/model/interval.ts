/** Closed interval [low, high] in the unit its field name says. */
export type Interval = readonly [number, number];
