import type { App } from '../../../app/app.ts';
import { handOverText as text } from '../../../text/hand-over.ts';
import { Button } from '../../components/button.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';

/** A packet of everything, by one button; the file then waits in the first section. */
export function BackUpSection({ app }: { readonly app: App }) {
  const { phase } = useLive(app.handOver.outgoing);
  const state = useLoaded(
    app.store,
    async () => ({
      last: await app.handOver.lastBackUp(),
      count: (await app.readings.list()).length,
    }),
    [phase],
  );
  if (!state || state.count === 0) return null;
  const make = () => {
    void app.handOver.make('all', { kind: 'packet' });
    scrollTo({ top: 0 });
  };
  return (
    <section class="stack">
      <h2>{text.backUp}</h2>
      <p class="quiet">
        {text.backUpLead} {state.last ? text.backUpLast(dayAndTime(state.last)) : text.backUpNever}
      </p>
      <div class="row">
        <Button onClick={make} disabled={phase === 'making'}>
          {text.backUpMake}
        </Button>
      </div>
    </section>
  );
}
