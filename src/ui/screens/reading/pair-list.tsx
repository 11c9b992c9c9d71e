import { useState } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement, Separation, Verdict } from '../../../core/model/judgement.ts';
import { formatInterval } from '../../../text/number.ts';
import { formatFrequencyRange } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { forcingName } from '../../../text/sources.ts';
import { unpairedText, verdictWord } from '../../../text/verdicts.ts';
import { Button, LinkButton } from '../../components/button.tsx';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { timesText } from './amplification-text.tsx';
import { sentenceCase } from './pair-card.tsx';
import styles from './pair-list.module.css';
import { forcingVerdict, pairRows, type PairRow, type Picked } from '../../../text/pairs.ts';
import { saidHz, type ReadingUnits } from '../../../text/reading-units.ts';

/** Enough to see what matters without scrolling past twenty harmonics. */
const FIRST_ROWS = 5;

interface PairListProps {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly picked: Picked | undefined;
  readonly units: ReadingUnits;
  readonly newSource: string;
  readonly onPick: (picked: Picked) => void;
}

/** The ladder in words: every forcing with its worst mode, ratio and amplification; a row picks its pair. */
export function PairList(props: PairListProps) {
  const { judgement, newSource } = props;
  const [isWhole, setWhole] = useState(false);
  const rows = pairRows(judgement);
  if (rows.length === 0)
    return (
      <>
        <p>
          {readingText.pair.none} {readingText.pair.noneNote}
        </p>
        <LinkButton href={newSource}>{readingText.sources.add}</LinkButton>
      </>
    );
  const shown = isWhole ? rows : rows.slice(0, FIRST_ROWS);
  return (
    <>
      <ul class={styles.list}>
        {shown.map((row) => (
          <li key={row.forcingIndex}>
            <PairRowButton {...props} row={row} />
          </li>
        ))}
      </ul>
      {rows.length > FIRST_ROWS && (
        <Button kind="quiet" onClick={() => setWhole(!isWhole)}>
          {isWhole ? readingText.pair.fewer : readingText.pair.more(rows.length - FIRST_ROWS)}
        </Button>
      )}
    </>
  );
}

type RowProps = PairListProps & { readonly row: PairRow };

/** Where the fold is undecided, the verdict if there is none: what a person would plan by. */
const faceValue = ({ atFaceValue }: Separation): string =>
  atFaceValue ? `, ${readingText.pair.faceValue(verdictWord(atFaceValue))}` : '';

/** What the row says after the forcing's frequency: the pair, or why there is none. */
function rowDetail({ row, analysis, judgement, units }: RowProps, verdict: Verdict | undefined): string {
  const { separation, unpaired } = row;
  if (verdict === 'blind') return `. ${unpairedText('blind').meaning}`;
  if (separation)
    return `${faceValue(separation)}, ${readingText.pair.rowDetail(formatInterval(separation.ratio), saidHz(units, separation.modeHz), timesText(separation.amplification.interval))}`;
  const match = judgement.toneMatches.find(({ forcingIndex }) => forcingIndex === row.forcingIndex);
  const tone = match && analysis.tones[match.toneIndex];
  if (tone) return `, ${readingText.pair.toneFits(saidHz(units, tone.frequencyHz), match.folded)}`;
  return unpaired ? `, ${unpairedText(unpaired).word}` : '';
}

function PairRowButton(props: RowProps) {
  const { row, judgement, picked, onPick, units } = props;
  const forcing = judgement.forcings[row.forcingIndex];
  if (!forcing) return null;
  const { separation } = row;
  const verdict = forcingVerdict(judgement, row.forcingIndex);
  const isPicked =
    (picked?.kind === 'forcing' && picked.index === row.forcingIndex) ||
    (picked?.kind === 'pair' && picked.forcing === row.forcingIndex);
  return (
    <button
      type="button"
      class={styles.row}
      aria-pressed={isPicked}
      onClick={() =>
        onPick(
          separation
            ? { kind: 'pair', forcing: row.forcingIndex, mode: separation.modeIndex }
            : { kind: 'forcing', index: row.forcingIndex },
        )
      }
    >
      <span class={styles.name}>
        {sentenceCase(forcingName(forcing))}
        <span class="note">
          {formatFrequencyRange(forcing.frequencyHz, units.frequency)}
          {rowDetail(props, verdict)}
        </span>
      </span>
      {verdict && <VerdictMark verdict={verdict} word={verdictWord(verdict)} />}
    </button>
  );
}
