import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { Button } from '../../components/button.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLoaded } from '../../use-loaded.ts';

const text = officeText.phone.log;

/** Errors of this phone, newest first; they leave it only when the person copies them. */
export function LogPart({ app }: { readonly app: App }) {
  const errors = useLoaded(app.store, async () => [...(await app.store.errorLog())].reverse(), []);
  if (!errors) return null;
  if (errors.length === 0) return <p class="quiet">{text.none}</p>;
  const copy = () => {
    const all = errors.map((entry) => `${entry.at} ${entry.message}\n${entry.detail}`).join('\n');
    navigator.clipboard.writeText(all).then(
      () => app.notices.show(text.copied),
      () => app.notices.show(text.notCopied, { tone: 'failure' }),
    );
  };
  return (
    <>
      <p class="quiet">{text.note}</p>
      <ul class="stack stack-tight">
        {errors.map((entry, index) => (
          <li key={index}>
            <span class="note">{dayAndTime(entry.at)}</span> {entry.message}
          </li>
        ))}
      </ul>
      <div class="row">
        <Button onClick={copy}>{text.copy}</Button>
      </div>
    </>
  );
}
