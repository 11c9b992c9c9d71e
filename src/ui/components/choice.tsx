import styles from './choice.module.css';

export interface ChoiceOption<T extends string> {
  readonly value: T;
  readonly label: string;
  readonly note?: string;
}

/** One of a few, each a target of its own: real radio buttons under the skin, so arrow keys and screen readers work. */
export function Choice<T extends string>(props: {
  readonly legend: string;
  readonly name: string;
  readonly value: T | undefined;
  readonly options: readonly ChoiceOption<T>[];
  readonly onChange: (value: T) => void;
  readonly hideLegend?: boolean;
}) {
  return (
    <fieldset class={styles.group}>
      <legend class={props.hideLegend ? 'unseen' : styles.legend}>{props.legend}</legend>
      <div class={styles.options}>
        {props.options.map((option) => (
          <label key={option.value} class={styles.option}>
            <input
              type="radio"
              name={props.name}
              value={option.value}
              checked={option.value === props.value}
              onChange={() => props.onChange(option.value)}
            />
            <span>
              {option.label}
              {option.note && <small>{option.note}</small>}
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
