/** Limits of the verdicts: each with where its usual value comes from, each to be set by the person. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import {
  DEFAULT_THRESHOLDS,
  sensibleThresholds,
  THRESHOLD_BOUNDS,
  THRESHOLD_KEYS,
} from '../../../app/limits.ts';
import type { Thresholds } from '../../../core/model/thresholds.ts';
import { officeText } from '../../../text/office-screens.ts';
import { thresholdText } from '../../../text/thresholds.ts';
import { Button } from '../../components/button.tsx';
import { NumberField } from '../../components/field.tsx';
import { parseNumber } from '../../parse-number.ts';
import { useLive } from '../../use-live.ts';

const text = officeText.phone.limits;

export function LimitsPart({ app }: { readonly app: App }) {
  const { thresholds } = useLive(app.settings);
  const [round, setRound] = useState(0);
  const isOwn = Object.keys(thresholds).length > 0;
  const isUnused = isOwn && Object.keys(sensibleThresholds(thresholds)).length === 0;
  const set = (key: keyof Thresholds, value: number) => {
    const { [key]: _, ...others } = thresholds;
    const own = value === DEFAULT_THRESHOLDS[key] ? others : { ...others, [key]: value };
    app.settings.change({ thresholds: own });
  };
  const reset = () => {
    app.settings.change({ thresholds: {} });
    setRound(round + 1);
  };
  return (
    <div class="stack stack-loose">
      <p class="quiet">{text.lead}</p>
      {THRESHOLD_KEYS.map((key) => (
        <LimitField
          key={`${key}${round}`}
          name={key}
          value={thresholds[key] ?? DEFAULT_THRESHOLDS[key]}
          onChange={(value) => set(key, value)}
        />
      ))}
      {isUnused && <p role="alert">{text.clash}</p>}
      <p class="note">{isOwn ? text.own : text.usual}</p>
      {isOwn && <Button onClick={reset}>{text.reset}</Button>}
    </div>
  );
}

/** As a person types it: 5, 0.8, 12.5. */
const plain = (value: number): string => String(Number(value.toPrecision(6)));

/** Keeps what is typed; hands on a number only when it can be used. */
function LimitField(props: {
  readonly name: keyof Thresholds;
  readonly value: number;
  readonly onChange: (value: number) => void;
}) {
  const { unit, name, origin } = thresholdText(props.name);
  const per = unit === '%' ? 100 : 1;
  const [low, high] = THRESHOLD_BOUNDS[props.name];
  const [typed, setTyped] = useState(plain(props.value * per));
  const [problem, setProblem] = useState<string>();
  return (
    <NumberField
      label={name}
      unit={unit}
      note={`${text.usually(`${plain(DEFAULT_THRESHOLDS[props.name] * per)} ${unit}`.trim())} ${origin}`}
      value={typed}
      problem={problem}
      onInput={(next) => {
        setTyped(next);
        const value = (parseNumber(next) ?? NaN) / per;
        const isUsable = value >= low && value <= high;
        setProblem(isUsable ? undefined : text.outside(plain(low * per), plain(high * per)));
        if (isUsable) props.onChange(value);
      }}
    />
  );
}
