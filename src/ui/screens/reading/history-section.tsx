import type { EditFact, FieldValue } from '../../../core/model/fact.ts';
import { readingText } from '../../../text/reading-screen.ts';
import styles from './history-section.module.css';
import type { ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';
import { whenText } from './when-text.ts';

interface Event {
  readonly at: string;
  readonly device?: string;
  readonly text: string;
}

const editTexts = (edit: EditFact): string[] =>
  Object.entries(edit.set).map(([field, value]) => {
    const words = readingText.history;
    if (field === 'trashed') return value === true ? words.trashed : words.restored;
    const name = readingText.conflict.fields[field] ?? field;
    return value === null || value === '' ? words.cleared(name) : words.set(name, said(value));
  });

const said = (value: FieldValue): string =>
  typeof value === 'boolean' ? readingText.conflict[value ? 'yes' : 'no'] : String(value);

/** Everything that happened to this reading, newest first; nothing disappears from it. */
export function HistorySection({
  view,
  cases,
}: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
}) {
  const words = readingText.history;
  const events: Event[] = [
    { at: view.reading.recordedAt, text: words.recorded(view.reading.app.version) },
    ...view.history.flatMap((edit) =>
      editTexts(edit).map((text) => ({ at: edit.at, device: edit.device, text })),
    ),
    ...view.results.map((result) => ({ at: result.at, text: words.redone(result.analysisVersion) })),
  ].sort((a, b) => b.at.localeCompare(a.at));
  return (
    <Section title={words.title} isFolded>
      <ol class={styles.events}>
        {events.map((event, index) => (
          <li key={index}>
            <span>{event.text}</span>
            <span class="note">
              {whenText(event.at)}
              {event.device && event.device !== cases.device ? `, ${event.device}` : ''}
            </span>
          </li>
        ))}
      </ol>
    </Section>
  );
}
