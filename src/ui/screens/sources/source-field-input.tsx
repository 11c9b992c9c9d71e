import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { CheckField, NumberField, SelectField, TextField } from '../../components/field.tsx';
import type { SourceField } from './source-fields.ts';

const text = officeText.sources;

type FieldKey = keyof typeof text.fields;

/** One field of a source, by its type; its words come from the language file. */
export function SourceFieldInput(props: {
  readonly field: SourceField;
  readonly value: string;
  readonly onChange: (value: string) => void;
}) {
  const { field, value, onChange } = props;
  const words = text.fields[field.key as FieldKey];
  const label = isNeeded(field) ? words.label : `${words.label} (${screenText.common.optional})`;
  const note = 'note' in words ? { note: words.note } : {};
  switch (field.type) {
    case 'check':
      return (
        <CheckField
          label={words.label}
          checked={value === 'yes'}
          onChange={(on) => onChange(on ? 'yes' : '')}
        />
      );
    case 'choice': {
      const names = ('values' in words ? words.values : {}) as Readonly<Record<string, string>>;
      return (
        <SelectField
          label={words.label}
          {...note}
          value={value}
          options={field.values.map((entry) => ({
            value: entry,
            label: names[entry] ?? (entry || screenText.common.notGiven),
          }))}
          onChange={onChange}
        />
      );
    }
    case 'list':
      return <TextField label={label} {...note} value={value} onInput={onChange} />;
    case 'measure':
      return (
        <NumberField
          label={label}
          {...note}
          {...(field.unit ? { unit: field.unit } : {})}
          value={value}
          onInput={onChange}
        />
      );
  }
}

const isNeeded = (field: SourceField) => field.type === 'measure' && field.isNeeded === true;
