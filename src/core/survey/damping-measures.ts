/** Log decrement from the damping ratio: 2 pi z / sqrt(1 - z²) (Thomson & Dahleh, 5th ed., eq. 2.7-4). */
export const logDecrement = (dampingRatio: number): number =>
  (2 * Math.PI * dampingRatio) / Math.sqrt(1 - Math.min(dampingRatio, 0.999999) ** 2);

/** Cycles until the amplitude of a free decay has fallen to a share of its start. */
export const cyclesToShare = (dampingRatio: number, share: number): number =>
  -Math.log(share) / logDecrement(dampingRatio);
