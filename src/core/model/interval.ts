/** Closed interval [low, high] in the unit its field name says. */
export type Interval = readonly [number, number];

/** Half-width of a 95 % interval of a normal quantity, in standard deviations. What people are shown as ± is this many. */
export const STANDARD_DEVIATIONS_95 = 1.96;
