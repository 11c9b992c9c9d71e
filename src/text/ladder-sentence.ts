import type { Analysis } from '../core/model/analysis.ts';
import type { Judgement } from '../core/model/judgement.ts';
import { readingText } from './reading-screen.ts';
import { sourcesSentence } from './sentence.ts';
import { saidHz, type ReadingUnits } from './reading-units.ts';
import { likelyHz } from './true-frequency.ts';

/** What the ladder shows, for those who do not see it. */
export function ladderSentence(analysis: Analysis, judgement: Judgement, units: ReadingUnits): string {
  const { ladder } = readingText;
  const [low, high] = analysis.recording.usableBandHz;
  const modes = ladder.modesSaid(analysis.modes.map((mode) => saidHz(units, likelyHz(mode))).join(', '));
  const blind = `${ladder.blindBelow(saidHz(units, low))}, ${ladder.blindAbove(saidHz(units, high))}.`;
  return ladder.sentence(
    `${modes} ${ladder.forcingsSaid(judgement.forcings.length)}`,
    `${sourcesSentence(analysis, judgement) ?? ''} ${blind.charAt(0).toUpperCase()}${blind.slice(1)}`.trim(),
  );
}
