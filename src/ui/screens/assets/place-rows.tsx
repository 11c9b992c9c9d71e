import type { App } from '../../../app/app.ts';
import type { Asset, PlaceTree, Spot } from '../../../app/places.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Row, Rows } from '../../components/rows.tsx';

const text = officeText.places;

export const AssetRows = (props: {
  readonly app: App;
  readonly assets: readonly Asset[];
  readonly current?: string;
  readonly label: string;
}) => (
  <Rows label={props.label}>
    {props.assets.map((asset) => (
      <Row
        key={asset.id}
        href={props.app.navigation.href({ screen: 'asset', id: asset.id })}
        title={asset.name || screenText.common.unnamed}
        note={text.spotCount(asset.spots.length)}
        isCurrent={asset.id === props.current}
      />
    ))}
  </Rows>
);

export const SpotRows = (props: {
  readonly app: App;
  readonly spots: readonly Spot[];
  readonly current?: string;
  readonly label: string;
}) => (
  <Rows label={props.label}>
    {props.spots.map((spot) => (
      <Row
        key={spot.id}
        href={props.app.navigation.href({ screen: 'spot', id: spot.id })}
        title={spot.name || screenText.common.unnamed}
        note={[screenText.spotKinds[spot.kind], spot.direction].filter(Boolean).join(', ')}
        isCurrent={spot.id === props.current}
      />
    ))}
  </Rows>
);

/** Sites with their assets; what was not put anywhere stands at the end, so that nothing is out of sight. */
export function PlaceTreeRows(props: {
  readonly app: App;
  readonly tree: PlaceTree;
  readonly current?: string;
}) {
  const { app, tree } = props;
  const shown = props.current ? { current: props.current } : {};
  return (
    <>
      {tree.sites.map((site) => (
        <section key={site.id} class="stack">
          <h2>
            <a href={app.navigation.href({ screen: 'site', id: site.id })}>
              {site.name || screenText.common.unnamed}
            </a>
          </h2>
          {site.assets.length > 0 ? (
            <AssetRows app={app} assets={site.assets} label={site.name} {...shown} />
          ) : (
            <p class="quiet">{text.noAssets}</p>
          )}
        </section>
      ))}
      {tree.looseAssets.length > 0 && (
        <section class="stack">
          <h2>{tree.sites.length > 0 ? text.looseAssets : text.assets}</h2>
          <AssetRows app={app} assets={tree.looseAssets} label={text.looseAssets} {...shown} />
        </section>
      )}
      {tree.looseSpots.length > 0 && (
        <section class="stack">
          <h2>{text.looseSpots}</h2>
          <SpotRows app={app} spots={tree.looseSpots} label={text.looseSpots} {...shown} />
        </section>
      )}
    </>
  );
}

export const isEmptyTree = (tree: PlaceTree): boolean =>
  tree.sites.length + tree.looseAssets.length + tree.looseSpots.length === 0;
