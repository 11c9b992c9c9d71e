import type { App } from '../../../app/app.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { useLive } from '../../use-live.ts';

const text = screenText.update;

/** A newer version waits for the person; it never comes by itself and never while something records. */
export function UpdateNote({ app }: { readonly app: App }) {
  if (useLive(app.update.state) !== 'waiting') return null;
  const take = async () => {
    if (!(await app.update.take())) app.notices.show(text.busy);
  };
  return (
    <section class="row row-apart" role="status">
      <p>{text.waiting}</p>
      <Button onClick={() => void take()}>{text.take}</Button>
    </section>
  );
}
