import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { placeOf, textField } from '../../../app/places.ts';
import type { Entity, FieldValue } from '../../../core/model/fact.ts';
import { SPOT_KINDS } from '../../../core/model/place.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { SelectField, TextField } from '../../components/field.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { detailFields, detailsOf, SpotDetails, type Details } from './spot-details.tsx';

const text = officeText.places;

/** Name, and where it belongs; moving to the trash can be undone from the notice. */
export function EditPlaceDialog(props: {
  readonly app: App;
  readonly entity: Entity;
  readonly onClose: () => void;
  readonly onTrashed: () => void;
}) {
  const { app, entity } = props;
  const [name, setName] = useState(textField(entity, 'name') ?? '');
  const [kind, setKind] = useState(placeOf(entity).kind);
  const [direction, setDirection] = useState(textField(entity, 'direction') ?? '');
  const [details, setDetails] = useState<Details>(() => detailsOf(placeOf(entity)));
  const parentKey = entity.kind === 'spot' ? 'asset' : 'site';
  const [parent, setParent] = useState(textField(entity, parentKey) ?? '');
  const tree = useLoaded(app.store, () => app.places.tree(), []);
  const parents =
    entity.kind === 'spot'
      ? [...(tree?.sites.flatMap((site) => site.assets) ?? []), ...(tree?.looseAssets ?? [])]
      : (tree?.sites ?? []);
  const save = async () => {
    const set: Record<string, FieldValue> = { name: name.trim() };
    if (entity.kind !== 'site') set[parentKey] = parent || null;
    if (entity.kind === 'spot')
      Object.assign(set, { kind, direction: direction.trim() || null, ...detailFields(details) });
    const changed = Object.entries(set).filter(
      ([key, value]) => JSON.stringify(entity.fields[key] ?? null) !== JSON.stringify(value),
    );
    if (changed.length > 0) await app.readings.edit(entity.id, Object.fromEntries(changed), text.changed);
    props.onClose();
  };
  const trash = async () => {
    await app.readings.edit(entity.id, { trashed: true }, text.trashed(name));
    props.onTrashed();
  };
  return (
    <Dialog
      title={text.edit}
      onClose={props.onClose}
      actions={
        <>
          <Button kind="grave" onClick={() => void trash()}>
            {screenText.common.remove}
          </Button>
          <Button kind="main" onClick={() => void save()}>
            {screenText.common.save}
          </Button>
        </>
      }
    >
      <TextField label={text.name} value={name} onInput={setName} />
      {entity.kind !== 'site' && (
        <SelectField
          label={text.belongs[entity.kind === 'spot' ? 'spot' : 'asset']}
          value={parent}
          options={[
            { value: '', label: text.nowhere },
            ...parents.map((place) => ({ value: place.id, label: place.name })),
          ]}
          onChange={setParent}
        />
      )}
      {entity.kind === 'spot' && (
        <>
          <SelectField
            label={text.spotKind}
            value={kind}
            options={SPOT_KINDS.map((value) => ({ value, label: screenText.spotKinds[value] }))}
            onChange={setKind}
          />
          <SpotDetails key={kind} kind={kind} details={details} onChange={setDetails} />
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
