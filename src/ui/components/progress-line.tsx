import styles from './progress-line.module.css';

/** How far a long work is; without a share it only says that it goes on. */
export function ProgressLine({ label, share }: { readonly label: string; readonly share?: number }) {
  return (
    <progress
      class={styles.line}
      aria-label={label}
      max={1}
      {...(share === undefined ? {} : { value: Math.min(1, Math.max(0, share)) })}
    />
  );
}
