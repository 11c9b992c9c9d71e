/** One source: its form, and the forcings that follow from it on a small ladder while it is typed. */
import { useMemo, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Route } from '../../../app/route.ts';
import type { KnownSource } from '../../../app/sources.ts';
import { currentPlaceIds } from '../../../app/readings.ts';
import { KNOWN_BY, type Source } from '../../../core/model/source.ts';
import { forcingsOf, parseSource } from '../../../app/survey-desk.ts';
import { problemSentence } from '../../../text/problems.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { knownByName, sourceKindName, unnamedSource } from '../../../text/sources.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { SelectField, TextField } from '../../components/field.tsx';
import { Page } from '../../components/page.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { LostScreen } from '../lost-screen.tsx';
import { ForcingLadder } from './forcing-ladder.tsx';
import { draftToData, emptyDraft, sourceToDraft, type SourceDraft } from './source-draft.ts';
import { HAS_KNOWN_BY, isFirst, SOURCE_FIELDS, type SourceField } from './source-fields.ts';
import { KindLinks } from './sources-screen.tsx';
import { SourceFieldInput } from './source-field-input.tsx';

const text = officeText.sources;

type SourceRoute = Route & { readonly screen: 'source' };

export function SourceScreen({ app, route }: { readonly app: App; readonly route: SourceRoute }) {
  const loaded = useLoaded(
    app.store,
    async () => {
      const known = route.id === 'new' ? undefined : await app.sources.open(route.id);
      const reading = route.reading ? await app.readings.open(route.reading) : undefined;
      const place = known ?? (reading ? currentPlaceIds(reading) : {});
      return { known, place: placeKey(place) };
    },
    [route.id],
  );
  if (route.id === 'new' && !route.kind) return <KindStep app={app} route={route} />;
  if (!loaded) return null;
  if (route.id !== 'new' && !loaded.known) return <LostScreen app={app} />;
  return (
    <SourceForm
      key={`${route.id} ${route.kind}`}
      app={app}
      route={route}
      known={loaded.known}
      place={loaded.place}
    />
  );
}

function KindStep({ app, route }: { readonly app: App; readonly route: SourceRoute }) {
  const { reading } = route;
  const back = () =>
    app.navigation.back(reading ? { screen: 'reading', id: reading } : { screen: 'sources' });
  return (
    <Page title={text.whichKind} back={{ label: screenText.common.back, onClick: back }}>
      <KindLinks app={app} {...(reading ? { reading } : {})} />
    </Page>
  );
}

const placeKey = (place: { readonly asset?: string; readonly site?: string }) =>
  place.asset ?? place.site ?? '';

function SourceForm(props: {
  readonly app: App;
  readonly route: SourceRoute;
  readonly known: KnownSource | undefined;
  readonly place: string;
}) {
  const { app, route, known } = props;
  const [draft, setDraft] = useState<SourceDraft>(
    known ? sourceToDraft(known.source) : emptyDraft(route.kind ?? 'machine'),
  );
  const [place, setPlace] = useState(props.place);
  const [isTried, setIsTried] = useState(false);
  const kindName = capital(sourceKindName(draft.kind));
  const parsed = useMemo(() => parseSource(draftToData(draft, unnamedSource(draft.kind)), 0), [draft]);
  const problem = parsed.ok ? undefined : problemSentence(parsed.problem);
  const change = (key: string, value: string) =>
    setDraft({ ...draft, typed: { ...draft.typed, [key]: value } });
  const fields = (list: readonly SourceField[]) =>
    list.map((field) => (
      <SourceFieldInput
        key={field.key}
        field={field}
        value={draft.typed[field.key] ?? ''}
        onChange={(value) => change(field.key, value)}
      />
    ));
  const leave = () =>
    app.navigation.back(route.reading ? { screen: 'reading', id: route.reading } : { screen: 'sources' });
  const save = async () => {
    if (!parsed.ok) return setIsTried(true);
    await app.sources.save(parsed.value, placeIds(place), known?.id);
    leave();
  };
  const trash = async () => {
    if (known) await app.readings.edit(known.id, { trashed: true }, text.trashed(known.source.name));
    leave();
  };
  return (
    <Page
      over={text.title}
      title={known ? known.source.name : kindName}
      back={{ label: screenText.common.back, onClick: leave }}
      {...(known
        ? {
            aside: (
              <Button kind="quiet" onClick={() => void trash()}>
                {screenText.common.remove}
              </Button>
            ),
          }
        : {})}
    >
      <div class="stack">{fields(SOURCE_FIELDS[draft.kind].filter(isFirst))}</div>
      {problem && isTried && <p role="alert">{problem}</p>}
      {parsed.ok ? <Preview source={parsed.value} /> : <p class="quiet">{text.previewLater}</p>}
      <details open={known !== undefined}>
        <summary>{text.more}</summary>
        <div class="stack">
          <TextField
            label={`${text.name} (${screenText.common.optional})`}
            value={draft.name}
            note={text.nameNote(unnamedSource(draft.kind))}
            onInput={(name) => setDraft({ ...draft, name })}
          />
          <PlaceSelect app={app} value={place} onChange={setPlace} />
          {HAS_KNOWN_BY.includes(draft.kind) && (
            <SelectField
              label={text.knownBy}
              note={text.knownByNote}
              value={draft.knownBy}
              options={[
                { value: '', label: screenText.common.notGiven },
                ...KNOWN_BY.map((value) => ({ value, label: knownByName(value) })),
              ]}
              onChange={(knownBy) => setDraft({ ...draft, knownBy })}
            />
          )}
          {fields(SOURCE_FIELDS[draft.kind].filter((field) => !isFirst(field)))}
        </div>
      </details>
      <BottomBar>
        <Button onClick={leave}>{screenText.common.cancel}</Button>
        <Button kind="main" onClick={() => void save()}>
          {screenText.common.save}
        </Button>
      </BottomBar>
    </Page>
  );
}

function Preview({ source }: { readonly source: Source }) {
  const forcings = useMemo(() => forcingsOf([source]), [source]);
  if (!forcings.ok) return <p role="alert">{problemSentence(forcings.problem)}</p>;
  return <ForcingLadder forcings={forcings.value} />;
}

function PlaceSelect(props: {
  readonly app: App;
  readonly value: string;
  readonly onChange: (value: string) => void;
}) {
  const tree = useLoaded(props.app.store, () => props.app.places.tree(), []);
  const sites = tree?.sites ?? [];
  const options = [
    { value: '', label: text.everywhere },
    ...sites.flatMap((site) => [
      { value: site.id, label: site.name },
      ...site.assets.map((asset) => ({ value: asset.id, label: `${site.name} · ${asset.name}` })),
    ]),
    ...(tree?.looseAssets ?? []).map((asset) => ({ value: asset.id, label: asset.name })),
  ];
  return (
    <SelectField
      label={text.place}
      note={text.placeNote}
      value={props.value}
      options={options}
      onChange={props.onChange}
    />
  );
}

const placeIds = (key: string) =>
  key.startsWith('asset:') ? { asset: key } : key.startsWith('site:') ? { site: key } : {};

const capital = (words: string) => words.charAt(0).toUpperCase() + words.slice(1);
