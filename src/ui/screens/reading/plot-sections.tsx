import { useEffect, useState } from 'preact/hooks';
import type { Outcome } from '../../../core/model/outcome.ts';
import type { AnalysisResult } from '../../../core/model/pictures.ts';
import { problemSentence } from '../../../text/problems.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { ProgressLine } from '../../components/progress-line.tsx';
import { PassSection } from './pass-section.tsx';
import styles from './plot-sections.module.css';
import type { ReadingUnits } from '../../../text/reading-units.ts';
import { currentAnalysis, type ReadingUseCases, type ReadingView } from './reading-use-cases.ts';
import { RingDownSection } from './ring-down-section.tsx';
import { Section } from './section.tsx';
import { SpectrumSection } from './spectrum-section.tsx';
import { TraceSection } from './trace-section.tsx';

/** Pictures are worked out from the raw samples each time: what is drawn is what was recorded. */
function usePictures(view: ReadingView, cases: ReadingUseCases): Outcome<AnalysisResult> | undefined {
  const [outcome, setOutcome] = useState<Outcome<AnalysisResult> | undefined>();
  const [error, setError] = useState<unknown>();
  const { settings, version } = currentAnalysis(view);
  const id = view.reading._id;
  useEffect(() => {
    const stop = new AbortController();
    const work = async () => {
      try {
        const next = await cases.analyse(view, settings, stop.signal);
        if (!stop.signal.aborted) setOutcome(next);
      } catch (reason) {
        if (!stop.signal.aborted) setError(reason);
      }
    };
    void work();
    return () => stop.abort();
  }, [id, cases, settings.procedure, settings.timing, version]);
  if (error !== undefined) throw error;
  return outcome;
}

/** Spectrum, time trace, ring-downs or the pass, below the numbers. */
export function PlotSections(props: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
  readonly units: ReadingUnits;
}) {
  const { view, cases, units } = props;
  const outcome = usePictures(view, cases);
  if (outcome === undefined)
    return (
      <Section title={readingText.spectrum.title}>
        <p role="status">{readingText.plots.loading}</p>
        <ProgressLine label={readingText.plots.loading} />
      </Section>
    );
  if (!outcome.ok)
    return (
      <Section title={readingText.spectrum.title}>
        <p>
          {readingText.plots.failed} {problemSentence(outcome.problem)}
        </p>
      </Section>
    );
  const { analysis, pictures } = outcome.value;
  return (
    <div class={styles.plots}>
      <SpectrumSection analysis={analysis} pictures={pictures} units={units} axes={view.recording.axes} />
      {pictures.ringDowns.length > 0 && <RingDownSection ringDowns={pictures.ringDowns} units={units} />}
      {pictures.pass && analysis.coastdown && (
        <PassSection pass={pictures.pass} coastdown={analysis.coastdown} units={units} />
      )}
      <TraceSection analysis={analysis} pictures={pictures} units={units} axes={view.recording.axes} />
    </div>
  );
}
