import { useRef, useState } from 'preact/hooks';
import { PROCEDURES, type Analysis, type AnalysisSettings } from '../../../core/model/analysis.ts';
import type { Problem } from '../../../core/model/problem.ts';
import { doubtText } from '../../../text/doubts.ts';
import { formatDamping } from '../../../text/quantity.ts';
import { problemSentence } from '../../../text/problems.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { trustWord } from '../../../text/sentence.ts';
import { Button } from '../../components/button.tsx';
import { SelectField } from '../../components/field.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { allDoubts } from '../../../text/all-doubts.ts';
import { sentenceCase } from './pair-card.tsx';
import { saidHz, type ReadingUnits } from '../../../text/reading-units.ts';
import { currentAnalysis, type ReadingUseCases, type ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';
import styles from './redo-section.module.css';
import { likelyDampingRatio, likelyHz } from '../../../text/true-frequency.ts';
import { whenText } from './when-text.ts';

interface RedoProps {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
  readonly units: ReadingUnits;
}

type Redo =
  | { readonly phase: 'idle' }
  | { readonly phase: 'working' }
  | { readonly phase: 'failed'; readonly problem: Problem }
  | { readonly phase: 'done'; readonly analysis: Analysis };

/** The analysis made again from the stored samples, beside what is kept; keeping it is a choice, and the first stays. */
export function RedoSection({ view, cases, units }: RedoProps) {
  const words = readingText.redo;
  const kept = currentAnalysis(view);
  const [settings, setSettings] = useState<AnalysisSettings>(kept.settings);
  const [redo, setRedo] = useState<Redo>({ phase: 'idle' });
  const stop = useRef<AbortController | undefined>(undefined);
  const run = async () => {
    stop.current = new AbortController();
    setRedo({ phase: 'working' });
    const outcome = await cases.analyse(view, settings, stop.current.signal);
    if (stop.current.signal.aborted) return;
    setRedo(
      outcome.ok
        ? { phase: 'done', analysis: outcome.value.analysis }
        : { phase: 'failed', problem: outcome.problem },
    );
  };
  const cancel = () => {
    stop.current?.abort();
    setRedo({ phase: 'idle' });
  };
  const last = view.results.at(-1);
  return (
    <Section title={words.title} isFolded>
      <p>
        {last
          ? words.madeAgain(last.analysisVersion, whenText(last.at))
          : words.made(kept.version, whenText(view.reading.recordedAt, view.reading.timeZone))}
      </p>
      <SelectField
        label={words.procedure}
        value={settings.procedure}
        options={[
          { value: 'auto' as const, label: words.auto },
          ...PROCEDURES.map((value) => ({ value, label: sentenceCase(readingText.procedureName(value)) })),
        ]}
        onChange={(procedure) => setSettings({ ...settings, procedure })}
      />
      <SelectField
        label={words.timing}
        value={settings.timing}
        options={(['auto', 'stamps', 'clock'] as const).map((value) => ({
          value,
          label: words.timings[value],
        }))}
        onChange={(timing) => setSettings({ ...settings, timing })}
      />
      {redo.phase === 'working' ? (
        <>
          <p role="status">{words.working}</p>
          <ProgressLine label={words.working} />
          <Button onClick={cancel}>{words.cancel}</Button>
        </>
      ) : (
        <Button onClick={() => void run()}>{words.run}</Button>
      )}
      {redo.phase === 'failed' && (
        <p role="alert">
          {words.failed}: {problemSentence(redo.problem)}
        </p>
      )}
      {redo.phase === 'done' && (
        <Beside
          kept={kept}
          fresh={redo.analysis}
          units={units}
          onKeep={() => {
            void cases.keepAnalysis(view.reading._id, redo.analysis).then(() => setRedo({ phase: 'idle' }));
          }}
          onDrop={() => setRedo({ phase: 'idle' })}
        />
      )}
    </Section>
  );
}

type Row = readonly [name: string, kept: string, fresh: string];

function comparedRows(kept: Analysis, fresh: Analysis, units: ReadingUnits): Row[] {
  const words = readingText.redo;
  const both = (name: string, said: (analysis: Analysis) => string): Row => [name, said(kept), said(fresh)];
  const modeCount = Math.max(kept.modes.length, fresh.modes.length);
  const modes = Array.from({ length: modeCount }, (_, i): Row[] => {
    const of = (name: string) => (modeCount > 1 ? `${name}, ${words.mode(i + 1)}` : name);
    return [
      both(of(words.rows.frequency), ({ modes: list }) => {
        const mode = list[i];
        return mode ? saidHz(units, likelyHz(mode), mode.frequencySdHz) : words.nothing;
      }),
      both(of(words.rows.damping), ({ modes: list }) => {
        const mode = list[i];
        return mode ? formatDamping(likelyDampingRatio(mode), mode.dampingRatioSd) : words.nothing;
      }),
    ];
  }).flat();
  const tones = Array.from({ length: Math.max(kept.tones.length, fresh.tones.length) }, (_, i) =>
    both(`${readingText.spectrum.tone} ${i + 1}`, ({ tones: list }) => {
      const tone = list[i];
      return tone ? saidHz(units, likelyHz(tone), tone.frequencySdHz) : words.nothing;
    }),
  );
  return [
    both(words.rows.version, ({ version }) => String(version)),
    both(words.rows.procedure, ({ procedure }) => readingText.procedureName(procedure)),
    both(words.rows.timing, ({ recording }) => readingText.sensor.timing(recording.timing.model)),
    ...modes,
    ...tones,
    both(words.rows.trust, ({ trust }) => trustWord(trust)),
    both(
      words.rows.doubts,
      (analysis) =>
        allDoubts(analysis)
          .map((doubt) => doubtText(doubt).name)
          .join(', ') || words.nothing,
    ),
  ];
}

function Beside(props: {
  readonly kept: Analysis;
  readonly fresh: Analysis;
  readonly units: ReadingUnits;
  readonly onKeep: () => void;
  readonly onDrop: () => void;
}) {
  const words = readingText.redo;
  const rows = comparedRows(props.kept, props.fresh, props.units);
  const isSame = rows.every(([, kept, fresh]) => kept === fresh);
  return (
    <div class={styles.beside} role="status">
      <table>
        <caption>{isSame ? words.same : words.beside}</caption>
        <thead>
          <tr>
            <td />
            <th scope="col">{words.head[1]}</th>
            <th scope="col">{words.head[2]}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(([name, kept, fresh]) => (
            <tr key={name} class={kept === fresh ? '' : styles.changed}>
              <th scope="row">{name}</th>
              <td>{kept}</td>
              <td>{fresh}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div class="row">
        {!isSame && (
          <Button kind="main" onClick={props.onKeep}>
            {words.keep}
          </Button>
        )}
        <Button onClick={props.onDrop}>{words.drop}</Button>
      </div>
    </div>
  );
}
