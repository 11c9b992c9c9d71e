import { useCallback, useEffect, useMemo, useRef } from 'preact/hooks';
import type { Source } from '../../../core/model/source.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { Ladder } from '../../charts/ladder.tsx';
import { Button } from '../../components/button.tsx';
import { ladderSentence } from '../../../text/ladder-sentence.ts';
import styles from './ladder-sheet.module.css';
import { PairCard } from './pair-card.tsx';
import { forcingId, modeId, pickedIds, pickOf, toneId, type Picked } from '../../../text/pairs.ts';
import { readingLadder } from '../../../text/reading-ladder.ts';
import type { ReadingUnits } from '../../../text/reading-units.ts';
import { TryPanel } from './try-panel.tsx';
import type { Judged, Tried } from './use-tried.ts';
import { nothingTried, presentSpeedRpm } from './what-if.ts';

interface LadderSheetProps {
  readonly measured: Judged;
  readonly tried: Tried;
  readonly sources: readonly Source[];
  readonly picked: Picked | undefined;
  /** The mode that a change would be tried on. */
  readonly modeIndex: number;
  readonly units: ReadingUnits;
  readonly paceLink: (frequencyHz: number) => string;
  readonly onPick: (picked: Picked | undefined) => void;
}

/** A ladder that stays in sight above the sliders is shorter. */
const TRYING_HEIGHT_PX = 300;

const currentId = (picked: Picked | undefined): string | undefined => {
  if (picked === undefined) return undefined;
  if (picked.kind === 'pair') return forcingId(picked.forcing);
  return { mode: modeId, forcing: forcingId, tone: toneId }[picked.kind](picked.index);
};

/** The ladder, and below it the pair that is picked or the sliders of a change. */
export function LadderSheet(props: LadderSheetProps) {
  const { measured, tried, sources, picked, units, onPick } = props;
  const { shown, before, change } = tried;
  const content = useMemo(
    () => readingLadder(shown.analysis, shown.judgement, units, before),
    [shown, before, units],
  );
  const selected = useMemo(() => pickedIds(shown.judgement, picked), [shown.judgement, picked]);
  const pick = useCallback((id: string | undefined) => onPick(pickOf(id)), [onPick]);
  return (
    <section class={`${styles.sheet} ${change ? styles.trying : ''}`} aria-label={readingText.ladder.title}>
      <div class={styles.sticky}>
        <Ladder
          content={content}
          sentence={ladderSentence(shown.analysis, shown.judgement, units)}
          words={readingText.ladder}
          shownPerHz={units.frequency === 'r/min' ? 60 : 1}
          selected={selected}
          current={currentId(picked)}
          onPick={pick}
          {...(change ? { heightPx: TRYING_HEIGHT_PX, isCompact: true } : {})}
        />
      </div>
      {change ? (
        <TryPanel
          measured={measured}
          shown={shown}
          sources={sources}
          tried={change}
          units={units}
          onChange={tried.set}
          onClose={() => tried.set(undefined)}
        />
      ) : (
        <>
          <PairCard
            analysis={measured.analysis}
            judgement={measured.judgement}
            picked={picked}
            units={units}
            paceLink={props.paceLink}
          />
          <TryButton {...props} />
          <p class="note">{readingText.ladder.caption}</p>
        </>
      )}
    </section>
  );
}

/** Opens the sliders; takes the focus back when they were closed, so that the keyboard goes on from here. */
function TryButton({ measured, sources, modeIndex, tried }: LadderSheetProps) {
  const place = useRef<HTMLDivElement>(null);
  const { hasClosed } = tried;
  useEffect(() => {
    if (hasClosed) place.current?.querySelector('button')?.focus({ preventScroll: true });
  }, []);
  const canTry =
    measured.analysis.modes.length > 0 &&
    (measured.judgement.forcings.length > 0 ||
      sources.some((source) => presentSpeedRpm(source) !== undefined));
  if (!canTry) return null;
  return (
    <div ref={place} class="no-print">
      <Button wide onClick={() => tried.set(nothingTried(modeIndex))}>
        {readingText.trying.open}
      </Button>
    </div>
  );
}
