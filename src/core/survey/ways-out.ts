/** Changes that would move a coincident or close pair apart; each is judged again with the change made. */
import type { Analysis } from '../model/analysis.ts';
import type { Interval } from '../model/interval.ts';
import type { Separation, WayOut } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import { dampingForAmplification } from './amplification.ts';
import { isolationWay } from './isolation.ts';
import { dampingInterval, frequencyInterval, frequencySpreadRatio } from './mode-intervals.ts';
import { atFaceValue, separationOf } from './separation.ts';
import { isWorse, isWorst } from './separations.ts';
import { speedWay } from './speed-range.ts';
import { changedAnalysis, type StructuralChange } from './structural-change.ts';
import { AIM_MARGIN_RATIO, type WaysOutContext } from './ways-out-context.ts';
import { zonesFor } from './zones.ts';

/** Beyond these a change is rarely built as a remedy (common practice, no source). */
export const PRACTICAL_STIFFNESS_FACTOR = 4;
export const PRACTICAL_MASS_FACTOR = 3;
export const PRACTICAL_DAMPING_RATIO = 0.1;

interface Pair {
  readonly separation: Separation;
  readonly separationIndex: number;
  readonly forcing: Forcing;
  /** Natural frequency interval with all uncertainties. */
  readonly modeHz: Interval;
  readonly apart: Interval;
}

function pairOf(separationIndex: number, context: WaysOutContext): Pair {
  const separation = context.separations[separationIndex] as Separation;
  const forcing = context.forcings[separation.forcingIndex] as Forcing;
  const mode = context.analysis.modes[separation.modeIndex] as (typeof context.analysis.modes)[number];
  const modelRatio = separation.stoppedAgainstRunning ? context.thresholds.stoppedRunningRatio : 0;
  const damping = dampingInterval(mode, separation.modeHz);
  return {
    separation,
    separationIndex,
    forcing,
    modeHz: frequencyInterval(separation.modeHz, frequencySpreadRatio(mode, modelRatio)),
    apart: zonesFor(forcing.amplificationKind, damping[1], context.thresholds).apart,
  };
}

/** Judges the pair again, and every other pair of the same mode, after a change. */
function outcomeOf(pair: Pair, change: StructuralChange, context: WaysOutContext) {
  const changed = { ...context, analysis: seeingAll(changedAnalysis(context.analysis, change)) };
  const again = (separation: Separation): Separation =>
    separationOf(
      separation.modeIndex,
      separation.forcingIndex,
      context.forcings[separation.forcingIndex] as Forcing,
      changed,
    );
  const after = again(pair.separation);
  const sideEffects = context.separations.flatMap((other, index) => {
    if (index === pair.separationIndex || other.modeIndex !== change.modeIndex) return [];
    if (isWorst(other.verdict) || isOnlyDamped(change, other)) return [];
    return isWorse(other, again(other)) ? [index] : [];
  });
  return {
    verdictAfter: after.verdict,
    amplificationAfter: after.amplification.interval,
    sideEffects,
  };
}

/** A force and an unbalance never do more to a better damped mode; the motion of a base can, far above its frequency. */
const isOnlyDamped = (change: StructuralChange, { amplification }: Separation): boolean =>
  change.dampingRatio !== undefined && amplification.kind !== 'base';

/** What is planned is judged as if all were seen: blindness belongs to a recording, not to a change. */
function seeingAll(analysis: Analysis): Analysis {
  const { coastdown: _, ...rest } = analysis;
  return { ...rest, recording: { ...analysis.recording, usableBandHz: [0, Number.MAX_VALUE] } };
}

/** Stiffer, so that the whole forcing lies below: f' = forcing / apart ratio, factor (f'/f)². */
function stiffnessWay(pair: Pair, context: WaysOutContext): WayOut | undefined {
  const targetHz = aim(pair.forcing.frequencyHz[1] / pair.apart[0], 1);
  const factor: Interval = [Math.max(1, (targetHz / pair.modeHz[1]) ** 2), (targetHz / pair.modeHz[0]) ** 2];
  if (!(factor[1] > 1) || !Number.isFinite(factor[1])) return undefined;
  const change = { modeIndex: pair.separation.modeIndex, stiffnessFactor: factor[1] };
  return {
    kind: 'stiffness',
    separationIndex: pair.separationIndex,
    factor,
    targetHz: [targetHz, targetHz],
    practical: factor[1] <= PRACTICAL_STIFFNESS_FACTOR,
    ...outcomeOf(pair, change, context),
  };
}

/** Heavier, so that the whole forcing lies above: f' = forcing / apart ratio, factor (f/f')². */
function massWay(pair: Pair, context: WaysOutContext): WayOut | undefined {
  if (!Number.isFinite(pair.apart[1])) return undefined;
  const targetHz = aim(pair.forcing.frequencyHz[0] / pair.apart[1], -1);
  const factor: Interval = [Math.max(1, (pair.modeHz[0] / targetHz) ** 2), (pair.modeHz[1] / targetHz) ** 2];
  if (!(factor[1] > 1)) return undefined;
  const change = { modeIndex: pair.separation.modeIndex, massFactor: factor[1] };
  return {
    kind: 'mass',
    separationIndex: pair.separationIndex,
    factor,
    targetHz: [targetHz, targetHz],
    practical: factor[1] <= PRACTICAL_MASS_FACTOR,
    ...outcomeOf(pair, change, context),
  };
}

const aim = (targetHz: number, direction: 1 | -1): number => targetHz * (1 + direction * AIM_MARGIN_RATIO);

/** Damping that holds the amplification to the wanted value; the pair stays as near as it was. */
function dampingWay(pair: Pair, context: WaysOutContext): WayOut | undefined {
  const { separation, forcing } = pair;
  const wanted = context.thresholds.wantedAmplificationRatio;
  if (separation.amplification.interval[1] <= wanted) return undefined;
  const kind = forcing.amplificationKind;
  const needed = dampingForAmplification(kind, separation.ratio, wanted, forcing.cycleCount);
  if (needed === undefined) return undefined;
  const mode = context.analysis.modes[separation.modeIndex] as (typeof context.analysis.modes)[number];
  const nominal = needed * (separation.modeHz / mode.frequencyHz);
  const change = { modeIndex: separation.modeIndex, dampingRatio: nominal };
  const least = dampingForAmplification(
    kind,
    [separation.nearestRatio, separation.nearestRatio],
    wanted,
    forcing.cycleCount,
  );
  return {
    kind: 'damping',
    separationIndex: pair.separationIndex,
    factor: [least ?? needed, needed],
    practical: needed <= PRACTICAL_DAMPING_RATIO,
    ...outcomeOf(pair, change, context),
  };
}

/**
 * Ways out of every coincident or close pair, in the order of the separations. Where the fold of a mode is undecided, what is seen is
 * taken at face value: a change can be planned for nothing else.
 */
export function waysOutOf(given: WaysOutContext): readonly WayOut[] {
  const separations = given.separations.map((separation) => ({
    ...separation,
    verdict: separation.atFaceValue ?? separation.verdict,
  }));
  const context = atFaceValue({ ...given, separations });
  return separations.flatMap((separation, separationIndex) => {
    if (separation.verdict !== 'coincident' && separation.verdict !== 'close') return [];
    const pair = pairOf(separationIndex, context);
    const ways = [
      speedWay(separationIndex, context),
      stiffnessWay(pair, context),
      massWay(pair, context),
      dampingWay(pair, context),
      isolationWay(separationIndex, context),
    ];
    return ways.filter((way): way is WayOut => way !== undefined);
  });
}
