import type { ComponentChildren } from 'preact';
import { ArrowOn } from './icons.tsx';
import styles from './rows.module.css';

/** A list of things to open, one below the other, each a full-width target. */
export const Rows = ({
  children,
  label,
}: {
  readonly children: ComponentChildren;
  readonly label?: string;
}) => (
  <ul class={styles.rows} {...(label ? { 'aria-label': label } : {})}>
    {children}
  </ul>
);

export function Row(props: {
  readonly href: string;
  readonly title: ComponentChildren;
  readonly note?: ComponentChildren;
  /** What was measured, between the title and the note. */
  readonly figure?: ComponentChildren;
  readonly isCurrent?: boolean;
  /** A check box that selects the row instead of opening it. */
  readonly select?: {
    readonly checked: boolean;
    readonly label: string;
    readonly onChange: (on: boolean) => void;
  };
}) {
  return (
    <li class={styles.row}>
      {props.select && (
        <label class={styles.select}>
          <input
            type="checkbox"
            checked={props.select.checked}
            aria-label={props.select.label}
            onChange={(event) => props.select?.onChange(event.currentTarget.checked)}
          />
        </label>
      )}
      <a
        href={props.href}
        class={styles.link}
        {...(props.isCurrent ? { 'aria-current': 'page' as const } : {})}
      >
        <span class={styles.words}>
          <span class={styles.title}>{props.title}</span>
          {props.figure && <span class={styles.figure}>{props.figure}</span>}
          {props.note && <span class="note">{props.note}</span>}
        </span>
        <span class={styles.on}>
          <ArrowOn />
        </span>
      </a>
    </li>
  );
}
