import type { ComponentChildren } from 'preact';
import { useId } from 'preact/hooks';
import styles from './section.module.css';

/** A part of the reading under its own heading, on its own sheet. */
export function Section(props: {
  readonly title: string;
  readonly children: ComponentChildren;
  /** Folded until asked for: what few people need on site. */
  readonly isFolded?: boolean;
  readonly aside?: ComponentChildren;
}) {
  const id = useId();
  if (props.isFolded)
    return (
      <details class={styles.section}>
        <summary>
          <h2>{props.title}</h2>
        </summary>
        <div class={styles.content}>{props.children}</div>
      </details>
    );
  return (
    <section class={styles.section} aria-labelledby={id}>
      <div class={styles.head}>
        <h2 id={id}>{props.title}</h2>
        {props.aside}
      </div>
      <div class={styles.content}>{props.children}</div>
    </section>
  );
}
