/** An asset pools its spots, directions and states: what drives it anywhere, what has been covered, what to do next. */
import type { Mode } from '../model/analysis.ts';
import type { Trust } from '../model/doubt.ts';
import type { AssetVerdict, Coverage, PooledMode, PooledPair } from '../model/asset-verdict.ts';
import type { Separation, UnpairedVerdict, Verdict } from '../model/judgement.ts';
import type { Forcing, Source } from '../model/source.ts';
import { forcingsOf } from './forcings.ts';
import type { AssetReading, JudgedReading } from './asset-reading.ts';
import { judge } from './judge.ts';
import { nextSteps } from './next-steps.ts';
import { isNear, VERDICT_RANK } from './separations.ts';
import { SAME_MODE_RATIO } from './mode-pairs.ts';
import { pooled } from './pooling.ts';
import { worseTrust } from './trust.ts';

export interface AssetSpot {
  readonly id: string;
  readonly name: string;
}

/** Newest reading of each spot, procedure, direction and machine state: what holds today. */
export function currentReadings(readings: readonly AssetReading[]): readonly AssetReading[] {
  const newest = new Map<string, AssetReading>();
  for (const reading of readings) {
    const { spot = '', analysis, circumstances } = reading;
    const key = [spot, analysis.procedure, circumstances.direction, circumstances.machineState].join('|');
    const held = newest.get(key);
    if (!held || held.recordedAt < reading.recordedAt) newest.set(key, reading);
  }
  return [...newest.values()];
}

/** Of a forcing with no mode near it in any reading: seen by one reading is seen; blind in all is blind. */
const UNPAIRED_RANK: Readonly<Record<UnpairedVerdict, number>> = {
  'none-near': 2,
  blind: 1,
  'not-sought': 0,
};

function pairOf(forcing: Forcing, forcingIndex: number, judged: readonly JudgedReading[]): PooledPair {
  const near = judged.flatMap(({ id, judgement }) =>
    judgement.separations
      .filter((separation) => separation.forcingIndex === forcingIndex && isNear(separation.verdict))
      .map((separation) => ({ reading: id, separation })),
  );
  const first = near[0];
  if (first) {
    const worst = near.reduce(
      (held, next) => (isWorse(next.separation, held.separation) ? next : held),
      first,
    );
    return { forcing, forcingIndex, verdict: worst.separation.verdict, ...worst };
  }
  const verdicts = judged.flatMap(({ judgement }) =>
    judgement.unpaired.filter((item) => item.forcingIndex === forcingIndex).map(({ verdict }) => verdict),
  );
  const best = verdicts.reduce<UnpairedVerdict>(
    (held, next) => (UNPAIRED_RANK[next] > UNPAIRED_RANK[held] ? next : held),
    'not-sought',
  );
  return { forcing, forcingIndex, verdict: best };
}

const isWorse = (a: Separation, b: Separation): boolean =>
  VERDICT_RANK[a.verdict] !== VERDICT_RANK[b.verdict]
    ? VERDICT_RANK[a.verdict] > VERDICT_RANK[b.verdict]
    : a.amplification.interval[1] > b.amplification.interval[1];

const PAIR_RANK: Readonly<Record<Verdict | UnpairedVerdict, number>> = {
  coincident: 6,
  undecided: 5,
  close: 4,
  blind: 3,
  'not-sought': 2,
  'none-near': 1,
  apart: 0,
};

interface FoundMode {
  readonly mode: Mode;
  readonly reading: AssetReading;
}

/** Modes of all readings, joined where neighbours in frequency lie within the same-mode ratio of the group's first. */
function modeGroups(readings: readonly AssetReading[]): FoundMode[][] {
  const all = readings
    .flatMap((reading) => reading.analysis.modes.map((mode) => ({ mode, reading })))
    .sort((a, b) => a.mode.frequencyHz - b.mode.frequencyHz);
  const groups: FoundMode[][] = [];
  for (const found of all) {
    const group = groups.at(-1);
    const start = group?.[0]?.mode.frequencyHz;
    // Two modes of one reading are two modes, however near.
    const taken = group?.some((member) => member.reading === found.reading);
    if (group && start && !taken && found.mode.frequencyHz / start <= SAME_MODE_RATIO) group.push(found);
    else groups.push([found]);
  }
  return groups;
}

function pooledMode(group: readonly FoundMode[]): PooledMode {
  const strongest = group.reduce((held, next) =>
    next.mode.amplitudeMps2 > held.mode.amplitudeMps2 ? next : held,
  );
  const spots = group.flatMap(({ reading }) => reading.spot ?? []);
  const frequency = pooled(
    group.map(({ mode }) => ({
      value: mode.frequencyHz,
      sd: leastSd(mode.frequencySdHz, mode.frequencyHz),
    })),
  );
  const damping = pooled(
    group.map(({ mode }) => ({
      value: mode.dampingRatio,
      sd: leastSd(mode.dampingRatioSd, mode.dampingRatio),
    })),
  );
  return {
    frequencyHz: frequency.value,
    frequencySdHz: frequency.sd,
    frequencyIntervalHz: frequency.interval,
    frequencyBetweenHz: frequency.betweenSd,
    dampingRatio: damping.value,
    dampingRatioSd: damping.sd,
    dampingIntervalRatio: damping.interval,
    readings: group.map(({ reading }) => reading.id),
    spots: [...new Set(spots)],
    ...(strongest.reading.spot === undefined ? {} : { strongestSpot: strongest.reading.spot }),
  };
}
/** A noise-free reading has no spread; pooling needs one above zero. */
const leastSd = (sd: number, value: number): number => Math.max(sd, 1e-9 * value);

function coverageOf(readings: readonly AssetReading[], spots: readonly AssetSpot[]): Coverage {
  const read = new Set(readings.flatMap(({ spot }) => spot ?? []));
  const directions = readings.flatMap(({ circumstances }) => circumstances.direction ?? []);
  return {
    spotsRead: spots.filter(({ id }) => read.has(id)).map(({ id }) => id),
    spotsMissing: spots.filter(({ id }) => !read.has(id)).map(({ id }) => id),
    directions: [...new Set(directions)],
    tapCount: readings.filter(({ analysis }) => analysis.procedure === 'tap').length,
    hasRunning: readings.some(({ analysis }) => analysis.procedure === 'running'),
    hasStopped: readings.some(({ analysis }) => analysis.procedure !== 'running'),
  };
}

/**
 * Pools an asset's readings (only the newest of each spot, procedure, direction and state count) against the sources valid for it.
 * A mode near a forcing anywhere makes the pair; nothing near it anywhere reads "none found near", never clear.
 * @throws RangeError when a source is impossible
 */
export function assetVerdict(
  readings: readonly AssetReading[],
  sources: readonly Source[],
  spots: readonly AssetSpot[] = [],
): AssetVerdict {
  const outcome = forcingsOf(sources);
  if (!outcome.ok) throw new RangeError(`impossible source: ${JSON.stringify(outcome.problem.facts)}`);
  const judged = currentReadings(readings).map((reading) => ({
    ...reading,
    judgement: judge(reading.analysis, sources, reading.circumstances, reading.settings),
  }));
  const pairs = outcome.value
    .map((forcing, index) => pairOf(forcing, index, judged))
    .sort((a, b) => PAIR_RANK[b.verdict] - PAIR_RANK[a.verdict]);
  const modes = modeGroups(judged).map(pooledMode);
  const coverage = coverageOf(judged, spots);
  return {
    pairs,
    modes,
    coverage,
    next: nextSteps({ judged, sources, pairs, modes, coverage }),
    trust: trustOf(pairs, judged),
  };
}

function trustOf(pairs: readonly PooledPair[], judged: readonly JudgedReading[]): Trust {
  const giving = new Set(pairs.flatMap(({ reading }) => reading ?? []));
  const counted = judged.filter(({ id }) => giving.size === 0 || giving.has(id));
  if (counted.length === 0) return 'poor';
  return counted.map(({ judgement }) => judgement.trust).reduce(worseTrust);
}
