import type { ComponentChildren } from 'preact';
import styles from './fact-list.module.css';

/** Names and values, one pair a line. */
export const FactList = (props: { readonly facts: readonly (readonly [string, ComponentChildren])[] }) => (
  <dl class={styles.list}>
    {props.facts.map(([name, value]) => (
      <div key={name}>
        <dt>{name}</dt>
        <dd>{value}</dd>
      </div>
    ))}
  </dl>
);
