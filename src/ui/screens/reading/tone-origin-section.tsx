import { useEffect, useState } from 'preact/hooks';
import { toneOrigins } from '../../../app/reading-desk.ts';
import type { Analysis } from '../../../core/model/analysis.ts';
import { toneOriginSentence } from '../../../text/assets.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { saidHz, type ReadingUnits } from '../../../text/reading-units.ts';
import { likelyHz } from '../../../text/true-frequency.ts';
import type { Counterpart, ReadingLinks, ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';
import { whenText } from './when-text.ts';

interface OriginProps {
  readonly view: ReadingView;
  readonly analysis: Analysis;
  readonly cases: ReadingUseCases;
  readonly links: ReadingLinks;
  readonly units: ReadingUnits;
}

/** Machine running against machine off at one spot: each tone of the running reading, and whose it is. */
export function ToneOriginSection({ view, analysis, cases, links, units }: OriginProps) {
  const [other, setOther] = useState<Counterpart>();
  const { procedure, circumstances } = view.reading;
  const isRunning = circumstances.machineState === 'running';
  useEffect(() => {
    let isCurrent = true;
    // without an answer the section stays as it is: what it adds can wait for the next opening
    const found = procedure === 'running' || procedure === 'ambient' ? cases.counterpart(view) : undefined;
    found?.then(
      (counterpart) => isCurrent && setOther(counterpart),
      () => undefined,
    );
    return () => {
      isCurrent = false;
    };
  }, [view, cases, procedure]);
  const words = readingText.origins;
  if (!other)
    return isRunning && procedure === 'running' && analysis.tones.length > 0 ? (
      <Section title={words.title}>
        <p class="note">{words.take}</p>
      </Section>
    ) : null;
  const running = isRunning ? analysis : other.analysis;
  const origins = toneOrigins(running, isRunning ? other.analysis : analysis);
  return (
    <Section title={words.title}>
      <ul class="stack stack-tight">
        {origins.map((origin) => {
          const tone = running.tones[origin.toneIndex];
          return (
            tone && (
              <li key={origin.toneIndex}>
                <b>{saidHz(units, likelyHz(tone))}</b>: {toneOriginSentence(origin)}
              </li>
            )
          );
        })}
      </ul>
      <p class="note">
        {words.against(isRunning, whenText(other.recordedAt))}{' '}
        <a href={links.reading(other.id)}>{words.open}</a>
      </p>
    </Section>
  );
}
