import type { App } from '../../../app/app.ts';
import { openConflicts, settle, type OpenConflict } from '../../../app/conflicts.ts';
import { teamStoreText as text } from '../../../text/team-store.ts';
import { Button } from '../../components/button.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLoaded } from '../../use-loaded.ts';
import styles from './team-store.module.css';

type Version = OpenConflict['versions'][number];

/** What was written twice, anywhere: both versions side by side, and a person chooses. */
export function ConflictSection({ app }: { readonly app: App }) {
  const conflicts = useLoaded(app.store, () => openConflicts(app.store), []);
  if (!conflicts || conflicts.length === 0) return null;
  return (
    <section class="stack">
      <h2>{text.conflicts(conflicts.length)}</h2>
      <p class="quiet">{text.conflictsLead}</p>
      <ul class="stack">
        {conflicts.map((conflict) => (
          <li key={`${conflict.entity} ${conflict.field}`} class={styles.card}>
            <h3>{text.conflictOf(conflict.kind, conflict.name, conflict.field)}</h3>
            <ul class={styles.versions}>
              {conflict.versions.map((version) => (
                <VersionCard
                  key={version.edit}
                  version={version}
                  said={text.valueWithUnit(conflict.field, saidValue(version))}
                  onKeep={() =>
                    void settle(app.store, conflict, version.value).catch((error: unknown) =>
                      app.noteError(error),
                    )
                  }
                />
              ))}
            </ul>
          </li>
        ))}
      </ul>
    </section>
  );
}

function VersionCard({
  version,
  said,
  onKeep,
}: {
  readonly version: Version;
  readonly said: string;
  readonly onKeep: () => void;
}) {
  return (
    <li class={styles.version}>
      <p class={styles.value}>{said}</p>
      <p class="note">
        {version.isHere ? text.writtenHere : text.writtenBy(version.device)}, {dayAndTime(version.at)}
      </p>
      <Button label={text.keepLabel(said)} onClick={onKeep}>
        {text.keepThis}
      </Button>
    </li>
  );
}

function saidValue({ value, named }: Version): string {
  if (named !== undefined) return named;
  if (value === null || value === '') return text.empty;
  if (typeof value === 'boolean') return value ? text.yes : text.no;
  if (Array.isArray(value)) return value.map(String).join(' – ');
  return typeof value === 'object' ? JSON.stringify(value) : String(value);
}
