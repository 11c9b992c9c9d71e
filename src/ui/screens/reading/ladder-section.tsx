import { useCallback, useMemo, useState } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import type { Source } from '../../../core/model/source.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { Ladder } from '../../charts/ladder.tsx';
import { Button } from '../../components/button.tsx';
import { ladderSentence } from './ladder-sentence.ts';
import styles from './ladder-section.module.css';
import { NumberSheet } from './number-sheet.tsx';
import { PairCard } from './pair-card.tsx';
import { PairList } from './pair-list.tsx';
import { firstPick, forcingId, modeId, pickedIds, pickOf, toneId, type Picked } from './pairs.ts';
import { readingLadder } from './reading-ladder.ts';
import type { ReadingUnits } from './reading-units.ts';
import { Section } from './section.tsx';
import { TryPanel } from './try-panel.tsx';
import { WaysOutSection } from './ways-out-section.tsx';
import {
  triedAnalysis,
  triedSources,
  isNothingTried,
  nothingTried,
  presentSpeedRpm,
  type TriedChange,
} from './what-if.ts';

export interface LadderSectionProps {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly sources: readonly Source[];
  readonly judge: (analysis: Analysis, sources: readonly Source[]) => Judgement;
  readonly units: ReadingUnits;
  readonly newSource: string;
}

/** A ladder that stays in sight above the sliders is shorter. */
const TRYING_HEIGHT_PX = 300;

const currentId = (picked: Picked | undefined): string | undefined => {
  if (picked === undefined) return undefined;
  if (picked.kind === 'pair') return forcingId(picked.forcing);
  const idOf = { mode: modeId, forcing: forcingId, tone: toneId }[picked.kind];
  return idOf(picked.index);
};

/** The main picture with all that answers to it: the pair picked, the numbers, the list, changes tried, ways out. */
export function LadderSection(props: LadderSectionProps) {
  const { analysis, judgement, sources, judge, units } = props;
  const [picked, setPicked] = useState<Picked | undefined>(() =>
    firstPick(judgement, analysis.modes.length, analysis.tones.length),
  );
  const [tried, setTried] = useState<TriedChange | undefined>();
  const isTried = tried !== undefined && !isNothingTried(tried);
  const shown = useMemo(() => {
    if (!isTried) return { analysis, judgement };
    const changed = triedAnalysis(analysis, tried);
    return { analysis: changed, judgement: judge(changed, triedSources(sources, tried)) };
  }, [analysis, judgement, sources, judge, tried, isTried]);
  const content = useMemo(
    () =>
      readingLadder(shown.analysis, shown.judgement, units, isTried ? { analysis, judgement } : undefined),
    [shown, units, isTried, analysis, judgement],
  );
  const selected = useMemo(() => pickedIds(shown.judgement, picked), [shown.judgement, picked]);
  const pick = useCallback((id: string | undefined) => setPicked(pickOf(id)), []);
  const modeIndex = tried?.modeIndex ?? pickedMode(picked, shown.judgement) ?? 0;
  const canTry =
    analysis.modes.length > 0 &&
    (judgement.forcings.length > 0 || sources.some((source) => presentSpeedRpm(source) !== undefined));

  const { newSource } = props;
  const shownMode = Math.min(modeIndex, Math.max(0, analysis.modes.length - 1));
  // not drawn again while a slider moves: nothing in it changes then
  const words = useMemo(
    () => (
      <div class={styles.words}>
        <NumberSheet
          analysis={analysis}
          judgement={judgement}
          units={units}
          modeIndex={shownMode}
          onMode={(index) => setPicked({ kind: 'mode', index })}
        />
        <Section title={readingText.pair.list}>
          <PairList
            analysis={analysis}
            judgement={judgement}
            picked={picked}
            units={units}
            newSource={newSource}
            onPick={setPicked}
          />
        </Section>
        <WaysOutSection judgement={judgement} units={units} />
      </div>
    ),
    [analysis, judgement, units, picked, shownMode, newSource],
  );

  return (
    <div class={styles.section}>
      <div class={styles.picture}>
        <section
          class={`${styles.sheet} ${tried ? styles.trying : ''}`}
          aria-label={readingText.ladder.title}
        >
          <div class={styles.sticky}>
            <Ladder
              content={content}
              sentence={ladderSentence(shown.analysis, shown.judgement, units)}
              words={readingText.ladder}
              shownPerHz={units.frequency === 'r/min' ? 60 : 1}
              selected={selected}
              current={currentId(picked)}
              onPick={pick}
              {...(tried ? { heightPx: TRYING_HEIGHT_PX, isCompact: true } : {})}
            />
          </div>
          {tried ? (
            <TryPanel
              analysis={analysis}
              judgement={judgement}
              shown={shown}
              sources={sources}
              tried={tried}
              units={units}
              onChange={setTried}
              onClose={() => setTried(undefined)}
            />
          ) : (
            <>
              <PairCard analysis={analysis} judgement={judgement} picked={picked} units={units} />
              {canTry && (
                <div class="no-print">
                  <Button wide onClick={() => setTried(nothingTried(modeIndex))}>
                    {readingText.trying.open}
                  </Button>
                </div>
              )}
              <p class="note">{readingText.ladder.caption}</p>
            </>
          )}
        </section>
      </div>
      {words}
    </div>
  );
}

const pickedMode = (picked: Picked | undefined, judgement: Judgement): number | undefined => {
  if (picked?.kind === 'mode') return picked.index;
  if (picked?.kind === 'pair') return picked.mode;
  if (picked?.kind === 'forcing')
    return judgement.separations.find((separation) => separation.forcingIndex === picked.index)?.modeIndex;
  return undefined;
};
