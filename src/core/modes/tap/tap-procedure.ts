import type { AnalysisSettings, Mode } from '../../model/analysis.ts';
import type { Doubt } from '../../model/doubt.ts';
import { failure, success, type Outcome } from '../../model/outcome.ts';
import type { RingDown } from '../../model/pictures.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { median } from '../../signal/sample-counter.ts';
import type { ProcedureAnswer } from '../procedure-answer.ts';
import type { DecaySignal } from './decay-model.ts';
import { recordCost } from './bayes-cost.ts';
import { isTapped } from './find-taps.ts';
import type { FreeDecay } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import { modeEstimate } from './mode-estimate.ts';
import { decayAlone, residuals } from './modelled-signal.ts';
import { residualColour } from './residual-colour.ts';
import { leavesOnlyNoise, searchBriefRingDowns, searchRingDowns } from './ring-down-search.ts';
import type { RingDownSearch } from './ring-down-state.ts';
import { retimedByRingDowns } from './ring-down-timing.ts';
import { withoutPollingGhosts } from './polled-modes.ts';
import { fitRounded, isStepCoarse, meanSquare } from './rounding-likelihood.ts';
import { softenedFit } from './softening.ts';
import { explainedShare, isAnswer, ringEnergy } from './tap-gates.ts';
import { modeOf, toneOf } from './tap-mode.ts';
import { repacedSignal, supposedUnfolded, unfoldedSignal } from './unfolded-signal.ts';
import type { PacedSignal } from './unfolded-signal.ts';

/** Fewer samples than this hold no ring-down worth fitting. */
const FEWEST_SAMPLES = 64;
/** Smallest full scale of a phone's sensor, ±2 g, less what gravity takes: below, equal extreme values are rounding. */
const LEAST_FULL_SCALE_MPS2 = 9.8;
/** Share of the motion under the ring-downs that the fit must explain; below, it is not free decay. */
const LEAST_EXPLAINED_SHARE = 0.8;
/** Fewer taps than this leave tap-to-tap scatter unknown (common practice: three to eight). */
const FEWEST_TAPS = 3;

/** Tap test: free decays found, fitted jointly, cross-checked. */
export function tapProcedure(
  conditioned: ConditionedSignal,
  settings: AnalysisSettings,
): Outcome<ProcedureAnswer> {
  const signal = tapSignal(conditioned);
  const { facts } = conditioned;
  if (signal.timeS.length < FEWEST_SAMPLES)
    return failure('too-short', { durationS: facts.durationS, sampleCount: facts.sampleCount });
  const largest = Math.max(...signal.y.map((y) => y.reduce((m, v) => Math.max(m, Math.abs(v)), 0)));
  if (facts.clippedCount > signal.timeS.length / 4 && largest > LEAST_FULL_SCALE_MPS2)
    return failure('clipped-throughout', { clippedCount: facts.clippedCount });
  const input = { rateHz: facts.rateHz, stepMps2: facts.stepMps2 };
  const search = searchRingDowns({ ...input, signal });
  if (search === undefined) return failure('no-motion');
  const retimed = settings.timing === 'auto' ? retimedByRingDowns(conditioned, signal, search) : undefined;
  const timed = retimed && { ...signal, timeS: retimed.timeS };
  const again = timed && searchRingDowns({ ...input, signal: timed });
  if (again === undefined || recordCost(timed!, again) > recordCost(signal, search))
    return bestAnswer(conditioned, signal, search);
  // An image reads as if its stamps were late: only where that fits worse are they.
  const supposed = isLater(retimed!, conditioned) ? supposedUnfolded(conditioned, signal) : undefined;
  const image = supposed && searchUnfolded(conditioned, supposed);
  if (image !== undefined && recordCost(image.signal, image.search) < recordCost(timed!, again))
    return answerOf(conditioned, image.signal, image.search);
  const answer = bestAnswer(retimed!, timed!, again);
  return answer.ok ? success({ ...answer.value, retimed: retimed! }) : answer;
}

const isLater = (a: ConditionedSignal, b: ConditionedSignal): boolean =>
  a.facts.timing.trueShare < b.facts.timing.trueShare;

/** The answer as the record reads, or as an image of a frequency above half the rate, whichever fits better. */
function bestAnswer(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): Outcome<ProcedureAnswer> {
  const answer = firstAnswer(conditioned, signal, search);
  const unfolded =
    unfoldedSignal(conditioned, signal, search) ??
    (answer.ok && leavesOnlyNoise(search) ? undefined : supposedUnfolded(conditioned, signal));
  const again = unfolded && searchUnfolded(conditioned, unfolded);
  if (again === undefined || recordCost(again.signal, again.search) > recordCost(signal, search))
    return answer;
  return answerOf(conditioned, again.signal, again.search);
}

/** The search's answer, or that of a search for brief weak ring-downs where it found none in a quiet record. */
function firstAnswer(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): Outcome<ProcedureAnswer> {
  const answer = answerOf(conditioned, signal, search);
  if (answer.ok || !leavesOnlyNoise(search)) return answer;
  const { rateHz, stepMps2 } = conditioned.facts;
  const brief = searchBriefRingDowns({ signal, rateHz, stepMps2 });
  if (brief === undefined || brief.tapCount === 0) return answer;
  const other = answerOf(conditioned, signal, brief);
  return other.ok ? other : answer;
}

/** Search with the phases of an image; once more if its frequency, which paces them, came out differently. */
function searchUnfolded(
  conditioned: ConditionedSignal,
  start: PacedSignal,
): { signal: DecaySignal; search: RingDownSearch } | undefined {
  const input = { rateHz: conditioned.facts.rateHz, stepMps2: conditioned.facts.stepMps2 };
  const search = searchRingDowns({ ...input, signal: start });
  const better = search && repacedSignal(conditioned, start, search);
  const again = better && searchRingDowns({ ...input, signal: better });
  if (again !== undefined) return { signal: better!, search: again };
  return search && { signal: start, search };
}

/** Sensor values about their median: the slow part stays, for the fit's own constant and slope to take up. */
function tapSignal(conditioned: ConditionedSignal): DecaySignal {
  const y = conditioned.accelerationMps2.map((fast, a) => {
    const whole = fast.map((v, i) => v + conditioned.slowMps2[a]![i]!);
    const middle = median(whole);
    return whole.map((v) => v - middle);
  });
  return { timeS: conditioned.timeS, y };
}

function answerOf(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): Outcome<ProcedureAnswer> {
  if (!isTapped(signal, search.tapCount)) return failure('no-decay', { tapCount: search.tapCount });
  const { decays, fit, isRounded } = finalFit(signal, search, conditioned.facts.stepMps2);
  const left = residuals(signal, decays, fit);
  const largest = Math.max(...signal.y.map((y) => y.reduce((m, v) => Math.max(m, Math.abs(v)), 0)));
  // What rounding leaves is stronger than the noise that its likelihood tells.
  const judged = isRounded ? { ...fit, variance: left.map((l) => meanSquare(l, decays)) } : fit;
  const modeIndexes = fit.components.flatMap((c, k) => (c.kind === 'mode' ? [k] : []));
  const estimates = modeIndexes
    .map((k) => {
      const colour = residualColour(signal, decays, judged, left, fit.components[k]!);
      return { k, estimate: modeEstimate(signal, decays, fit, k, colour) };
    })
    .filter(({ estimate }) => isAnswer(signal, decays, estimate, fit, largest))
    .sort((a, b) => ringEnergy(b.estimate) - ringEnergy(a.estimate));
  if (estimates.length === 0) return failure(search.tapCount === 0 ? 'no-taps' : 'no-decay');
  const strongest = fit.components[estimates[0]!.k]!;
  const explained = explainedShare(
    signal,
    decays,
    left,
    strongest.decayPerS,
    search.quietVariance.map((v, a) => v + (conditioned.facts.stepMps2[a] ?? 0) ** 2 / 12),
    fit.components.length,
  );
  if (explained < LEAST_EXPLAINED_SHARE) return failure('no-decay', { explainedShare: explained });
  const fitted = estimates.map(({ k, estimate }) =>
    modeOf({ conditioned, signal, decays, fit, left, k, estimate, isRounded }),
  );
  const polled = withoutPollingGhosts(fitted, conditioned.facts.rateHz);
  const modes = polled?.modes ?? fitted;
  return success({
    modes,
    tones: fit.components.flatMap((c, k) => (c.kind === 'tone' ? [toneOf(conditioned, fit, k)] : [])),
    broadPeaks: [],
    tapTimesS: decays.flatMap((d) => (d.onset === undefined ? [] : [signal.timeS[d.onset]!])),
    doubts: [
      ...tapDoubts(search, decays, modes, explained),
      ...(polled ? [{ code: 'polled' as const, facts: { sensorRateHz: polled.sensorRateHz } }] : []),
    ],
    ringDowns: ringDownPictures(signal, decays, fit, left, estimates[0]!.k, modes[0]!.direction),
  });
}

/** The search's fit, refined by what the record calls for: the rounding's own likelihood, or change with amplitude. */
function finalFit(
  signal: DecaySignal,
  search: RingDownSearch,
  stepMps2: readonly number[],
): { decays: readonly FreeDecay[]; fit: DecayFit; isRounded: boolean } {
  const { fit, fitted: decays } = search;
  if (isStepCoarse(fit.variance, stepMps2))
    return { decays, fit: fitRounded(signal, decays, fit, stepMps2), isRounded: true };
  return { ...(softenedFit(signal, decays, fit) ?? { decays, fit }), isRounded: false };
}

/** Below this the fit takes up too little of the motion to be trusted fully. */
const GOOD_EXPLAINED_SHARE = 0.9;
/** In one decay two modes nearer than this may be one whose frequency changes with amplitude. */
const CLOSE_MODES_SHARE = 0.1;

function tapDoubts(
  search: RingDownSearch,
  decays: readonly FreeDecay[],
  modes: readonly Mode[],
  explainedShare: number,
): Doubt[] {
  const doubts: Doubt[] = [];
  const tapCount = Math.max(search.tapCount, 1);
  if (tapCount < FEWEST_TAPS) doubts.push({ code: 'few-taps', facts: { tapCount } });
  if (explainedShare < GOOD_EXPLAINED_SHARE) doubts.push({ code: 'poor-fit', facts: { explainedShare } });
  const isClose = modes.some((a, i) =>
    modes.some((b, j) => j < i && Math.abs(a.frequencyHz / b.frequencyHz - 1) < CLOSE_MODES_SHARE),
  );
  if (decays.filter((d) => d.onset !== undefined).length <= 1 && isClose)
    doubts.push({ code: 'one-decay-close-modes' });
  return doubts;
}

function ringDownPictures(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  fit: DecayFit,
  left: readonly Float64Array[],
  k: number,
  direction: readonly number[],
): RingDown[] {
  const tapped = decays.some((d) => d.onset !== undefined);
  return decays.flatMap((decay, s) => {
    // Silence before the first tap is fitted too, but is no ring-down to look at.
    if (tapped && decay.onset === undefined) return [];
    const measuredMps2 = decayAlone(signal, decays, fit, left, s, k, direction);
    const fittedMps2 = measuredMps2.map(
      (v, i) => v - direction.reduce((sum, d, a) => sum + d * left[a]![decay.start + i]!, 0),
    );
    const tapTimeS = signal.timeS[decay.onset ?? decay.start]!;
    const timeS = signal.timeS.slice(decay.start, decay.end);
    return [{ tapTimeS, timeS, measuredMps2, fittedMps2 }];
  });
}
