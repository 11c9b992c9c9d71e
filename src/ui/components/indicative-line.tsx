import styles from './indicative-line.module.css';

/** The line that stands on every result. */
export const IndicativeLine = ({ text }: { readonly text: string }) => <p class={styles.line}>{text}</p>;
