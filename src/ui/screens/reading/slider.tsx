import { useId } from 'preact/hooks';
import styles from './slider.module.css';

/** Steps of the logarithmic track; one is under 3 % on the widest slider here. */
const STEPS = 160;
/** The step at the resting value is that value exactly; more would hold the arrow keys back. */
const CATCH_STEPS = 0.5;

/** A quantity that is changed by factors: logarithmic track, a mark at the value as measured, arrow keys step by a few per cent. */
export function Slider(props: {
  readonly label: string;
  readonly value: number;
  readonly range: readonly [number, number];
  readonly rest: number;
  readonly said: (value: number) => string;
  readonly onChange: (value: number) => void;
}) {
  const id = useId();
  const { label, value, rest, said } = props;
  const [low, high] = [Math.min(props.range[0], rest), Math.max(props.range[1], rest)];
  const stepOf = (quantity: number) => (STEPS * Math.log(quantity / low)) / Math.log(high / low);
  const atStep = (step: number) => low * (high / low) ** (step / STEPS);
  const restStep = stepOf(rest);
  const onInput = (event: { readonly currentTarget: HTMLInputElement }) => {
    const step = Number(event.currentTarget.value);
    props.onChange(Math.abs(step - restStep) <= CATCH_STEPS ? rest : atStep(step));
  };
  return (
    <div class={styles.slider}>
      <label for={id}>{label}</label>
      <output for={id}>{said(value)}</output>
      <div class={styles.track} style={{ '--rest-share': String(restStep / STEPS) }}>
        <input
          id={id}
          type="range"
          min={0}
          max={STEPS}
          step={1}
          value={stepOf(value)}
          aria-valuetext={said(value)}
          onInput={onInput}
        />
      </div>
    </div>
  );
}
