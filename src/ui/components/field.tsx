import type { ComponentChildren } from 'preact';
import { useId } from 'preact/hooks';
import styles from './field.module.css';

interface Common {
  readonly label: string;
  readonly note?: string;
  readonly problem?: string | undefined;
}

function Frame(props: Common & { readonly id: string; readonly children: ComponentChildren }) {
  return (
    <div class={styles.field}>
      <label for={props.id}>{props.label}</label>
      {props.children}
      {props.note && (
        <p id={`${props.id}-note`} class="note">
          {props.note}
        </p>
      )}
      {props.problem && (
        <p id={`${props.id}-problem`} class={styles.problem}>
          {props.problem}
        </p>
      )}
    </div>
  );
}

const described = (id: string, props: Common) => {
  const ids = [props.note ? `${id}-note` : '', props.problem ? `${id}-problem` : '']
    .filter(Boolean)
    .join(' ');
  return {
    ...(ids ? { 'aria-describedby': ids } : {}),
    ...(props.problem ? { 'aria-invalid': 'true' as const } : {}),
  };
};

export function TextField(
  props: Common & {
    readonly value: string;
    readonly onInput: (value: string) => void;
    /** Suggestions that were typed before. */
    readonly suggestions?: readonly string[];
    readonly type?: 'text' | 'search' | 'url' | 'password';
    readonly required?: boolean;
    readonly focus?: boolean;
  },
) {
  const id = useId();
  return (
    <Frame {...props} id={id}>
      <input
        id={id}
        class={styles.input}
        value={props.value}
        autocomplete="off"
        required={props.required ?? false}
        autofocus={props.focus ?? false}
        {...(props.suggestions?.length ? { list: `${id}-list` } : {})}
        {...({ type: props.type ?? 'text' } as { type: 'text' })}
        {...described(id, props)}
        onInput={(event) => props.onInput(event.currentTarget.value)}
      />
      {props.suggestions && props.suggestions.length > 0 && (
        <datalist id={`${id}-list`}>
          {props.suggestions.map((text) => (
            <option key={text} value={text} />
          ))}
        </datalist>
      )}
    </Frame>
  );
}

export function NumberField(
  props: Common & {
    /** Text as typed: an unfinished number is not a number yet. */
    readonly value: string;
    readonly unit?: string;
    readonly onInput: (value: string) => void;
  },
) {
  const id = useId();
  return (
    <Frame {...props} id={id}>
      <span class={styles.measured}>
        <input
          id={id}
          class={styles.input}
          type="text"
          inputMode="decimal"
          value={props.value}
          autocomplete="off"
          {...described(id, props)}
          onInput={(event) => props.onInput(event.currentTarget.value)}
        />
        {props.unit && <span class={styles.unit}>{props.unit}</span>}
      </span>
    </Frame>
  );
}

export function SelectField<T extends string>(
  props: Common & {
    readonly value: T;
    readonly options: readonly { readonly value: T; readonly label: string }[];
    readonly onChange: (value: T) => void;
  },
) {
  const id = useId();
  return (
    <Frame {...props} id={id}>
      <select
        id={id}
        class={styles.input}
        value={props.value}
        {...described(id, props)}
        onChange={(event) => props.onChange(event.currentTarget.value as T)}
      >
        {props.options.map((option) => (
          <option key={option.value} value={option.value} selected={option.value === props.value}>
            {option.label}
          </option>
        ))}
      </select>
    </Frame>
  );
}

export function CheckField(props: {
  readonly label: ComponentChildren;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
}) {
  return (
    <label class={styles.check}>
      <input
        type="checkbox"
        checked={props.checked}
        onChange={(event) => props.onChange(event.currentTarget.checked)}
      />
      <span>{props.label}</span>
    </label>
  );
}
