import { changedAnalysis } from '../../../app/reading-desk.ts';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { Source } from '../../../core/model/source.ts';

/** A change that is being tried, on one mode and on the speeds of sources; 1 and absent mean as measured. */
export interface TriedChange {
  readonly modeIndex: number;
  readonly stiffnessRatio: number;
  readonly massRatio: number;
  /** Set outright; absent: it follows stiffness and mass. */
  readonly dampingRatio?: number;
  /** Speed by index of the source, r/min. */
  readonly speedsRpm: Readonly<Record<number, number>>;
}

export const nothingTried = (modeIndex: number): TriedChange => ({
  modeIndex,
  stiffnessRatio: 1,
  massRatio: 1,
  speedsRpm: {},
});

export const isNothingTried = (change: TriedChange): boolean =>
  change.stiffnessRatio === 1 &&
  change.massRatio === 1 &&
  change.dampingRatio === undefined &&
  Object.keys(change.speedsRpm).length === 0;

/** The analysis with the tried mode changed, as the ways out are judged (core/survey). */
export const triedAnalysis = (analysis: Analysis, change: TriedChange): Analysis =>
  changedAnalysis(analysis, {
    modeIndex: change.modeIndex,
    stiffnessFactor: change.stiffnessRatio,
    massFactor: change.massRatio,
    ...(change.dampingRatio === undefined ? {} : { dampingRatio: change.dampingRatio }),
  });

const isTurning = (
  source: Source,
): source is Extract<Source, { speedRpm: number | readonly [number, number] }> =>
  source.kind === 'machine' || source.kind === 'belt';

/** The speed that a slider starts from; absent where the source does not turn. */
export function presentSpeedRpm(source: Source): number | undefined {
  if (!isTurning(source)) return undefined;
  const { speedRpm } = source;
  return typeof speedRpm === 'number' ? speedRpm : Math.sqrt(speedRpm[0] * speedRpm[1]);
}

/** The sources with the speeds tried: a tried speed is one speed, whatever range it had. */
export const triedSources = (sources: readonly Source[], change: TriedChange): Source[] =>
  sources.map((source, index) => {
    const speedRpm = change.speedsRpm[index];
    return speedRpm === undefined || !isTurning(source) ? source : { ...source, speedRpm };
  });
