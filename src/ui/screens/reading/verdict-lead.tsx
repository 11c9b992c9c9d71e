import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { headlinePair, sourcesSentence } from '../../../text/sentence.ts';
import { verdictWord } from '../../../text/verdicts.ts';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { allDoubts } from '../../../text/all-doubts.ts';
import { AmplificationText } from './amplification-text.tsx';
import { sentenceCase } from './pair-card.tsx';
import type { ReadingUnits } from '../../../text/reading-units.ts';
import styles from './verdict-lead.module.css';

/** What drives it, right below what rings: mark, sentence, how much it would be amplified. */
export function VerdictLead(props: {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly units: ReadingUnits;
}) {
  const { analysis, judgement } = props;
  const pair = headlinePair(judgement.separations);
  // the mark says the verdict's word already
  const sentence = sourcesSentence(analysis, judgement)?.replace(/: \w+\.$/, '.');
  const trust = judgement.trust;
  return (
    <div class={styles.lead}>
      <p class={styles.said}>
        {pair && (
          <>
            <VerdictMark verdict={pair.verdict} word={`${sentenceCase(verdictWord(pair.verdict))}.`} />{' '}
          </>
        )}
        {sentence ?? readingText.pair.none} {pair && <AmplificationText separation={pair} />}
      </p>
      <p class={styles.trust}>
        {readingText.trust[trust]} {readingText.trustName},{' '}
        {readingText.doubtCount(allDoubts(analysis, judgement).length)}. {INDICATIVE_LINE}
      </p>
    </div>
  );
}
