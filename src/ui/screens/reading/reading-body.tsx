import { useMemo, useState } from 'preact/hooks';
import { headlineSentence } from '../../../text/sentence.ts';
import { PLUS_MINUS_NOTE } from '../../../text/number.ts';
import { readingKind, readingText } from '../../../text/reading-screen.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button, LinkButton } from '../../components/button.tsx';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { Page } from '../../components/page.tsx';
import { CircumstancesSection } from './circumstances-section.tsx';
import { ConflictChoice } from './conflict-choice.tsx';
import { DoubtsSection } from './doubts-section.tsx';
import { HistorySection } from './history-section.tsx';
import { keptTogether } from './kept-together.ts';
import { LadderSection } from './ladder-section.tsx';
import { LevelsSection } from './levels-section.tsx';
import { NoModeAdvice } from './no-mode-advice.tsx';
import { NotesSection } from './notes-section.tsx';
import { PlotSections } from './plot-sections.tsx';
import styles from './reading-body.module.css';
import type { ReadingPageProps } from './reading-page-props.ts';
import { currentAnalysis, type ReadingView } from './reading-use-cases.ts';
import { RedoSection } from './redo-section.tsx';
import { SensorSection } from './sensor-section.tsx';
import { SourcesSection } from './sources-section.tsx';
import { SpecialistCall } from './specialist-call.tsx';
import { StateStrips } from './state-strips.tsx';
import { ToneOriginSection } from './tone-origin-section.tsx';
import { VerdictLead } from './verdict-lead.tsx';
import { whenText } from './when-text.ts';

type BodyProps = Omit<ReadingPageProps, 'id'> & { readonly view: ReadingView };

/** Where it was taken: asset and spot, which leads to the spot's history. */
function PlaceLine({ view, links }: Pick<BodyProps, 'view' | 'links'>) {
  const { site, asset, spot } = view.place;
  const label = view.entity.fields['label'];
  const name = typeof label === 'string' && label !== '' ? label : spot;
  const parts = [asset ?? site, name].filter((part) => part !== undefined);
  const text = parts.length === 0 ? readingText.unplaced : parts.join(' · ');
  return view.spotId ? <a href={links.spot(view.spotId)}>{text}</a> : <span>{text}</span>;
}

/** Sentence, picture, numbers, and everything else in the order in which people need it. */
export function ReadingBody({ view, cases, links, units, spotDialog }: BodyProps) {
  const [isNaming, setNaming] = useState(false);
  const { reading } = view;
  const analysis = currentAnalysis(view);
  const newSource = links.newSource(reading._id);
  const isRunning = analysis.procedure === 'running';
  const sources = useMemo(() => view.sources.map(({ source }) => source), [view.sources]);
  const judgement = useMemo(() => view.judge(analysis, sources), [view, analysis, sources]);
  return (
    <Page
      title={
        <span class={styles.title}>
          {keptTogether(headlineSentence(analysis, { frequencyUnit: units.frequency }))}
        </span>
      }
      over={
        <span class={styles.over}>
          <PlaceLine view={view} links={links} />
          <span>
            {readingKind(analysis)} ·{' '}
            <span class={styles.when}>{whenText(reading.recordedAt, reading.timeZone)}</span>
          </span>
        </span>
      }
      back={{ label: readingText.back, onClick: links.back }}
      aside={
        spotDialog && (
          <Button kind="quiet" onClick={() => setNaming(true)}>
            {view.spotId ? readingText.changeSpot : readingText.nameSpot}
          </Button>
        )
      }
    >
      {isNaming && spotDialog?.(reading._id, () => setNaming(false))}
      <div class={styles.body}>
        <StateStrips view={view} cases={cases} />
        <VerdictLead analysis={analysis} judgement={judgement} units={units} />
        {!isRunning && <NoModeAdvice analysis={analysis} />}
        <SpecialistCall reasons={judgement.specialist} />
        <LadderSection
          analysis={analysis}
          judgement={judgement}
          sources={sources}
          judge={view.judge}
          units={units}
          modal={view.modal}
          newSource={newSource}
          paceLink={links.pace}
        />
        <p class="note">{PLUS_MINUS_NOTE}</p>
        {isRunning && <NoModeAdvice analysis={analysis} />}
        <ConflictChoice view={view} cases={cases} />
        <div class={styles.columns}>
          <DoubtsSection analysis={analysis} judgement={judgement} />
          <LevelsSection view={view} cases={cases} analysis={analysis} judgement={judgement} units={units} />
        </div>
        <ToneOriginSection view={view} analysis={analysis} cases={cases} links={links} units={units} />
        <PlotSections view={view} cases={cases} units={units} />
        <div class={styles.columns}>
          <SourcesSection view={view} judgement={judgement} links={links} />
          <NotesSection view={view} cases={cases} />
          <SensorSection reading={reading} analysis={analysis} units={units} />
          <CircumstancesSection circumstances={reading.circumstances} />
          <RedoSection view={view} cases={cases} units={units} />
          <HistorySection view={view} cases={cases} />
        </div>
        <IndicativeLine text={readingText.indicativeNote} />
        <div class="row no-print">
          <LinkButton href={links.handOver(reading._id)}>{readingText.handOver}</LinkButton>
          {!view.entity.trashed && (
            <Button kind="quiet" onClick={() => void cases.trash(reading._id)}>
              {readingText.trash}
            </Button>
          )}
        </div>
      </div>
      <BottomBar>
        <Button onClick={() => links.again(view)}>{readingText.again}</Button>
        <Button kind="main" onClick={() => links.next(view)}>
          {readingText.next}
        </Button>
      </BottomBar>
    </Page>
  );
}
