import type { Analysis, Mode } from '../core/model/analysis.ts';
import type { Judgement } from '../core/model/judgement.ts';
import type { Forcing } from '../core/model/source.ts';
import type { LadderContent, LadderForcing, LadderMode, LadderTone } from '../core/picture/ladder-content.ts';
import { formatDamping } from './quantity.ts';
import { readingText } from './reading-screen.ts';
import { forcingId, forcingVerdict, modeId, toneId, worstOfForcing } from './pairs.ts';
import { saidHz, type ReadingUnits } from './reading-units.ts';
import { likelyDampingRatio, likelyHz, otherCandidatesHz } from './true-frequency.ts';

/** Short name for a mark: what tells it from the others first, since a long one is cut at its end; the source only where there are several. */
const shortForcing = (forcing: Forcing, isOnlySource: boolean): string =>
  forcing.sourceKind === 'footfall' ||
  forcing.sourceKind === 'traffic' ||
  (isOnlySource && forcing.sourceKind !== 'band')
    ? forcing.label
    : `${forcing.label} ${forcing.source}`.replace(/^band /, '');

const ladderMode = (mode: Mode, index: number, units: ReadingUnits, beforeHz?: number): LadderMode => {
  const isUnsure = mode.fold.verdict === 'undecided';
  const isFolded = mode.fold.verdict === 'folded';
  const dampingRatio = likelyDampingRatio(mode);
  return {
    id: modeId(index),
    frequencyHz: likelyHz(mode),
    frequencySdHz: mode.frequencySdHz,
    dampingRatio,
    title: saidHz(units, likelyHz(mode), mode.frequencySdHz).replace(/ ±.*/, ''),
    detail: isUnsure
      ? readingText.ladder.foldDetail
      : isFolded
        ? readingText.ladder.foldedDetail(saidHz(units, mode.frequencyHz))
        : formatDamping(dampingRatio, mode.dampingRatioSd).replace(/ ±.*/, ''),
    isUnsure,
    candidatesHz: otherCandidatesHz(mode),
    ...(beforeHz !== undefined && Math.abs(beforeHz / likelyHz(mode) - 1) > 1e-4 ? { beforeHz } : {}),
  };
};

const ladderForcing = (
  forcing: Forcing,
  index: number,
  judgement: Judgement,
  before: Forcing | undefined,
): LadderForcing => {
  const verdict = forcingVerdict(judgement, index);
  const worst = worstOfForcing(judgement, index);
  const isMoved =
    before !== undefined &&
    before.label === forcing.label &&
    Math.abs(before.frequencyHz[0] / forcing.frequencyHz[0] - 1) > 1e-3;
  return {
    id: forcingId(index),
    label: shortForcing(
      forcing,
      judgement.forcings.every(({ source }) => source === forcing.source),
    ),
    frequencyHz: forcing.frequencyHz,
    ...(verdict ? { verdict } : {}),
    ...(worst ? { modeId: modeId(worst.modeIndex) } : {}),
    ...(isMoved ? { beforeHz: before.frequencyHz } : {}),
  };
};

const ladderTones = (analysis: Analysis, units: ReadingUnits): LadderTone[] =>
  analysis.tones.map((tone, index) => ({
    id: toneId(index),
    frequencyHz: likelyHz(tone),
    label: readingText.ladder.tone(saidHz(units, likelyHz(tone))),
  }));

/** What the ladder of a reading shows; `before` is the reading as measured while a change is tried. */
export function readingLadder(
  analysis: Analysis,
  judgement: Judgement,
  units: ReadingUnits,
  before?: { readonly analysis: Analysis; readonly judgement: Judgement },
): LadderContent {
  const { ladder } = readingText;
  const [seenLowHz, seenHighHz] = analysis.recording.usableBandHz;
  return {
    modes: analysis.modes.map((mode, index) => {
      const former = before?.analysis.modes[index];
      return ladderMode(mode, index, units, former && likelyHz(former));
    }),
    forcings: judgement.forcings.map((forcing, index) =>
      ladderForcing(forcing, index, judgement, before?.judgement.forcings[index]),
    ),
    tones: ladderTones(analysis, units),
    broadPeaks: analysis.broadPeaks,
    seenHz: analysis.recording.usableBandHz,
    rateHz: analysis.recording.rateHz,
    words: {
      blindAbove: ladder.blindAbove(saidHz(units, seenHighHz)),
      blindBelow: ladder.blindBelow(saidHz(units, seenLowHz)),
      noMode: analysis.procedure === 'running' ? ladder.noModeRunning : ladder.noMode,
      structure: ladder.structure,
      sources: ladder.sources,
      unit: units.frequency,
      amplification: ladder.amplification,
    },
  };
}
