/** All readings, or the trash: find, select many, act on them at once. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { ReadingSummary } from '../../../app/ports.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { CheckField, TextField } from '../../components/field.tsx';
import { Page } from '../../components/page.tsx';
import { Rows } from '../../components/rows.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { PickSpotDialog } from '../assets/pick-spot-dialog.tsx';
import { usePlaceNames } from './place-names.ts';
import { ReadingRow } from './reading-row.tsx';
import { useShownCount } from './use-shown-count.ts';

const text = screenText.readings;

export function ReadingsScreen({ app, trashed }: { readonly app: App; readonly trashed: boolean }) {
  const names = usePlaceNames(app);
  const [search, setSearch] = useState('');
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set());
  const [isSelecting, setIsSelecting] = useState(false);
  const readings = useLoaded(
    app.store,
    () => app.readings.list({ ...(search.trim() ? { text: search.trim() } : {}), trashed }),
    [search, trashed],
  );
  const newer = useLoaded(app.store, () => app.store.newerReadings(), []);
  const { shown, sentinel } = useShownCount(readings?.length ?? 0, search);
  const stop = () => {
    setSelected(new Set());
    setIsSelecting(false);
  };
  const toggle = (id: string, on: boolean) => {
    const next = new Set(selected);
    if (on) next.add(id);
    else next.delete(id);
    setSelected(next);
  };
  return (
    <Page
      title={trashed ? text.trashTitle : text.title}
      back={{ label: screenText.common.back, onClick: () => app.navigation.back({ screen: 'start' }) }}
      aside={
        <div class="row">
          {!trashed && (
            <a href={app.navigation.href({ screen: 'readings', trashed: true })}>{text.openTrash}</a>
          )}
          <Button
            kind="quiet"
            pressed={isSelecting}
            onClick={() => (isSelecting ? stop() : setIsSelecting(true))}
          >
            {text.select}
          </Button>
        </div>
      }
    >
      <TextField type="search" label={text.search} value={search} onInput={setSearch} />
      {isSelecting && (
        <p class="note" role="status">
          {text.selected(selected.size)}
        </p>
      )}
      {isSelecting && (
        <CheckField
          label={text.selectAll}
          checked={readings !== undefined && readings.length > 0 && selected.size === readings.length}
          onChange={(on) => setSelected(new Set(on ? readings?.map((reading) => reading.id) : []))}
        />
      )}
      {newer !== undefined && newer.length > 0 && <p class="note">{text.newer(newer.length)}</p>}
      {readings?.length === 0 && <p class="quiet">{search ? text.noneFound : text.none}</p>}
      {readings && readings.length > 0 && (
        <Rows label={text.title}>
          {readings.slice(0, shown).map((reading) => (
            <ReadingRow
              key={reading.id}
              names={names}
              app={app}
              reading={reading}
              {...(isSelecting
                ? { select: { checked: selected.has(reading.id), onChange: (on) => toggle(reading.id, on) } }
                : {})}
            />
          ))}
        </Rows>
      )}
      <div ref={sentinel} />
      {isSelecting && selected.size > 0 && (
        <Actions app={app} trashed={trashed} chosen={chosen(readings, selected)} onDone={stop} />
      )}
    </Page>
  );
}

const chosen = (readings: readonly ReadingSummary[] | undefined, selected: ReadonlySet<string>) =>
  (readings ?? []).filter((reading) => selected.has(reading.id));

function Actions(props: {
  readonly app: App;
  readonly trashed: boolean;
  readonly chosen: readonly ReadingSummary[];
  readonly onDone: () => void;
}) {
  const { app, onDone } = props;
  const [open, setOpen] = useState<'spot' | 'erase'>();
  const ids = props.chosen.map((reading) => reading.id);
  const act = (work: Promise<unknown>) => void work.then(onDone);
  const [first, second] = props.chosen;
  return (
    <BottomBar>
      {props.trashed ? (
        <>
          <Button kind="grave" onClick={() => setOpen('erase')}>
            {text.erase}
          </Button>
          <Button onClick={() => act(app.readings.restore(ids))}>{text.restore}</Button>
        </>
      ) : (
        <>
          <Button kind="grave" onClick={() => act(app.readings.trash(ids))}>
            {text.toTrash}
          </Button>
          <Button onClick={() => setOpen('spot')}>{text.setSpot}</Button>
          {ids.length === 2 && first && second && (
            <Button
              onClick={() => {
                const [older, newer] =
                  first.recordedAt < second.recordedAt ? [first, second] : [second, first];
                app.navigation.go({ screen: 'compare', first: older.id, second: newer.id });
              }}
            >
              {text.compare}
            </Button>
          )}
          <Button
            onClick={() => {
              app.selection.set(ids);
              app.navigation.go({ screen: 'hand-over' });
            }}
          >
            {text.export}
          </Button>
        </>
      )}
      {open === 'spot' && (
        <PickSpotDialog
          app={app}
          onClose={() => setOpen(undefined)}
          onPick={(where) => act(app.readings.setSpot(ids, where))}
        />
      )}
      {open === 'erase' && (
        <Dialog
          title={text.eraseTitle}
          onClose={() => setOpen(undefined)}
          actions={
            <>
              <Button onClick={() => setOpen(undefined)}>{screenText.common.cancel}</Button>
              <Button kind="grave" onClick={() => act(Promise.all(ids.map((id) => app.store.erase(id))))}>
                {text.erase}
              </Button>
            </>
          }
        >
          <p>{text.eraseNote(ids.length)}</p>
        </Dialog>
      )}
    </BottomBar>
  );
}
