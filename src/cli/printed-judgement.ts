import type { Analysis } from '../core/model/analysis.ts';
import type { Judgement } from '../core/model/judgement.ts';
import type { Place } from '../core/model/place.ts';
import type { Forcing, Source } from '../core/model/source.ts';
import { judge } from '../core/survey/judge.ts';
import { verdictSentence } from '../text/sentence.ts';

/** A forcing by its index in `forcings`, and by name for whoever reads the line. */
interface NamedForcing {
  readonly forcingIndex: number;
  readonly source: string;
  readonly forcing: string;
}

/** A judgement as the command prints it: forcings whole once; the separations stand in the analysis. */
export interface PrintedJudgement extends Omit<Judgement, 'separations' | 'unpaired' | 'toneMatches'> {
  /** The verdict sentence, as the app says it. */
  readonly verdict: string;
  readonly unpaired: readonly (NamedForcing & Pick<Judgement['unpaired'][number], 'verdict'>)[];
  /** Without a forcing: nothing entered explains the tone. */
  readonly toneMatches: readonly (Partial<NamedForcing> &
    Pick<Judgement['toneMatches'][number], 'toneIndex' | 'folded'>)[];
}

export interface PrintedSurvey {
  readonly separations: Judgement['separations'];
  readonly judgement: PrintedJudgement;
}

/**
 * What the sources (checked before) and the spot make of an analysis, for one line of the command.
 * @param place what the spot is; without it no level is held against a criterion
 */
export function printedSurvey(
  analysis: Analysis,
  sources: readonly Source[],
  place: Place | undefined,
): PrintedSurvey {
  const { separations, ...judgement } = judge(analysis, sources, {}, place ? { place } : {});
  const named = (forcingIndex: number, { source, label }: Forcing): NamedForcing => ({
    forcingIndex,
    source,
    forcing: label,
  });
  return {
    separations,
    judgement: {
      verdict: verdictSentence(analysis, { ...judgement, separations }),
      ...judgement,
      unpaired: judgement.unpaired.map(({ forcingIndex, forcing, verdict }) => ({
        ...named(forcingIndex, forcing),
        verdict,
      })),
      toneMatches: judgement.toneMatches.map(({ toneIndex, forcingIndex, forcing, folded }) => ({
        toneIndex,
        ...(forcing && forcingIndex !== undefined ? named(forcingIndex, forcing) : {}),
        folded,
      })),
    },
  };
}
