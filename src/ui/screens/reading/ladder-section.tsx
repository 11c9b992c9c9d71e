import { useMemo, useState } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { ModalValues } from '../../../core/model/guided-pairs.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import type { Source } from '../../../core/model/source.ts';
import { readingText } from '../../../text/reading-screen.ts';
import styles from './ladder-section.module.css';
import { LadderSheet } from './ladder-sheet.tsx';
import { NumberSheet } from './number-sheet.tsx';
import { PairList } from './pair-list.tsx';
import { firstPick, worstOfForcing, type Picked } from '../../../text/pairs.ts';
import type { ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';
import { useTried } from './use-tried.ts';
import { WaysOutSection } from './ways-out-section.tsx';

export interface LadderSectionProps {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly sources: readonly Source[];
  readonly judge: (analysis: Analysis, sources: readonly Source[]) => Judgement;
  readonly units: ReadingUnits;
  readonly modal?: ModalValues | undefined;
  readonly newSource: string;
  readonly paceLink: (frequencyHz: number) => string;
}

const pickedMode = (picked: Picked | undefined, judgement: Judgement): number | undefined => {
  if (picked?.kind === 'mode') return picked.index;
  if (picked?.kind === 'pair') return picked.mode;
  return picked?.kind === 'forcing' ? worstOfForcing(judgement, picked.index)?.modeIndex : undefined;
};

/** The main picture with all that answers to it: the pair picked, the numbers, the list, changes tried, ways out. */
export function LadderSection(props: LadderSectionProps) {
  const { analysis, judgement, sources, units, modal, newSource } = props;
  const measured = useMemo(() => ({ analysis, judgement }), [analysis, judgement]);
  const [picked, setPicked] = useState<Picked | undefined>(() =>
    firstPick(judgement, analysis.modes.length, analysis.tones.length),
  );
  const tried = useTried(measured, sources, props.judge);
  const wantedMode = tried.change?.modeIndex ?? pickedMode(picked, judgement) ?? 0;
  const modeIndex = Math.min(wantedMode, Math.max(0, analysis.modes.length - 1));
  // not drawn again while a slider moves: nothing in it changes then
  const words = useMemo(
    () => (
      <div class={styles.words}>
        <NumberSheet
          analysis={analysis}
          judgement={judgement}
          units={units}
          modeIndex={modeIndex}
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
        <WaysOutSection judgement={judgement} units={units} modal={modal} />
      </div>
    ),
    [analysis, judgement, units, modal, picked, modeIndex, newSource],
  );
  return (
    <div class={styles.section}>
      <div class={styles.picture}>
        <LadderSheet
          measured={measured}
          tried={tried}
          sources={sources}
          picked={picked}
          modeIndex={modeIndex}
          units={units}
          paceLink={props.paceLink}
          onPick={setPicked}
        />
      </div>
      {words}
    </div>
  );
}
