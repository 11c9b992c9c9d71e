import type { AnalysisSettings, CoastdownFacts, Mode } from '../../model/analysis.ts';
import type { Doubt, DoubtCode } from '../../model/doubt.ts';
import { failure, success } from '../../model/outcome.ts';
import type { Outcome } from '../../model/outcome.ts';
import type { AnalysisPictures } from '../../model/pictures.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { principalDirection } from '../../signal/linear-algebra.ts';
import type { ProcedureAnswer } from '../procedure-answer.ts';
import { COVERED_WINDOW, findPass } from './find-pass.ts';
import type { Pass } from './find-pass.ts';
import { speedAt, speedRateAt, sweepPhase } from './sweep-response.ts';

/** Shorter records hold no run-down, s. */
const SHORTEST_COASTDOWN_S = 5;
/** Standard deviations are widened by this: what the speed polynomial leaves out (generated records, coverage 95 %). */
const WIDENING = 1.1;
/** The response must take at least this share of the variance in the window off, or this log-likelihood. */
const LEAST_GAIN = 60;
/** Residual over the sensor's noise (variance) above which the fit is said to be poor, and above which it is no answer. */
const POOR_RESIDUAL = 2;
const LEAST_EXPLAINED_SHARE = 0.5;
/** Sweep severity above which the response rings after the passage; it is fitted, but little is left of a steady peak. */
const FAST_SEVERITY = 3;
/** Largest relative standard deviation of a damping that is still an answer. */
const LARGEST_DAMPING_SPREAD = 0.5;
/** Length of the blocks whose amplitude is drawn, s. */
const PICTURE_BLOCK_S = 0.4;

/**
 * Coast-down: a machine slowing down passes a resonance; response and sweep are fitted jointly in the time domain.
 * Refuses what does not cover 0.65 to 1.4 of the natural frequency (`pass-incomplete`), a line that rises because it is
 * folded at half the rate (`folded-sweep`), and records without a falling line that explains the motion (`no-pass`).
 * Misleads when two modes lie within the half-power width of each other: one is fitted.
 */
export function coastdownProcedure(
  conditioned: ConditionedSignal,
  _settings: AnalysisSettings,
): Outcome<ProcedureAnswer> {
  const { durationS } = conditioned.facts;
  if (durationS < SHORTEST_COASTDOWN_S)
    return failure('too-short', { durationS, neededS: SHORTEST_COASTDOWN_S });
  const found = findPass(conditioned);
  if (!found.ok) return found;
  const pass = found.value;
  const refusal = refusalOf(pass, durationS);
  if (refusal) return refusal;
  const coastdown = factsOf(pass, conditioned);
  const mode = modeOf(conditioned, pass, coastdown);
  return success({
    modes: [mode],
    tones: [],
    broadPeaks: [],
    tapTimesS: [],
    doubts: recordDoubts(coastdown),
    ringDowns: [],
    pass: pictureOf(pass, mode.direction),
    coastdown,
  });
}

function energy(axes: readonly Float64Array[]): number {
  return axes.reduce((sum, axis) => sum + axis.reduce((s, v) => s + v * v, 0), 0);
}

function refusalOf(pass: Pass, durationS: number): Outcome<never> | undefined {
  const { fit, samples } = pass;
  const whole = energy(samples.axes);
  const gain = 0.5 * fit.sampleCount * Math.log(whole / fit.sumOfSquares);
  const explained = 1 - fit.sumOfSquares / whole;
  const spread = fit.dampingRatioSd / fit.dampingRatio;
  const startRatio = speedAt(fit.sweep, samples.timeS[0] as number) / fit.frequencyHz;
  const endRatio = speedAt(fit.sweep, samples.timeS[samples.timeS.length - 1] as number) / fit.frequencyHz;
  if (gain < LEAST_GAIN || (explained < LEAST_EXPLAINED_SHARE && isFarFromNoise(pass)))
    return failure('no-pass', { durationS, explainedShare: explained });
  if (startRatio < COVERED_WINDOW[1] || endRatio > COVERED_WINDOW[0])
    return failure('pass-incomplete', {
      frequencyHz: fit.frequencyHz,
      startHz: startRatio * fit.frequencyHz,
      endHz: endRatio * fit.frequencyHz,
    });
  if (!(spread < LARGEST_DAMPING_SPREAD)) return failure('no-pass', { durationS, explainedShare: explained });
  return undefined;
}

/** What is left over is more than noise: then the fit must at least explain most of the motion. */
const isFarFromNoise = (pass: Pass): boolean =>
  pass.fit.residualVariance > POOR_RESIDUAL * pass.noiseVariance;

function factsOf(pass: Pass, conditioned: ConditionedSignal): CoastdownFacts {
  const { fit } = pass;
  const { timeS } = conditioned;
  const crossingS = crossingTime(pass);
  const sweepRateHzPerS = Math.abs(speedRateAt(fit.sweep, crossingS));
  const within = (t: number): number =>
    Math.max(
      pass.samples.timeS[0] as number,
      Math.min(pass.samples.timeS[pass.samples.timeS.length - 1] as number, t),
    );
  return {
    startHz: speedAt(fit.sweep, within(timeS[0] as number)),
    endHz: Math.max(0, speedAt(fit.sweep, within(timeS[timeS.length - 1] as number))),
    sweepRateHzPerS,
    sweepSeverityRatio: sweepRateHzPerS / (2 * fit.dampingRatio * fit.frequencyHz) ** 2,
  };
}

function crossingTime(pass: Pass): number {
  const { timeS } = pass.samples;
  for (let k = 0; k < timeS.length; k++)
    if (speedAt(pass.fit.sweep, timeS[k] as number) <= pass.fit.frequencyHz) return timeS[k] as number;
  return timeS[timeS.length - 1] as number;
}

function recordDoubts(coastdown: CoastdownFacts): Doubt[] {
  if (coastdown.sweepSeverityRatio <= FAST_SEVERITY) return [];
  return [{ code: 'sweep-fast', facts: { sweepSeverityRatio: coastdown.sweepSeverityRatio } }];
}

function modeOf(conditioned: ConditionedSignal, pass: Pass, coastdown: CoastdownFacts): Mode {
  const { fit } = pass;
  const { up } = conditioned.facts;
  const direction = principalDirection(
    fit.amplitudes.map((a) => fit.amplitudes.map((b) => a[0] * b[0] + a[1] * b[1])),
  );
  const along = alongDirection(fit.fitted, direction);
  const verticalShare = up && up.reduce((sum, u, a) => sum + u * (direction[a] as number), 0) ** 2;
  const doubts: DoubtCode[] = ['half-power-refused'];
  if (fit.residualVariance > POOR_RESIDUAL * pass.noiseVariance) doubts.push('poor-fit');
  if (coastdown.sweepSeverityRatio > FAST_SEVERITY) doubts.push('sweep-fast');
  return {
    frequencyHz: fit.frequencyHz,
    frequencySdHz: WIDENING * fit.frequencySdHz,
    dampingRatio: fit.dampingRatio,
    dampingRatioSd: WIDENING * fit.dampingRatioSd,
    amplitudeMps2: along.reduce((most, v) => Math.max(most, Math.abs(v)), 0),
    direction,
    ...(verticalShare === undefined ? {} : { verticalShare }),
    method: 'coastdown-fit',
    eventCount: 1,
    // The peak of a sweep is not that of a steady response: half-power points on it mean nothing.
    halfPower: { refusal: 'window-dominates' },
    // A machine slowing down whose line falls is seen directly: an image of the first fold would rise.
    fold: { verdict: 'direct', candidatesHz: [fit.frequencyHz] },
    doubts,
  };
}

function alongDirection(axes: readonly Float64Array[], direction: readonly number[]): Float64Array {
  return Float64Array.from({ length: axes[0]?.length ?? 0 }, (_, k) =>
    axes.reduce((sum, axis, a) => sum + (axis[k] as number) * (direction[a] as number), 0),
  );
}

/** Amplitude of the line against speed, measured and fitted, block by block. */
function pictureOf(pass: Pass, direction: readonly number[]): NonNullable<AnalysisPictures['pass']> {
  const { timeS, axes } = pass.samples;
  const measured = alongDirection(axes, direction);
  const model = alongDirection(pass.fit.fitted, direction);
  const rows: { frequencyHz: number; measured: number; fitted: number }[] = [];
  let i = 0;
  while (i < timeS.length) {
    const startS = timeS[i] as number;
    const sums = [0, 0, 0, 0];
    let count = 0;
    let speed = 0;
    for (; i < timeS.length && (timeS[i] as number) < startS + PICTURE_BLOCK_S; i++, count++) {
      const phase = sweepPhase(pass.fit.sweep, timeS[i] as number);
      const [c, s] = [Math.cos(phase), Math.sin(phase)];
      [measured, model].forEach((signal, m) => {
        sums[2 * m] = (sums[2 * m] as number) + (signal[i] as number) * c;
        sums[2 * m + 1] = (sums[2 * m + 1] as number) + (signal[i] as number) * s;
      });
      speed += speedAt(pass.fit.sweep, timeS[i] as number);
    }
    if (count < 4) continue;
    const [a, b, c, d] = sums as [number, number, number, number];
    rows.push({
      frequencyHz: speed / count,
      measured: (2 * Math.hypot(a, b)) / count,
      fitted: (2 * Math.hypot(c, d)) / count,
    });
  }
  rows.sort((a, b) => a.frequencyHz - b.frequencyHz);
  return {
    frequencyHz: Float64Array.from(rows, (r) => r.frequencyHz),
    measuredMps2: Float64Array.from(rows, (r) => r.measured),
    fittedMps2: Float64Array.from(rows, (r) => r.fitted),
  };
}
