import styles from './tally.module.css';

/** Taps as tally marks, as one would keep them on paper: four strokes and a bar make five. */
export function Tally({ count, label }: { readonly count: number; readonly label: string }) {
  const shown = Math.max(count, 0);
  const marks = Array.from({ length: shown }, (_, index) => index);
  const width = Math.max(60, Math.ceil((shown + 1) / 5) * 78);
  return (
    <svg
      class={styles.tally}
      viewBox={`0 0 ${width} 52`}
      preserveAspectRatio="xMinYMid meet"
      role="img"
      aria-label={label}
    >
      {marks.map((index) => {
        const x = Math.floor(index / 5) * 78 + 10 + (index % 5) * 12;
        const isBar = index % 5 === 4;
        return (
          <path key={index} d={isBar ? `M${x - 54} 40L${x - 2} 12` : `M${x} 8l${(index % 2) * 2 - 1} 36`} />
        );
      })}
    </svg>
  );
}
