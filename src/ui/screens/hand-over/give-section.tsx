import { useEffect, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Chosen, Form } from '../../../app/hand-over.ts';
import { handOverText as text } from '../../../text/hand-over.ts';
import { Choice } from '../../components/choice.tsx';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { FormRow } from './form-row.tsx';
import styles from './hand-over.module.css';
import { OutgoingCard } from './outgoing-card.tsx';
import { SingleForms } from './single-forms.tsx';

type Which = 'one' | 'chosen' | 'round' | 'all';

interface Option {
  readonly value: Which;
  readonly label: string;
  readonly ids: Chosen;
}

/** What to hand on, and as what; then the file with the ways it can go. */
export function GiveSection({ app, reading }: { readonly app: App; readonly reading?: string }) {
  const selection = useLive(app.selection);
  const outgoing = useLive(app.handOver.outgoing);
  const [which, setWhich] = useState<Which>();
  const options = useLoaded(app.store, () => optionsOf(app, reading, selection), [reading, selection]);
  const chosen = options?.find((option) => option.value === which) ?? options?.[0];
  useEffect(
    () => () => {
      // A finished file belongs to what was chosen here; one that is being made goes on.
      if (app.handOver.outgoing.get().phase !== 'making') app.handOver.clearOutgoing();
    },
    [app],
  );
  const make = (form: Form) => chosen && void app.handOver.make(chosen.ids, form);
  return (
    <section class="stack">
      <h2>{text.give}</h2>
      {options && !chosen && <p class="quiet">{text.none}</p>}
      {options && chosen && (
        <>
          <Choice
            legend={text.which}
            name="which"
            value={chosen.value}
            options={options}
            onChange={(value) => {
              app.handOver.clearOutgoing();
              setWhich(value);
            }}
          />
          <p>
            <a class={styles.chooseLink} href={app.navigation.href({ screen: 'readings' })}>
              {text.choose}
            </a>
          </p>
          {outgoing.phase === 'idle' ? (
            <>
              <ul class={styles.forms} aria-label={text.asWhat}>
                {(['report', 'packet', 'table'] as const).map((kind) => (
                  <FormRow key={kind} {...text.forms[kind]} onClick={() => make({ kind })} />
                ))}
              </ul>
              {chosen.ids !== 'all' && chosen.ids.length === 1 && <SingleForms onForm={make} />}
            </>
          ) : (
            <OutgoingCard app={app} outgoing={outgoing} />
          )}
          <p class="note">{text.giveLead}</p>
        </>
      )}
    </section>
  );
}

/** The narrowest choice first: that is what the person came with. */
async function optionsOf(
  app: App,
  reading: string | undefined,
  selection: readonly string[],
): Promise<readonly Option[]> {
  const all = await app.readings.list();
  const here = new Map(all.map((summary) => [summary.id, summary]));
  const chosen = selection.filter((id) => here.has(id));
  const round = (await app.rounds.current(new Date())).readings.map(({ id }) => id);
  const one = reading !== undefined && here.has(reading) ? await nameOf(app, reading) : undefined;
  const options: (Option | undefined)[] = [
    one === undefined || reading === undefined
      ? undefined
      : { value: 'one', label: text.whiches.one(one), ids: [reading] },
    chosen.length > 0
      ? { value: 'chosen', label: text.whiches.chosen(chosen.length), ids: chosen }
      : undefined,
    round.length > 0 ? { value: 'round', label: text.whiches.round(round.length), ids: round } : undefined,
    all.length > 0 ? { value: 'all', label: text.whiches.all(all.length), ids: 'all' } : undefined,
  ];
  return options.filter((option) => option !== undefined);
}

async function nameOf(app: App, id: string): Promise<string | undefined> {
  const opened = await app.readings.open(id);
  if (!opened) return undefined;
  const { names } = await app.readings.whereabouts(opened);
  const { label } = opened.entity.fields;
  return names.spot ?? (typeof label === 'string' && label ? label : text.thisReading);
}
