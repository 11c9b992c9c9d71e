import type { Interval } from '../model/interval.ts';
import type { AmplificationKind } from '../model/source.ts';
import type { Thresholds } from '../model/thresholds.ts';

/** Ratios that count as coincident, and the ratios beyond which a pair is apart, for one mode and kind of forcing. */
export interface Zones {
  readonly coincident: Interval;
  /** Apart at or below the first, at or above the second. */
  readonly apart: Interval;
}

/** Largest damping ratio at which the displacement response has a lower half-power point: sin(22.5 degrees). */
const LARGEST_HALF_POWER_DAMPING = Math.sin(Math.PI / 8);

/** A forcing on the edge of a half-power band is inside it, rounding or not. */
const EDGE_MARGIN_RATIO = 1e-9;

/**
 * Half-power edges of the velocity response, where the power taken in falls to a half: sqrt(1 + z²) -+ z, exact for every damping
 * (reference: mobility has f2 - f1 = 2 z fn and f1 f2 = fn²).
 */
export const velocityHalfPower = (dampingRatio: number): Interval => [
  Math.hypot(1, dampingRatio) - dampingRatio,
  Math.hypot(1, dampingRatio) + dampingRatio,
];

/** Half-power edges of the displacement response; the lower one is 0 where even a slow force lies within half power of the peak. */
export function displacementHalfPower(dampingRatio: number): Interval {
  const middle = 1 - 2 * dampingRatio ** 2;
  const half = 2 * dampingRatio * Math.sqrt(Math.max(0, 1 - dampingRatio ** 2));
  const lower = dampingRatio >= LARGEST_HALF_POWER_DAMPING ? 0 : Math.sqrt(Math.max(0, middle - half));
  return [lower, Math.sqrt(Math.max(0, middle + half))];
}

/** Half-power edges of the response that belongs to the kind of forcing; unbalance mirrors displacement (r -> 1/r). */
function halfPowerOf(kind: AmplificationKind, dampingRatio: number): Interval {
  const [low, high] = displacementHalfPower(dampingRatio);
  return kind === 'unbalance' ? [1 / high, low > 0 ? 1 / low : Infinity] : [low, high];
}

/**
 * @param dampingRatio the upper end of what the damping may be: more damping widens the band, never the other way
 */
export function zonesFor(kind: AmplificationKind, dampingRatio: number, thresholds: Thresholds): Zones {
  const velocity = velocityHalfPower(dampingRatio);
  const response = halfPowerOf(kind, dampingRatio);
  return {
    coincident: [
      Math.min(1 - thresholds.coincidentRatio, velocity[0]),
      Math.max(1 + thresholds.coincidentRatio, velocity[1]),
    ],
    apart: [
      Math.min(thresholds.apartBelowRatio, Math.min(velocity[0], response[0]) * (1 - EDGE_MARGIN_RATIO)),
      Math.max(thresholds.apartAboveRatio, Math.max(velocity[1], response[1]) * (1 + EDGE_MARGIN_RATIO)),
    ],
  };
}
