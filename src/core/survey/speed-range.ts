import type { Interval } from '../model/interval.ts';
import type { Separation, WayOut } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import {
  candidateFrequencies,
  dampingInterval,
  frequencyInterval,
  frequencySpreadRatio,
} from './mode-intervals.ts';
import { isStoppedAgainstRunning, separationOf } from './separation.ts';
import { isWorse } from './separations.ts';
import { AIM_MARGIN_RATIO, type WaysOutContext } from './ways-out-context.ts';
import { zonesFor } from './zones.ts';

/** Overlapping intervals joined, in rising order. */
export function joined(intervals: readonly Interval[]): Interval[] {
  const rising = [...intervals].sort((a, b) => a[0] - b[0]);
  const result: [number, number][] = [];
  for (const [low, high] of rising) {
    const last = result.at(-1);
    if (last && low <= last[1]) last[1] = Math.max(last[1], high);
    else result.push([low, high]);
  }
  return result;
}

/** Forcings of one shaft: their frequency is order times shaft speed. */
const isOfShaft = (forcing: Forcing): boolean =>
  forcing.sourceKind === 'machine' || forcing.role === 'motor-shaft';

/** Shaft speeds, r/min, at which any order of the source would not be apart from any mode of the reading. */
export function keepOutSpeeds(source: string, context: WaysOutContext): Interval[] {
  const bands = context.forcings
    .filter((forcing) => forcing.source === source && isOfShaft(forcing))
    .flatMap((forcing) => context.analysis.modes.flatMap((mode) => keepOutOf(mode, forcing, context)));
  return joined(bands);
}

function keepOutOf(
  mode: WaysOutContext['analysis']['modes'][number],
  forcing: Forcing,
  context: WaysOutContext,
): Interval[] {
  const stopped = isStoppedAgainstRunning(context.analysis, forcing, context.machineState);
  const spread = frequencySpreadRatio(mode, stopped ? context.thresholds.stoppedRunningRatio : 0);
  return candidateFrequencies(mode).map((candidateHz): Interval => {
    const [low, high] = frequencyInterval(candidateHz, spread);
    const damping = dampingInterval(mode, candidateHz)[1];
    const { apart } = zonesFor(forcing.amplificationKind, damping, context.thresholds);
    const perOrderRpm = 60 / forcing.order;
    return [
      (low * apart[0] * perOrderRpm) / (1 + forcing.toleranceRatio),
      (high * apart[1] * perOrderRpm) / (1 - forcing.toleranceRatio),
    ];
  });
}

/** Speed nearest to `fromRpm` within the range that lies in no band; undefined when there is none. */
export function nearestOutside(
  fromRpm: number,
  bands: readonly Interval[],
  range: Interval,
): number | undefined {
  const edges = bands.flatMap(([low, high]) => [low * (1 - AIM_MARGIN_RATIO), high * (1 + AIM_MARGIN_RATIO)]);
  const free = [fromRpm, ...edges, ...range].filter(
    (speed) =>
      speed > 0 &&
      speed >= range[0] &&
      speed <= range[1] &&
      !bands.some(([low, high]) => speed > low && speed < high),
  );
  if (free.length === 0) return undefined;
  return free.reduce((best, next) => (Math.abs(next - fromRpm) < Math.abs(best - fromRpm) ? next : best));
}

/** A fixed speed can be changed by pulleys or gears within about this factor (common practice, no source). */
export const PRACTICAL_SPEED_FACTOR = 2;

/**
 * Speeds to keep out of, and the nearest speed at which every order of the source is apart from every mode found. For a
 * variable-speed drive the bands are clipped to its range; for a fixed speed they tell what another drive ratio must avoid.
 */
export function speedWay(separationIndex: number, context: WaysOutContext): WayOut | undefined {
  const separation = context.separations[separationIndex] as Separation;
  const forcing = context.forcings[separation.forcingIndex] as Forcing;
  if (!isOfShaft(forcing)) return undefined;
  const shaft: Interval = [
    (forcing.rangeHz[0] * 60) / forcing.order,
    (forcing.rangeHz[1] * 60) / forcing.order,
  ];
  const range: Interval = forcing.adjustable
    ? shaft
    : [shaft[0] / PRACTICAL_SPEED_FACTOR, shaft[1] * PRACTICAL_SPEED_FACTOR];
  const bands = keepOutSpeeds(forcing.source, context);
  const inRange = bands
    .map(([low, high]): Interval => [Math.max(low, range[0]), Math.min(high, range[1])])
    .filter(([low, high]) => low < high);
  const coincidentRpm = (separation.modeHz * 60) / forcing.order;
  const from = Math.min(shaft[1], Math.max(shaft[0], coincidentRpm));
  const nearestSpeedRpm = nearestOutside(from, bands, range);
  return {
    kind: 'speed',
    separationIndex,
    keepOutRpm: inRange,
    keepOutHz: inRange.map(([low, high]): Interval => [low / 60, high / 60]),
    practical: nearestSpeedRpm !== undefined,
    ...(nearestSpeedRpm === undefined
      ? { verdictAfter: separation.verdict, sideEffects: [] }
      : outcomeAtSpeed(separation, forcing, nearestSpeedRpm, context)),
  };
}

/** The pair, and the source's other pairs, judged again at another shaft speed. */
function outcomeAtSpeed(separation: Separation, forcing: Forcing, speedRpm: number, context: WaysOutContext) {
  const at = (original: Forcing): Forcing => {
    const hz = (speedRpm / 60) * original.order;
    const tolerance = original.toleranceRatio;
    return { ...original, rangeHz: [hz, hz], frequencyHz: [hz * (1 - tolerance), hz * (1 + tolerance)] };
  };
  const again = (other: Separation): Separation =>
    separationOf(
      other.modeIndex,
      other.forcingIndex,
      at(context.forcings[other.forcingIndex] as Forcing),
      context,
    );
  const after = again(separation);
  const sideEffects = context.separations.flatMap((other, index) => {
    const same =
      other.source === forcing.source && isOfShaft(context.forcings[other.forcingIndex] as Forcing);
    if (!same || other === separation) return [];
    return isWorse(other, again(other)) ? [index] : [];
  });
  return {
    nearestSpeedRpm: speedRpm,
    verdictAfter: after.verdict,
    amplificationAfter: after.amplification.interval,
    sideEffects,
  };
}
