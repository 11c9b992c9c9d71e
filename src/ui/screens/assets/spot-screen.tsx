/** A spot and its visits: what it rings at over time, whether that changed, and a new reading one tap away. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { placeOf, textField } from '../../../app/places.ts';
import type { OpenedReading, ReadingSummary } from '../../../app/ports.ts';
import { currentAnalysis } from '../../../app/readings.ts';
import { visitChange, type Visit as SurveyVisit } from '../../../app/survey-desk.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { changeSentence, conditionsSentence } from '../../../text/assets.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button, LinkButton } from '../../components/button.tsx';
import { IconStart } from '../../components/icons.tsx';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { Page } from '../../components/page.tsx';
import { PlacementDrawing } from '../../components/placement-drawing.tsx';
import { Rows } from '../../components/rows.tsx';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { LostScreen } from '../lost-screen.tsx';
import { usePlaceNames } from '../readings/place-names.ts';
import { ReadingRow } from '../readings/reading-row.tsx';
import { EditPlaceDialog } from './edit-place-dialog.tsx';
import { SpotPhotos } from './spot-photos.tsx';
import { VisitChart, type Visit } from './visit-chart.tsx';

const text = officeText.places;

export function SpotScreen({ app, id }: { readonly app: App; readonly id: string }) {
  const names = usePlaceNames(app);
  const { frequencyUnit } = useLive(app.settings);
  const loaded = useLoaded(
    app.store,
    async () => {
      const entity = await app.store.entity(id);
      return {
        entity: entity?.trashed ? undefined : entity,
        ...(await loadVisits(app, id)),
        where: await app.places.whereabouts({ spot: id }),
      };
    },
    [id],
  );
  const [isEditing, setIsEditing] = useState(false);
  if (!loaded) return null;
  const { entity, visits, opened, where } = loaded;
  if (!entity) return <LostScreen app={app} />;
  const back = () =>
    app.navigation.back(where.asset ? { screen: 'asset', id: where.asset } : { screen: 'assets' });
  const taps = visits.filter((visit) => visit.dampingRatio !== undefined);
  const first = taps[0];
  const last = taps.at(-1);
  const place = placeOf(entity);
  return (
    <Page
      over={[where.names.site, where.names.asset].filter(Boolean).join(' · ') || text.kinds.spot.name}
      title={textField(entity, 'name') ?? screenText.common.unnamed}
      back={{ label: screenText.common.back, onClick: back }}
      aside={
        <Button kind="quiet" onClick={() => setIsEditing(true)}>
          {screenText.common.edit}
        </Button>
      }
    >
      <div class="row">
        <PlacementDrawing kind={place.kind} small />
        <p class="quiet grow">{screenText.take.howToPlace[place.kind]}</p>
      </div>
      <SpotPhotos app={app} spot={id} />
      {visits.length === 0 && <p class="quiet">{text.noVisits}</p>}
      {taps.length > 1 && (
        <section class="stack">
          <h2>{text.overTime}</h2>
          {changeSince(opened).map((sentence) => (
            <p key={sentence}>{sentence}</p>
          ))}
          <VisitChart visits={taps.flatMap(toVisit)} unit={frequencyUnit} />
        </section>
      )}
      {visits.length > 0 && (
        <section class="stack">
          <h2>{text.visits}</h2>
          <Rows label={text.visits}>
            {[...visits].reverse().map((visit) => (
              <ReadingRow key={visit.id} names={names} app={app} reading={visit} />
            ))}
          </Rows>
          <div class="row">
            {first && last && first.id !== last.id && (
              <LinkButton href={app.navigation.href({ screen: 'compare', first: first.id, second: last.id })}>
                {text.compareFirstLast}
              </LinkButton>
            )}
            <LinkButton kind="quiet" href={app.navigation.href({ screen: 'series', id })}>
              {text.guidedPairs}
            </LinkButton>
          </div>
          <IndicativeLine text={INDICATIVE_LINE} />
        </section>
      )}
      <BottomBar>
        <LinkButton kind="main" href={app.navigation.href({ screen: 'take', spot: id })}>
          <IconStart />
          {text.takeHere}
        </LinkButton>
      </BottomBar>
      {isEditing && (
        <EditPlaceDialog app={app} entity={entity} onClose={() => setIsEditing(false)} onTrashed={back} />
      )}
    </Page>
  );
}

async function loadVisits(app: App, spot: string) {
  const visits = await app.places.visits(spot);
  const opened = await Promise.all(visits.map((visit) => app.readings.open(visit.id)));
  return { visits, opened: opened.filter((entry): entry is OpenedReading => entry !== undefined) };
}

const toSurveyVisit = (opened: OpenedReading): SurveyVisit => ({
  id: opened.reading._id,
  recordedAt: opened.reading.recordedAt,
  analysis: currentAnalysis(opened),
  circumstances: opened.reading.circumstances,
});

const strongest = <T extends { readonly earlierIndex: number }>(modes: readonly T[]): T | undefined =>
  [...modes].sort((a, b) => a.earlierIndex - b.earlierIndex)[0];

/** The strongest mode of the last visit against the first, and what was different. */
function changeSince(opened: readonly OpenedReading[]): readonly string[] {
  const history = opened.map(toSurveyVisit).filter((visit) => visit.analysis.modes.length > 0);
  const first = history[0];
  const last = history.at(-1);
  const change = first && last ? visitChange(first, last, history) : undefined;
  const mode = change && strongest(change.modes);
  const different = change && conditionsSentence(change);
  return [
    changeSentence(text.frequencySince, mode?.frequency),
    changeSentence(text.dampingSince, mode?.damping),
    ...(different ? [different] : []),
  ];
}

const toVisit = (visit: ReadingSummary): readonly Visit[] =>
  visit.frequencyHz === undefined
    ? []
    : [
        {
          id: visit.id,
          recordedAt: visit.recordedAt,
          frequencyHz: visit.frequencyHz,
          frequencySdHz: visit.frequencySdHz ?? 0,
          dampingRatio: visit.dampingRatio ?? 0,
          dampingRatioSd: visit.dampingRatioSd ?? 0,
        },
      ];
