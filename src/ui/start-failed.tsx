import { screenText } from '../text/screens.ts';

const text = screenText.startFailed;

/** The store could not be opened: without it nothing can be kept, so nothing is begun. Recognised by code. */
export function StartFailed({ error }: { readonly error: unknown }) {
  const code = typeof error === 'object' && error !== null && 'code' in error ? String(error.code) : '';
  const detail = error instanceof Error ? `${error.name}: ${error.message}` : '';
  const note = code in text.notes ? text.notes[code as keyof typeof text.notes] : text.notes.unavailable;
  return (
    <main style={{ padding: '1.5rem', maxWidth: '40rem' }} class="stack">
      <h1>{text.title}</h1>
      <p role="alert">{note}</p>
      {detail && <p class="note">{detail}</p>}
    </main>
  );
}
