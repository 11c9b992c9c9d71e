import type { App } from '../../../app/app.ts';
import type { ImportPreview, NewReading } from '../../../app/ports.ts';
import { handOverText as text, refusalReason } from '../../../text/hand-over.ts';
import { problemSentence } from '../../../text/problems.ts';
import { headlineSentence } from '../../../text/sentence.ts';
import { Button } from '../../components/button.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLive } from '../../use-live.ts';
import styles from './hand-over.module.css';

/** Named one by one; the rest is counted. */
const MOST_NAMED = 8;

/** What is in a packet: what is new, what is here, what is left out and why. Nothing has been taken yet. */
export function PreviewCard(props: {
  readonly app: App;
  readonly name: string;
  readonly preview: ImportPreview;
}) {
  const { app, name, preview } = props;
  const { newReadings, knownReadingCount, otherNewCount, newerCount, refused } = preview;
  const isNew = newReadings.length + otherNewCount + newerCount > 0;
  return (
    <>
      <p class={styles.fileName}>{name}</p>
      <ul class={styles.counts} role="status">
        {newReadings.length > 0 && <li class={styles.fresh}>{text.seen.fresh(newReadings.length)}</li>}
        {!isNew && <li class={styles.fresh}>{text.seen.nothingNew}</li>}
        {knownReadingCount > 0 && <li>{text.seen.known(knownReadingCount)}</li>}
        {otherNewCount > 0 && <li>{text.seen.others(otherNewCount)}</li>}
        {newerCount > 0 && <li>{text.seen.newer(newerCount)}</li>}
      </ul>
      <NewReadings app={app} readings={newReadings} />
      <LeftOut refused={refused} />
      <div class="row">
        {isNew && (
          <Button kind="main" onClick={() => void app.handOver.take()}>
            {text.take(newReadings.length)}
          </Button>
        )}
        <Button kind={isNew ? 'quiet' : 'plain'} onClick={() => app.handOver.clearIncoming()}>
          {isNew ? text.leave : text.close}
        </Button>
      </div>
    </>
  );
}

function NewReadings({ app, readings }: { readonly app: App; readonly readings: readonly NewReading[] }) {
  const { frequencyUnit } = useLive(app.settings);
  if (readings.length === 0) return null;
  return (
    <ul class={styles.named}>
      {readings.slice(0, MOST_NAMED).map((reading) => (
        <li key={reading.id}>
          <b>{reading.where[0] ?? text.seen.noPlace}</b>
          <span class="note">
            {[dayAndTime(reading.recordedAt), ...(reading.practice ? [text.seen.practice] : [])].join(' · ')}
          </span>
          <span>{headlineSentence(reading.analysis, { frequencyUnit })}</span>
        </li>
      ))}
      {readings.length > MOST_NAMED && <li class="quiet">{text.seen.more(readings.length - MOST_NAMED)}</li>}
    </ul>
  );
}

function LeftOut({ refused }: { readonly refused: ImportPreview['refused'] }) {
  if (refused.length === 0) return null;
  return (
    <details>
      <summary>{text.seen.refused(refused.length)}</summary>
      <ul class={styles.named}>
        {refused.slice(0, MOST_NAMED).map(({ name, problem }, index) => (
          <li key={index}>
            <span class={styles.fileName}>{name || text.seen.file}</span>
            <span>{refusalReason(problem.facts) ?? problemSentence(problem)}</span>
          </li>
        ))}
        {refused.length > MOST_NAMED && <li class="quiet">{text.seen.more(refused.length - MOST_NAMED)}</li>}
      </ul>
    </details>
  );
}
