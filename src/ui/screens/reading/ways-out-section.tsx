import { belongsToMode } from '../../../app/reading-desk.ts';
import type { ModalValues } from '../../../core/model/guided-pairs.ts';
import type { Judgement, WayOut } from '../../../core/model/judgement.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { forcingName } from '../../../text/sources.ts';
import { verdictWord } from '../../../text/verdicts.ts';
import { wayOutName, wayOutSentence } from '../../../text/ways-out.ts';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { sentenceCase } from './pair-card.tsx';
import { saidHz, type ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';
import styles from './ways-out-section.module.css';

/** Beyond these the pairs differ too little to be worth another list; the ladder's sliders try any change. */
const MOST_PAIRS = 6;

interface WaysProps {
  readonly judgement: Judgement;
  readonly units: ReadingUnits;
  readonly modal?: ModalValues | undefined;
}

/** What would move a pair apart, pair by pair, with what it does to the others. */
export function WaysOutSection(props: WaysProps) {
  const { judgement } = props;
  const pairs = [...new Set(judgement.waysOut.map((way) => way.separationIndex))];
  if (pairs.length === 0) return null;
  const first = pairs.slice(0, 1);
  const others = pairs.slice(1, MOST_PAIRS);
  return (
    <Section title={readingText.waysOut.title}>
      {first.map((index) => (
        <PairWays key={index} {...props} separationIndex={index} isNamed={pairs.length > 1} />
      ))}
      {others.length > 0 && (
        <details class={styles.others}>
          <summary>{readingText.waysOut.others(others.length)}</summary>
          {others.map((index) => (
            <PairWays key={index} {...props} separationIndex={index} isNamed />
          ))}
        </details>
      )}
    </Section>
  );
}

function PairWays(props: WaysProps & { readonly separationIndex: number; readonly isNamed: boolean }) {
  const { judgement, units, modal, separationIndex, isNamed } = props;
  const separation = judgement.separations[separationIndex];
  const forcing = separation && judgement.forcings[separation.forcingIndex];
  const itsModal = modal && separation && belongsToMode(modal, separation.modeHz) ? modal : undefined;
  const ways = judgement.waysOut.filter((way) => way.separationIndex === separationIndex);
  return (
    <div class={styles.pair}>
      {isNamed && separation && forcing && (
        <h3>
          {sentenceCase(readingText.pair.against(forcingName(forcing), saidHz(units, separation.modeHz)))}
        </h3>
      )}
      <ul class={styles.list}>
        {ways.map((way, index) => (
          <WayOutRow key={index} way={way} judgement={judgement} modal={itsModal} />
        ))}
      </ul>
    </div>
  );
}

function WayOutRow(props: {
  readonly way: WayOut;
  readonly judgement: Judgement;
  readonly modal: ModalValues | undefined;
}) {
  const { way, judgement, modal } = props;
  return (
    <li class={way.practical ? '' : styles.hard}>
      <div class={styles.name}>
        <b>{wayOutName(way.kind)}</b>
        <VerdictMark verdict={way.verdictAfter} word={verdictWord(way.verdictAfter)} />
      </div>
      <p>{wayOutSentence(way, judgement, modal)}</p>
    </li>
  );
}
