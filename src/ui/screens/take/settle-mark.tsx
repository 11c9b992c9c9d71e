import styles from './settle-mark.module.css';

/** A line that comes to rest: wavy while the phone still moves, flat with a full mark when it lies still. */
export function SettleMark({ settled }: { readonly settled: boolean }) {
  return (
    <svg
      class={settled ? styles.settled : styles.moving}
      viewBox="0 0 240 40"
      aria-hidden="true"
      focusable="false"
    >
      {settled ? (
        <>
          <path d="M8 20H102M138 20H232" />
          <circle class={styles.full} cx="120" cy="20" r="12" />
        </>
      ) : (
        <>
          <path d="M8 20C20 4 28 4 40 20S60 36 72 20S86 8 96 18M144 22C154 32 158 32 168 20S190 4 200 20S220 34 232 20" />
          <circle cx="120" cy="20" r="12" />
        </>
      )}
    </svg>
  );
}
