import { readingText } from '../../../text/reading-screen.ts';
import { Button } from '../../components/button.tsx';
import type { ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';
import styles from './conflict-choice.module.css';
import { whenText } from './when-text.ts';

const said = (value: unknown): string =>
  typeof value === 'string' && value !== ''
    ? value
    : value == null || value === ''
      ? readingText.conflict.empty
      : JSON.stringify(value);

/** Edits written unknown to each other: both shown, a person chooses, and the choice replaces both. */
export function ConflictChoice({
  view,
  cases,
}: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
}) {
  const words = readingText.conflict;
  return (
    <>
      {Object.entries(view.entity.conflicts).map(([field, versions]) => (
        <Section key={field} title={words.title(words.fields[field] ?? field)}>
          <p>{words.note}</p>
          <ul class={styles.versions}>
            {versions.map((version) => (
              <li key={version.edit}>
                <p class={styles.value}>{said(version.value)}</p>
                <p class="note">
                  {words.by(
                    version.device === cases.device ? words.here : version.device,
                    whenText(version.at),
                  )}
                </p>
                <Button
                  label={words.keep(said(version.value))}
                  onClick={() => void cases.edit(view.reading._id, { [field]: version.value })}
                >
                  {words.keep(said(version.value).slice(0, 24))}
                </Button>
              </li>
            ))}
          </ul>
        </Section>
      ))}
    </>
  );
}
