import type { Analysis } from '../model/analysis.ts';
import type { Circumstances } from '../model/fact.ts';
import type { Judgement, Separation, UnpairedVerdict } from '../model/judgement.ts';
import type { Place } from '../model/place.ts';
import type { Forcing, Source } from '../model/source.ts';
import { cautionsFor } from './cautions.ts';
import { circumstanceDoubts } from './circumstance-doubts.ts';
import { forcingsOf } from './forcings.ts';
import { levelFindings } from './level-findings.ts';
import { seenBand, type SeparationContext } from './separation.ts';
import { isImpulsive, isNear, separationsOf } from './separations.ts';
import { specialistReasons } from './specialist.ts';
import type { Thresholds } from '../model/thresholds.ts';
import { thresholdsWith } from './thresholds.ts';
import { toneMatches } from './tone-matches.ts';
import { combineTrust } from './trust.ts';
import { waysOutOf } from './ways-out.ts';

export interface JudgeSettings {
  readonly thresholds?: Partial<Thresholds>;
  /** What the spot is: criteria and cautions need it. */
  readonly place?: Place;
}

/**
 * What a forcing with no mode near it reads as. A running reading looks for no modes; a band not wholly seen may hide one;
 * otherwise none was found near it in this reading, which is not to say that there is none.
 */
function unpairedVerdict(forcing: Forcing, analysis: Analysis): UnpairedVerdict {
  if (analysis.procedure === 'running') return 'not-sought';
  const [low, high] = seenBand(analysis);
  return forcing.frequencyHz[0] >= low && forcing.frequencyHz[1] <= high ? 'none-near' : 'blind';
}

function unpairedOf(forcings: readonly Forcing[], separations: readonly Separation[], analysis: Analysis) {
  const paired = new Set(
    separations.filter(({ verdict }) => isNear(verdict)).map(({ forcingIndex }) => forcingIndex),
  );
  return forcings.flatMap((forcing, forcingIndex) =>
    paired.has(forcingIndex) ? [] : [{ forcing, forcingIndex, verdict: unpairedVerdict(forcing, analysis) }],
  );
}

/** Pairs that hold, and the modes which steps meet as single blows. */
function withoutImpulses(all: readonly Separation[], forcings: readonly Forcing[]) {
  const blows = all.filter((separation) =>
    isImpulsive(separation, forcings[separation.forcingIndex] as Forcing),
  );
  const impulsive = new Map(
    blows.map(({ modeIndex, source }) => [`${modeIndex} ${source}`, { modeIndex, source }]),
  );
  return {
    separations: all.filter((separation) => !blows.includes(separation)),
    impulsive: [...impulsive.values()],
  };
}

/**
 * From an analysis and the sources valid for it to a judgement: pairs with ratio, amplification and verdict, what was not seen, tones
 * matched, levels against criteria, ways out, when to call a specialist, cautions, trust. Pure; a few milliseconds.
 * @param sources must have passed `forcingsOf` (or `parseSources`)
 * @throws RangeError when a source is impossible or a threshold senseless
 */
export function judge(
  analysis: Analysis,
  sources: readonly Source[],
  circumstances: Partial<Circumstances> = {},
  settings: JudgeSettings = {},
): Judgement {
  const thresholds = thresholdsWith(settings.thresholds);
  const outcome = forcingsOf(sources);
  if (!outcome.ok) throw new RangeError(`impossible source: ${JSON.stringify(outcome.problem.facts)}`);
  const forcings = outcome.value;
  const context: SeparationContext = { analysis, machineState: circumstances.machineState, thresholds };
  const { separations, impulsive } = withoutImpulses(separationsOf(forcings, context), forcings);
  const levels = levelFindings(analysis, settings.place);
  const doubts = [...analysis.doubts, ...circumstanceDoubts(analysis, circumstances, settings.place)];
  const trust = combineTrust(doubts, analysis.modes);
  return {
    forcings,
    separations,
    unpaired: unpairedOf(forcings, separations, analysis),
    impulsive,
    toneMatches: toneMatches(analysis, forcings),
    levels,
    waysOut: waysOutOf({ ...context, forcings, separations }),
    specialist: specialistReasons({ circumstances, separations, forcings, levels, trust, thresholds }),
    cautions: cautionsFor({
      procedure: analysis.procedure,
      spotKind: settings.place?.kind,
      sourceKinds: sources.map((source) => source.kind),
      machineState: circumstances.machineState,
      visibleSway: circumstances.visibleSway,
    }),
    doubts,
    trust,
  };
}
