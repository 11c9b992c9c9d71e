/** What the published criteria need to know of a spot, asked by its kind; all of it optional. */
import type { FieldValue } from '../../../core/model/fact.ts';
import type { MachinePlace, Place, SpotKind } from '../../../core/model/place.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { NumberField, SelectField } from '../../components/field.tsx';
import { parseNumber } from '../../parse-number.ts';
import { useState } from 'preact/hooks';

const text = officeText.spotDetails;

const MACHINE_KINDS: readonly SpotKind[] = ['bearing-housing', 'machine-base', 'fan-frame'];
const FLOOR_KINDS: readonly SpotKind[] = ['floor', 'stair', 'footbridge'];
const BUILDING_KINDS: readonly SpotKind[] = ['foundation', 'top-floor'];
const W_PER_KW = 1000;

export type Details = Omit<Place, 'kind' | 'presumedLoading'>;

export function SpotDetails(props: {
  readonly kind: SpotKind;
  readonly details: Details;
  readonly onChange: (details: Details) => void;
}) {
  const { kind, details, onChange } = props;
  if (MACHINE_KINDS.includes(kind))
    return <MachineDetails machine={details.machine ?? {}} onChange={(machine) => onChange({ machine })} />;
  if (FLOOR_KINDS.includes(kind))
    return (
      <Words
        label={text.floorUse}
        words={text.floorUses}
        value={details.floorUse}
        onChange={(floorUse) => onChange(floorUse ? { floorUse } : {})}
      />
    );
  if (BUILDING_KINDS.includes(kind))
    return (
      <Words
        label={text.building}
        words={text.buildings}
        value={details.building}
        onChange={(building) => onChange(building ? { building } : {})}
      />
    );
  return null;
}

function MachineDetails(props: {
  readonly machine: MachinePlace;
  readonly onChange: (machine: MachinePlace) => void;
}) {
  const { machine, onChange } = props;
  const [power, setPower] = useState(
    machine.ratedPowerW === undefined ? '' : String(machine.ratedPowerW / W_PER_KW),
  );
  const set = (part: { readonly [Key in keyof MachinePlace]?: MachinePlace[Key] | undefined }) =>
    onChange(
      Object.fromEntries(Object.entries({ ...machine, ...part }).filter(([, value]) => value !== undefined)),
    );
  return (
    <>
      <Words label={text.type} words={text.types} value={machine.type} onChange={(type) => set({ type })} />
      <NumberField
        label={text.power}
        unit="kW"
        value={power}
        onInput={(typed) => {
          setPower(typed);
          const kilowatts = parseNumber(typed);
          set({ ratedPowerW: kilowatts !== undefined && kilowatts > 0 ? kilowatts * W_PER_KW : undefined });
        }}
      />
      <Words
        label={text.support}
        words={text.supports}
        value={machine.support}
        onChange={(support) => set({ support })}
      />
      {machine.type === 'pump' && (
        <Words
          label={text.pumpCategory}
          words={text.pumpCategories}
          value={machine.pumpCategory === undefined ? undefined : (String(machine.pumpCategory) as '1' | '2')}
          onChange={(category) => set({ pumpCategory: category ? (Number(category) as 1 | 2) : undefined })}
        />
      )}
    </>
  );
}

function Words<T extends string>(props: {
  readonly label: string;
  readonly words: Readonly<Record<T, string>>;
  readonly value: T | undefined;
  readonly onChange: (value: T | undefined) => void;
}) {
  const values = Object.keys(props.words) as T[];
  return (
    <SelectField<T | ''>
      label={`${props.label} (${screenText.common.optional})`}
      value={props.value ?? ''}
      options={[
        { value: '', label: screenText.common.notGiven },
        ...values.map((value) => ({ value, label: props.words[value] })),
      ]}
      onChange={(value) => props.onChange(value === '' ? undefined : value)}
    />
  );
}

export const detailsOf = ({ machine, building, floorUse }: Place): Details => ({
  ...(machine ? { machine } : {}),
  ...(building ? { building } : {}),
  ...(floorUse ? { floorUse } : {}),
});

/** As fields of an edit: what is no longer given is cleared. */
export const detailFields = ({ machine, building, floorUse }: Details): Record<string, FieldValue> => ({
  machine: machine && Object.keys(machine).length > 0 ? { ...machine } : null,
  building: building ?? null,
  floorUse: floorUse ?? null,
});
