import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { failure, success } from '../../model/outcome.ts';
import type { Outcome } from '../../model/outcome.ts';
import { fitCoastdown } from './fit-coastdown.ts';
import type { CoastdownFit, CoastdownPoint, PassSamples } from './fit-coastdown.ts';
import { TRACK_WINDOWS_S, trackLine } from './line-track.ts';
import type { LineTrack } from './line-track.ts';
import { guessFromWholePass } from './pass-spectrum.ts';
import type { PassGuess } from './pass-spectrum.ts';
import { robustPolynomial } from './polynomial-fit.ts';
import { refineSweep } from './refine-track.ts';
import { speedAt, speedRateAt } from './sweep-response.ts';
import type { Sweep } from './sweep-response.ts';

export interface Pass {
  readonly fit: CoastdownFit;
  readonly samples: PassSamples;
  readonly guess: PassGuess;
  /** Of the sensor alone, m²/s⁴. */
  readonly noiseVariance: number;
}

/** Highest frequency a line is followed to, as a share of the rate. */
const TRACKED_SHARE = 0.48;
/** A rising line this much clearer than a falling one (mean ln of power over floor) is a folded sweep or a run-up. */
const RISING_MARGIN = 0.25;
/** Ways to lay a first sweep through the track. Above the mode the line is not hidden by the mode ringing on. */
const TRACK_STARTS = [
  { windowS: TRACK_WINDOWS_S[0], aboveShare: 1.03, order: 2 },
  { windowS: TRACK_WINDOWS_S[1], aboveShare: 1.03, order: 2 },
  { windowS: TRACK_WINDOWS_S[0], aboveShare: 0, order: 3 },
  { windowS: TRACK_WINDOWS_S[1], aboveShare: 0, order: 2 },
] as const;
/** Two starts that end within this ratio of residual variance have found the same answer. */
const CONFIRMED = 1.002;
/** Clarity below which a point of the track counts for nothing. */
const CLEAR_POINT = 2;
/** Share of the record kept at each try to get past a folded start, and the least that is looked at. */
const TAIL_SHARE = 0.8;
const LEAST_TAIL = 0.3;
/** A falling line is there when so many points of its track are clear and it falls by this ratio. */
const LEAST_CLEAR_SHARE = 0.15;
const LEAST_FALL_RATIO = 1.15;
/** Scatter of the tracked frequency, Hz, beyond which a point is an outlier. */
const TRACK_SCATTER_HZ = 0.4;
/** Fitting goes down through the mode from above: ends of the windows, speed over natural frequency. */
const UPPER_END = 1.08;
const UPPER_ENDS = [1.02, 0.95];
const LOWER_ENDS = [0.85, 0.7];
const WIDE_WINDOW = [0.5, 2] as const;
/** What a pass must cover to be answered (study, section 12). */
export const COVERED_WINDOW = [0.65, 1.4] as const;
const DAMPING_FACTORS = [1, 0.5, 2];
const MOST_ORDER = 5;
/** A speed polynomial of one order more must lower the description length by this. */
const ORDER_GAIN = 6;

/**
 * Finds the line, the mode it passes and the sweep, and fits them jointly.
 * @param part share of the whole record that `conditioned` is (used when the start was cut away)
 */
export function findPass(conditioned: ConditionedSignal, part = 1): Outcome<Pass> {
  const { grid, facts } = conditioned;
  const { durationS } = facts;
  const highestHz = TRACKED_SHARE * facts.rateHz;
  const falling = trackLine(grid, highestHz, 'falling');
  const rising = trackLine(grid, highestHz, 'rising');
  if (!falling || !rising) return failure('too-short', { durationS });
  if (rising.score > falling.score + RISING_MARGIN) return afterFold(conditioned, part);
  const guess = guessFromWholePass(grid, [1, highestHz]);
  if (!guess) return failure('no-pass', { durationS });
  const nothing = withoutPass(falling, guess, durationS);
  const start = bestStart(conditioned, falling, guess);
  if (!start || !isRunDown(start, facts.rateHz)) return nothing;
  return fitted(conditioned, start, guess) ?? nothing;
}

/**
 * A sweep that starts above half the rate first appears to rise, then falls as a true one: what comes after the turn is
 * tried, and only what never falls is refused.
 */
function afterFold(conditioned: ConditionedSignal, part: number): Outcome<Pass> {
  const { facts } = conditioned;
  const rest = part * TAIL_SHARE;
  if (rest > LEAST_TAIL) {
    const pass = findPass(tailOf(conditioned, TAIL_SHARE), rest);
    if (pass.ok) return pass;
  }
  return failure('folded-sweep', { rateHz: facts.rateHz, highestHz: facts.rateHz / 2 });
}

function tailOf(conditioned: ConditionedSignal, share: number): ConditionedSignal {
  const { grid, timeS } = conditioned;
  const from = Math.floor((1 - share) * grid.present.length);
  const startS = grid.startS + from * grid.periodS;
  const first = Math.max(
    0,
    timeS.findIndex((t) => t >= startS),
  );
  return {
    ...conditioned,
    timeS: timeS.slice(first),
    accelerationMps2: conditioned.accelerationMps2.map((axis) => axis.slice(first)),
    grid: {
      ...grid,
      startS,
      present: grid.present.slice(from),
      accelerationMps2: grid.accelerationMps2.map((axis) => axis.slice(from)),
    },
  };
}

/** No falling line at all, or one that stops short of the mode. */
function withoutPass(track: LineTrack, guess: PassGuess, durationS: number): Outcome<never> {
  const clear = [...track.frequencyHz.keys()].filter((k) => (track.clarity[k] as number) > CLEAR_POINT);
  const some = Math.ceil(clear.length / 10);
  const middleOf = (indexes: readonly number[]): number =>
    track.frequencyHz[indexes[indexes.length >> 1] ?? 0] as number;
  const startHz = middleOf(clear.slice(0, some));
  const endHz = middleOf(clear.slice(-some));
  if (clear.length < LEAST_CLEAR_SHARE * track.timeS.length || startHz < LEAST_FALL_RATIO * endHz)
    return failure('no-pass', { durationS });
  return failure('pass-incomplete', { startHz, endHz, frequencyHz: guess.frequencyHz });
}

/** Falls all the way, from nowhere a machine could not be. */
const isRunDown = (sweep: Sweep, rateHz: number): boolean =>
  [-1, -0.5, 0, 0.5, 1].every((u) => {
    const at = sweep.centreS + u * sweep.halfS;
    return speedAt(sweep, at) > 0 && speedAt(sweep, at) < 2 * rateHz && speedRateAt(sweep, at) < 0;
  });

/** A sweep fitted above the mode. */
interface UpperFit {
  readonly sweep: Sweep;
  readonly variance: number;
}

/** Sweeps fitted above the mode from several tracks; two that agree are believed. */
function bestStart(conditioned: ConditionedSignal, falling: LineTrack, guess: PassGuess): Sweep | undefined {
  const { grid, facts, timeS } = conditioned;
  let best: UpperFit | undefined;
  for (const { windowS, aboveShare, order } of TRACK_STARTS) {
    const track =
      windowS === TRACK_WINDOWS_S[0]
        ? falling
        : trackLine(grid, TRACKED_SHARE * facts.rateHz, 'falling', windowS);
    if (!track) continue;
    const rough = trackPolynomial(track, aboveShare * guess.frequencyHz, order);
    const window = windowOf(timeS, rough, guess.frequencyHz, [UPPER_END, WIDE_WINDOW[1]]);
    if (!window) continue;
    const upper = upperSweep(conditioned, rebased(rough, timeS, window, 2), guess, window);
    const ratio = best ? upper.variance / best.variance : Infinity;
    if (ratio < 1) best = upper;
    best ??= upper;
    if (Math.abs(Math.log(ratio)) < Math.log(CONFIRMED)) break;
  }
  return best?.sweep;
}

/** Variance a sample of the sensor's own noise has, mean over the axes, m²/s⁴. */
function noiseVariance(conditioned: ConditionedSignal): number {
  const { noiseMps2PerRootHz, rateHz, stepMps2 } = conditioned.facts;
  const each = noiseMps2PerRootHz.map((d, a) =>
    Math.max((d * d * rateHz) / 2, (stepMps2[a] ?? 0) ** 2 / 12, 1e-12),
  );
  return each.reduce((sum, v) => sum + v, 0) / each.length;
}

/** Bent line through the clear points of a track. */
function trackPolynomial(track: LineTrack, aboveHz: number, order: number): Sweep {
  const first = track.timeS[0] as number;
  const last = track.timeS[track.timeS.length - 1] as number;
  const centreS = (first + last) / 2;
  const halfS = (last - first) / 2;
  const u = track.timeS.map((t) => (t - centreS) / halfS);
  const weights = track.clarity.map((c, k) =>
    (track.frequencyHz[k] as number) > aboveHz ? Math.max(0, c - (aboveHz > 0 ? 0 : CLEAR_POINT)) : 0,
  );
  return {
    centreS,
    halfS,
    speedHz: robustPolynomial(u, track.frequencyHz, weights, order, TRACK_SCATTER_HZ),
  };
}

function fitted(conditioned: ConditionedSignal, sweep: Sweep, guess: PassGuess): Outcome<Pass> | undefined {
  const first = lowered(conditioned, sweep, guess);
  const wide = first && windowOf(conditioned.timeS, first.sweep, first.frequencyHz, WIDE_WINDOW);
  if (!wide) return undefined;
  const fit = bestOrder(conditioned, first, wide);
  return success({ fit, samples: cut(conditioned, wide), guess, noiseVariance: noiseVariance(conditioned) });
}

/** Sweep above the mode, where the response follows the machine steadily whatever the sweep rate. */
function upperSweep(
  conditioned: ConditionedSignal,
  sweep: Sweep,
  guess: PassGuess,
  window: readonly [number, number],
): UpperFit {
  const samples = cut(conditioned, window);
  const along = samples.timeS.map((_, k) =>
    samples.axes.reduce((sum, axis, a) => sum + (axis[k] as number) * (guess.direction[a] as number), 0),
  );
  const { frequencyHz, dampingRatio } = guess;
  const refined = refineSweep(samples.timeS, along, sweep, frequencyHz, dampingRatio);
  const fit = fitCoastdown(samples, { frequencyHz, dampingRatio, sweep: refined }, { isModeHeld: true });
  return { sweep: fit.sweep, variance: fit.residualVariance };
}

/** Goes down through the mode step by step, so that the phase is never lost. */
function lowered(conditioned: ConditionedSignal, sweep: Sweep, guess: PassGuess): CoastdownFit | undefined {
  let first: CoastdownFit | undefined;
  for (const factor of DAMPING_FACTORS) {
    const fit = through(
      conditioned,
      { ...guess, dampingRatio: guess.dampingRatio * factor, sweep },
      UPPER_ENDS,
    );
    if (fit && (!first || fit.residualVariance < first.residualVariance)) first = fit;
  }
  return first && (through(conditioned, first, LOWER_ENDS) ?? first);
}

function through(
  conditioned: ConditionedSignal,
  start: CoastdownPoint,
  ends: readonly number[],
): CoastdownFit | undefined {
  let at = start;
  let fit: CoastdownFit | undefined;
  for (const end of ends) {
    const window = windowOf(conditioned.timeS, at.sweep, at.frequencyHz, [end, WIDE_WINDOW[1]]);
    if (!window) break;
    const sweep = rebased(at.sweep, conditioned.timeS, window, 2);
    const point = { frequencyHz: at.frequencyHz, dampingRatio: at.dampingRatio, sweep };
    fit = fitCoastdown(cut(conditioned, window), point, { isModeHeld: end > 1, mostSteps: 8 });
    at = fit;
  }
  return fit;
}

/** Indexes [from, to) of the samples while the machine is within the window, around the passage. */
function windowOf(
  timeS: Float64Array,
  sweep: Sweep,
  frequencyHz: number,
  window: readonly [number, number],
): readonly [number, number] | undefined {
  const middle = Math.sqrt(window[0] * Math.min(window[1], 1.3)) * frequencyHz;
  let crossing = -1;
  for (let k = 0; k < timeS.length && crossing < 0; k++)
    if (speedAt(sweep, timeS[k] as number) <= middle) crossing = k;
  if (crossing <= 0) return undefined;
  let from = crossing;
  while (from > 0 && inside(timeS[from - 1] as number)) from--;
  let to = crossing;
  while (to < timeS.length && inside(timeS[to] as number)) to++;
  return to - from > 64 ? [from, to] : undefined;

  function inside(t: number): boolean {
    const ratio = speedAt(sweep, t) / frequencyHz;
    return ratio > window[0] && ratio < window[1];
  }
}

/** The same speeds as a polynomial about the middle of a window. */
function rebased(sweep: Sweep, timeS: Float64Array, window: readonly [number, number], order: number): Sweep {
  const first = timeS[window[0]] as number;
  const last = timeS[window[1] - 1] as number;
  const centreS = (first + last) / 2;
  const halfS = (last - first) / 2;
  const u = Float64Array.from({ length: 41 }, (_, i) => (i - 20) / 20);
  const values = u.map((x) => speedAt(sweep, centreS + x * halfS));
  return {
    centreS,
    halfS,
    speedHz: robustPolynomial(
      u,
      values,
      u.map(() => 1),
      order,
      1e9,
    ),
  };
}

function cut(conditioned: ConditionedSignal, window: readonly [number, number]): PassSamples {
  return {
    timeS: conditioned.timeS.slice(...window),
    axes: conditioned.accelerationMps2.map((axis) => axis.slice(...window)),
  };
}

/** Wider window, order of the speed polynomial raised while the description length falls (Schwarz 1978). */
function bestOrder(
  conditioned: ConditionedSignal,
  first: CoastdownFit,
  window: readonly [number, number],
): CoastdownFit {
  const samples = cut(conditioned, window);
  let best: CoastdownFit | undefined;
  for (let order = 2; order <= MOST_ORDER; order++) {
    const from = best ?? first;
    const sweep = rebased(from.sweep, conditioned.timeS, window, order);
    const fit = fitCoastdown(samples, {
      frequencyHz: from.frequencyHz,
      dampingRatio: from.dampingRatio,
      sweep,
    });
    if (best) {
      const gain =
        fit.sampleCount * Math.log(best.sumOfSquares / fit.sumOfSquares) - Math.log(fit.sampleCount);
      if (gain < ORDER_GAIN) break;
    }
    best = fit;
  }
  return best as CoastdownFit;
}
