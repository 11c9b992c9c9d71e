import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Route } from '../../../app/route.ts';
import { SPOT_KINDS, type SpotKind } from '../../../core/model/place.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { Choice } from '../../components/choice.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { SelectField, TextField } from '../../components/field.tsx';

const text = officeText.places;

type Kind = 'site' | 'asset' | 'spot';

/** Adds a site, an asset or a spot; under a site only assets, under an asset only spots make sense. */
export function AddPlaceDialog(props: {
  readonly app: App;
  readonly under: { readonly site?: string; readonly asset?: string };
  readonly onClose: () => void;
  readonly onAdded: (route: Route) => void;
}) {
  const { app, under } = props;
  const fixed: Kind | undefined = under.asset ? 'spot' : under.site ? 'asset' : undefined;
  const [kind, setKind] = useState<Kind>(fixed ?? 'site');
  const [name, setName] = useState('');
  const [spotKind, setSpotKind] = useState<SpotKind>('other');
  const [direction, setDirection] = useState('');
  const [problem, setProblem] = useState<string>();
  const add = async () => {
    const given = name.trim();
    if (!given) return setProblem(text.nameMissing);
    const id = await addPlace(app, kind, given, { ...under, spotKind, direction: direction.trim() });
    props.onClose();
    props.onAdded({ screen: kind, id });
  };
  return (
    <Dialog
      title={fixed ? text.addKind[fixed] : text.addPlace}
      onClose={props.onClose}
      actions={
        <>
          <Button onClick={props.onClose}>{screenText.common.cancel}</Button>
          <Button kind="main" onClick={() => void add()}>
            {screenText.common.add}
          </Button>
        </>
      }
    >
      {!fixed && (
        <Choice
          legend={text.whatPlace}
          name="place-kind"
          value={kind}
          options={(['site', 'asset', 'spot'] as const).map((value) => ({
            value,
            label: text.kinds[value].name,
            note: text.kinds[value].note,
          }))}
          onChange={setKind}
        />
      )}
      <TextField
        label={text.name}
        value={name}
        onInput={setName}
        problem={problem}
        note={text.kinds[kind].example}
        focus
      />
      {kind === 'spot' && (
        <>
          <SelectField
            label={text.spotKind}
            value={spotKind}
            options={SPOT_KINDS.map((value) => ({ value, label: screenText.spotKinds[value] }))}
            onChange={setSpotKind}
          />
          <TextField
            label={text.direction}
            note={text.directionNote}
            value={direction}
            onInput={setDirection}
          />
        </>
      )}
    </Dialog>
  );
}

function addPlace(
  app: App,
  kind: Kind,
  name: string,
  more: {
    readonly site?: string;
    readonly asset?: string;
    readonly spotKind: SpotKind;
    readonly direction: string;
  },
): Promise<string> {
  if (kind === 'site') return app.places.addSite(name);
  if (kind === 'asset') return app.places.addAsset(name, more.site);
  return app.places.addSpot(name, more.spotKind, more.asset, more.direction || undefined);
}
