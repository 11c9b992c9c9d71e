import type { TakePlan } from '../../../app/take-plan.ts';
import { DURATION_CHOICES_S } from '../../../app/take-plan.ts';
import type { Circumstances } from '../../../core/model/fact.ts';
import { screenText } from '../../../text/screens.ts';
import { Choice } from '../../components/choice.tsx';
import { CheckField, NumberField, TextField } from '../../components/field.tsx';
import { parseNumber } from '../../parse-number.ts';
import { useState } from 'preact/hooks';

const text = screenText.take;

const asOptions = <T extends string>(words: Readonly<Record<T, string>>) =>
  (Object.keys(words) as T[]).map((value) => ({ value, label: words[value] }));

/** A number that was deleted is absent, not undefined. */
const withoutUndefined = <T extends object>(value: T): T =>
  Object.fromEntries(Object.entries(value).filter(([, entry]) => entry !== undefined && entry !== '')) as T;

/** A few taps correct the defaults; words and numbers are optional. */
export function CircumstancesForm(props: {
  readonly plan: TakePlan;
  readonly onChange: (plan: TakePlan) => void;
}) {
  const { plan } = props;
  const { circumstances } = plan;
  const set = (part: Partial<Circumstances>) =>
    props.onChange({ ...plan, circumstances: withoutUndefined({ ...circumstances, ...part }) });
  const pick = <K extends 'mounting' | 'excitation' | 'machineState' | 'peopleOnIt' | 'surface'>(
    key: K,
    legend: string,
    words: Readonly<Record<Circumstances[K], string>>,
  ) => (
    <Choice
      legend={legend}
      name={key}
      value={circumstances[key]}
      options={asOptions(words)}
      onChange={(value) => set({ [key]: value } as Partial<Circumstances>)}
    />
  );
  return (
    <div class="stack stack-loose">
      {pick('mounting', text.howHeld, text.mounting)}
      <Choice
        legend={text.duration}
        name="duration"
        value={String(plan.durationS)}
        options={DURATION_CHOICES_S[plan.procedure].map((seconds) => ({
          value: String(seconds),
          label: seconds >= 120 ? `${seconds / 60} min` : `${seconds} s`,
        }))}
        onChange={(value) => props.onChange({ ...plan, durationS: Number(value) })}
      />
      <Choice
        legend={text.startBy}
        name="start"
        value={plan.startBy}
        options={asOptions(text.starts)}
        onChange={(startBy) => props.onChange({ ...plan, startBy })}
      />
      {plan.procedure === 'tap' && pick('excitation', text.fields.excitation, text.excitation)}
      {pick('machineState', text.fields.machineState, text.machineState)}
      {pick('peopleOnIt', text.fields.peopleOnIt, text.peopleOnIt)}
      <div class="stack">
        {plan.procedure === 'running' && (
          <NumericEntry
            label={text.fields.speedRpm}
            unit="r/min"
            value={circumstances.speedRpm}
            onChange={(speedRpm) => set({ speedRpm } as Partial<Circumstances>)}
          />
        )}
        <TextField
          label={text.fields.direction}
          value={circumstances.direction ?? ''}
          onInput={(direction) => set({ direction })}
        />
        <TextField
          label={text.fields.load}
          value={circumstances.load ?? ''}
          onInput={(load) => set({ load })}
        />
        <NumericEntry
          label={text.fields.temperatureC}
          unit="°C"
          value={circumstances.temperatureC}
          onChange={(temperatureC) => set({ temperatureC } as Partial<Circumstances>)}
        />
        <CheckField
          label={text.fields.visibleSway}
          checked={circumstances.visibleSway ?? false}
          onChange={(visibleSway) => set({ visibleSway })}
        />
        <CheckField
          label={text.fields.cracksOrLooseParts}
          checked={circumstances.cracksOrLooseParts ?? false}
          onChange={(cracksOrLooseParts) => set({ cracksOrLooseParts })}
        />
      </div>
    </div>
  );
}

/** Keeps what is typed as text; hands on a number, or nothing while it is none. */
function NumericEntry(props: {
  readonly label: string;
  readonly unit: string;
  readonly value: number | undefined;
  readonly onChange: (value: number | undefined) => void;
}) {
  const [typed, setTyped] = useState(props.value === undefined ? '' : String(props.value));
  return (
    <NumberField
      label={props.label}
      unit={props.unit}
      value={typed}
      onInput={(next) => {
        setTyped(next);
        props.onChange(parseNumber(next));
      }}
    />
  );
}
