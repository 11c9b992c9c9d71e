import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Asset, PlaceIds, PlaceTree, Spot } from '../../../app/places.ts';
import { SPOT_KINDS, type SpotKind } from '../../../core/model/place.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { SelectField, TextField } from '../../components/field.tsx';
import { useLoaded } from '../../use-loaded.ts';

const text = officeText.places;

/** Picks a known spot, or names a new one on the way: site and asset come along, or are typed once. */
export function PickSpotDialog(props: {
  readonly app: App;
  readonly kind?: SpotKind;
  readonly onPick: (where: PlaceIds) => void;
  readonly onClose: () => void;
}) {
  const { app } = props;
  const tree = useLoaded(app.store, () => app.places.tree(), []);
  const [known, setKnown] = useState('');
  const near = tree && nearLast(tree, app.lastPlace.get());
  const [typedSite, setSite] = useState<string>();
  const [typedAsset, setAsset] = useState<string>();
  const [typedSpot, setSpot] = useState<string>();
  const site = typedSite ?? near?.site ?? '';
  const asset = typedAsset ?? near?.asset ?? '';
  const spot = typedSpot ?? near?.nextSpot ?? '';
  const [kind, setKind] = useState<SpotKind>(props.kind ?? app.settings.get().lastSpotKind ?? 'other');
  const [problem, setProblem] = useState<string>();
  const spots = tree ? allSpots(tree) : [];
  const pick = async () => {
    if (!tree) return;
    const found = spots.find((entry) => entry.spot.id === known);
    if (!found && !spot.trim()) return setProblem(text.nameMissing);
    const where = found ? idsOf(found) : await addTyped(app, tree, { site, asset, spot, kind });
    app.lastPlace.set(where);
    props.onPick(where);
  };
  return (
    <Dialog
      title={text.pickSpot}
      onClose={props.onClose}
      actions={
        <>
          <Button onClick={props.onClose}>{screenText.common.cancel}</Button>
          <Button kind="main" onClick={() => void pick()}>
            {text.useSpot}
          </Button>
        </>
      }
    >
      {spots.length > 0 && (
        <SelectField
          label={text.knownSpot}
          value={known}
          options={[
            { value: '', label: text.newSpot },
            ...spots.map((entry) => ({ value: entry.spot.id, label: fullName(entry) })),
          ]}
          onChange={setKnown}
        />
      )}
      {known === '' && (
        <>
          <TextField
            label={text.spotName}
            note={text.kinds.spot.example}
            value={spot}
            onInput={setSpot}
            problem={problem}
          />
          <TextField
            label={`${text.kinds.asset.name} (${screenText.common.optional})`}
            value={asset}
            onInput={setAsset}
            suggestions={tree ? allAssets(tree).map((entry) => entry.name) : []}
          />
          <TextField
            label={`${text.kinds.site.name} (${screenText.common.optional})`}
            value={site}
            onInput={setSite}
            suggestions={tree?.sites.map((entry) => entry.name) ?? []}
          />
          <SelectField
            label={text.spotKind}
            value={kind}
            options={SPOT_KINDS.map((value) => ({ value, label: screenText.spotKinds[value] }))}
            onChange={setKind}
          />
        </>
      )}
    </Dialog>
  );
}

interface FullSpot {
  readonly spot: Spot;
  readonly asset?: Asset;
  readonly siteName?: string;
}

const allAssets = (tree: PlaceTree): readonly Asset[] => [
  ...tree.sites.flatMap((site) => site.assets),
  ...tree.looseAssets,
];

function allSpots(tree: PlaceTree): readonly FullSpot[] {
  const placed = allAssets(tree).flatMap((asset) => {
    const site = tree.sites.find((entry) => entry.id === asset.site);
    return asset.spots.map((spot) => ({ spot, asset, ...(site ? { siteName: site.name } : {}) }));
  });
  return [...placed, ...tree.looseSpots.map((spot) => ({ spot }))];
}

const fullName = (entry: FullSpot) =>
  [entry.siteName, entry.asset?.name, entry.spot.name].filter(Boolean).join(' · ');

/** What the last named spot suggests for the next: the same asset and site, and the number after its own. */
function nearLast(tree: PlaceTree, last: PlaceIds) {
  const spots = allSpots(tree);
  const lastSpot = spots.find((entry) => entry.spot.id === last.spot);
  const name = lastSpot?.spot.name.replace(/\d+$/, (digits) => String(Number(digits) + 1));
  const isFree = !spots.some((entry) => entry.asset?.id === lastSpot?.asset?.id && entry.spot.name === name);
  const asset = allAssets(tree).find((entry) => entry.id === last.asset);
  return {
    asset: asset?.name,
    site: tree.sites.find((entry) => entry.id === (last.site ?? asset?.site))?.name,
    nextSpot: isFree ? name : undefined,
  };
}

const idsOf = ({ spot, asset }: FullSpot): PlaceIds => ({
  spot: spot.id,
  ...(asset ? { asset: asset.id, ...(asset.site ? { site: asset.site } : {}) } : {}),
});

/** Typed names: a site or an asset of the same name is the same one. */
async function addTyped(
  app: App,
  tree: PlaceTree,
  typed: { readonly site: string; readonly asset: string; readonly spot: string; readonly kind: SpotKind },
): Promise<PlaceIds> {
  const siteName = typed.site.trim();
  const assetName = typed.asset.trim();
  const site = siteName
    ? (tree.sites.find((entry) => entry.name === siteName)?.id ?? (await app.places.addSite(siteName)))
    : undefined;
  const knownAsset = allAssets(tree).find(
    (entry) => entry.name === assetName && (site === undefined || entry.site === site),
  );
  const asset = assetName ? (knownAsset?.id ?? (await app.places.addAsset(assetName, site))) : undefined;
  const spot = await app.places.addSpot(typed.spot.trim(), typed.kind, asset);
  const siteId = site ?? knownAsset?.site;
  return { spot, ...(asset ? { asset } : {}), ...(siteId ? { site: siteId } : {}) };
}
