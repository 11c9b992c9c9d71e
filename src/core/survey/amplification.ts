import type { Interval } from '../model/interval.ts';
import type { AmplificationKind } from '../model/source.ts';

/**
 * Magnification of a force: displacement over static displacement, D = 1/sqrt((1-r²)² + (2 zeta r)²).
 * Infinite at r = 1 without damping. (Thomson & Dahleh, Theory of Vibration, 5th ed., eq. 3.1-7.)
 * @param ratio forcing frequency / natural frequency, >= 0
 */
export function magnification(ratio: number, dampingRatio: number): number {
  return 1 / Math.hypot(1 - ratio ** 2, 2 * dampingRatio * ratio);
}

/** Transmissibility (force through, or motion of the base): T = sqrt(1 + (2 zeta r)²) D. (Thomson & Dahleh, eq. 3.5-8.) */
export function transmissibility(ratio: number, dampingRatio: number): number {
  return Math.hypot(1, 2 * dampingRatio * ratio) * magnification(ratio, dampingRatio);
}

/** Rotating unbalance: M X / (m e) = r² D. (Thomson & Dahleh, eq. 3.2-4.) */
export function unbalanceResponse(ratio: number, dampingRatio: number): number {
  return ratio ** 2 * magnification(ratio, dampingRatio);
}

const RESPONSE: Readonly<Record<AmplificationKind, (ratio: number, dampingRatio: number) => number>> = {
  force: magnification,
  base: transmissibility,
  unbalance: unbalanceResponse,
};

/** Ratio at which the steady response peaks; infinite where it rises for ever (unbalance, damping ratio above 0.707). */
export function peakRatio(kind: AmplificationKind, dampingRatio: number): number {
  const z2 = dampingRatio ** 2;
  switch (kind) {
    case 'force':
      return Math.sqrt(Math.max(0, 1 - 2 * z2));
    case 'unbalance':
      return z2 < 0.5 ? 1 / Math.sqrt(1 - 2 * z2) : Infinity;
    case 'base':
      // (sqrt(1 + 8 z²) - 1) / (4 z²) without the cancellation at light damping
      return Math.sqrt(2 / (Math.sqrt(1 + 8 * z2) + 1));
  }
}

/**
 * Share of the steady response that can build up from rest within so many cycles of the forcing, 0..1.
 * Envelope |1 - exp(-zeta wn t + i (wd - w) t)| of the transient plus steady motion at the end, at most 1: it rises until the beat has
 * turned by a quarter and is above 1 from there on. Beating above the steady value is left out, as is usual (at resonance this is the
 * 1 - exp(-2 pi zeta N) of CCIP-016). Misleads far from resonance, where a few cycles are no steady state at all (there it gives 1).
 */
export function buildUpShare(ratio: number, dampingRatio: number, cycleCount: number): number {
  if (ratio <= 0) return 1;
  const angle = (2 * Math.PI * cycleCount) / ratio;
  const turn = Math.abs(Math.sqrt(Math.max(0, 1 - dampingRatio ** 2)) - ratio) * angle;
  if (turn >= Math.PI / 2) return 1;
  const decay = Math.exp(-dampingRatio * angle);
  return Math.min(1, Math.hypot(1 - decay, 2 * Math.sqrt(decay) * Math.sin(turn / 2)));
}

/** Response of its kind, limited by the cycles there are; without a count, the steady response. */
export function amplification(
  kind: AmplificationKind,
  ratio: number,
  dampingRatio: number,
  cycleCount?: number,
): number {
  // At resonance without damping the steady value is infinite and the share 0: n cycles give pi n.
  if (dampingRatio === 0 && ratio === 1 && cycleCount !== undefined) return Math.PI * cycleCount;
  const steady = RESPONSE[kind](ratio, dampingRatio);
  return cycleCount === undefined ? steady : steady * buildUpShare(ratio, dampingRatio, cycleCount);
}

/** Ratios looked at between the ends when the build-up is limited: the peak then has no closed form. */
const LIMITED_RATIO_STEPS = 24;

/**
 * Range of the amplification over intervals of ratio and damping.
 * In the ratio each response rises to one peak and falls, in the damping ratio it is monotone at every ratio; so the ends, and the
 * peak where it lies inside, bound it.
 * @param dampingRatio interval; its low end 0 with a ratio interval over 1 gives an infinite upper end, unless cycles limit it
 */
export function amplificationInterval(
  kind: AmplificationKind,
  ratio: Interval,
  dampingRatio: Interval,
  cycleCount?: number,
): Interval {
  let low = Infinity;
  let high = 0;
  const hold = (value: number): void => {
    low = Math.min(low, value);
    high = Math.max(high, value);
  };
  amplificationsAt(kind, ratio, dampingRatio[0], cycleCount, hold);
  if (dampingRatio[1] !== dampingRatio[0]) amplificationsAt(kind, ratio, dampingRatio[1], cycleCount, hold);
  return [low, high];
}

/** Every amplification that can be the least or the largest over a ratio interval. No lists: this is the innermost loop of a judgement. */
function amplificationsAt(
  kind: AmplificationKind,
  [from, to]: Interval,
  dampingRatio: number,
  cycleCount: number | undefined,
  hold: (value: number) => void,
): void {
  const at = (ratio: number): void => hold(amplification(kind, ratio, dampingRatio, cycleCount));
  const peak = peakRatio(kind, dampingRatio);
  if (1 > from && 1 < to) at(1);
  if (peak > from && peak < to) at(peak);
  const steps = cycleCount === undefined || from === to ? 1 : LIMITED_RATIO_STEPS;
  for (let index = 0; index <= steps; index++) at(from + (index * (to - from)) / steps);
}

/** Halvings of the damping ratio's range: 1e-9 of it is left. */
const BISECTION_STEPS = 30;

/**
 * Damping ratio that holds the largest amplification over a ratio interval to a wanted value; undefined when no damping does
 * (base motion and unbalance far above resonance never fall below their limit). Bisection; the response falls with damping.
 */
export function dampingForAmplification(
  kind: AmplificationKind,
  ratio: Interval,
  wanted: number,
  cycleCount?: number,
): number | undefined {
  const largest = (damping: number): number =>
    amplificationInterval(kind, ratio, [damping, damping], cycleCount)[1];
  if (!(largest(1) <= wanted)) return undefined;
  let low = 0;
  let high = 1;
  for (let step = 0; step < BISECTION_STEPS; step++) {
    const middle = (low + high) / 2;
    if (largest(middle) <= wanted) high = middle;
    else low = middle;
  }
  return high;
}
