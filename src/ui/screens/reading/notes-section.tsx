import { useEffect, useMemo, useRef, useState } from 'preact/hooks';
import { readingText } from '../../../text/reading-screen.ts';
import styles from './notes-section.module.css';
import type { ReadingPhoto, ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';

/** Kept this long after the last key: one edit a pause, not one a letter. */
const PAUSE_MS = 900;

const textOf = (view: ReadingView, field: string): string => {
  const value = view.entity.fields[field];
  return typeof value === 'string' ? value : '';
};

/** A field that is kept as one types; an edit that came meanwhile from elsewhere shows when this field is not in use. */
function KeptText(props: {
  readonly id: string;
  readonly label: string;
  readonly kept: string;
  readonly isLong?: boolean;
  readonly onKeep: (value: string) => void;
}) {
  const { id, label, kept } = props;
  const [typed, setTyped] = useState<string | undefined>();
  const timer = useRef(0);
  const latest = useRef({ typed, kept, onKeep: props.onKeep });
  latest.current = { typed, kept, onKeep: props.onKeep };
  const keep = () => {
    clearTimeout(timer.current);
    const now = latest.current;
    if (now.typed !== undefined && now.typed !== now.kept) now.onKeep(now.typed);
  };
  useEffect(() => keep, []);
  const field = {
    id,
    value: typed ?? kept,
    autocomplete: 'off' as const,
    onInput: (event: { readonly currentTarget: HTMLInputElement | HTMLTextAreaElement }) => {
      setTyped(event.currentTarget.value);
      clearTimeout(timer.current);
      timer.current = window.setTimeout(keep, PAUSE_MS);
    },
    onBlur: () => {
      keep();
      setTyped(undefined);
    },
  };
  return (
    <div class={styles.field}>
      <label for={id}>{label}</label>
      {props.isLong ? <textarea rows={3} {...field} /> : <input type="text" {...field} />}
    </div>
  );
}

/** Name, notes and photos: all edits, none of them touches what was measured. */
export function NotesSection({
  view,
  cases,
}: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
}) {
  const words = readingText.notes;
  const id = view.reading._id;
  const [hasFailed, setFailed] = useState(false);
  const onPhoto = async (event: { readonly currentTarget: HTMLInputElement }) => {
    const input = event.currentTarget;
    const image = input.files?.[0];
    if (!image) return;
    try {
      await cases.addPhoto(id, image);
      setFailed(false);
    } catch {
      setFailed(true);
    }
    input.value = '';
  };
  return (
    <Section title={words.title}>
      <KeptText
        id="reading-label"
        label={words.label}
        kept={textOf(view, 'label')}
        onKeep={(label) => void cases.edit(id, { label })}
      />
      <KeptText
        id="reading-notes"
        label={words.notes}
        kept={textOf(view, 'notes')}
        isLong
        onKeep={(notes) => void cases.edit(id, { notes })}
      />
      {view.photos.length > 0 && (
        <ul class={styles.photos}>
          {view.photos.map((photo, index) => (
            <Photo
              key={photo.id}
              photo={photo}
              number={index + 1}
              onRemove={() => void cases.removePhoto(photo.id)}
            />
          ))}
        </ul>
      )}
      <label class={`${styles.add} no-print`}>
        {words.photo}
        <input type="file" accept="image/*" capture="environment" onChange={(event) => void onPhoto(event)} />
      </label>
      {hasFailed && <p role="alert">{words.photoFailed}</p>}
    </Section>
  );
}

function Photo(props: {
  readonly photo: ReadingPhoto;
  readonly number: number;
  readonly onRemove: () => void;
}) {
  const { photo, number } = props;
  const url = useMemo(
    () => URL.createObjectURL(new Blob([photo.jpeg as Uint8Array<ArrayBuffer>], { type: 'image/jpeg' })),
    [photo],
  );
  useEffect(() => () => URL.revokeObjectURL(url), [url]);
  return (
    <li>
      <img src={url} alt={readingText.notes.photoAlt(number)} />
      <button
        type="button"
        class="no-print"
        aria-label={readingText.notes.removePhoto(number)}
        onClick={props.onRemove}
      >
        ×
      </button>
    </li>
  );
}
