import styles from './ring-down-figure.module.css';

/** Three taps and their ringing, computed from the formula of a damped oscillator: what the program listens to. */
export function RingDownFigure() {
  return (
    <svg class={styles.figure} viewBox="0 0 320 96" aria-hidden="true" focusable="false">
      <path class={styles.axis} d="M0 48H320" />
      <path class={styles.line} d={ringDowns()} />
    </svg>
  );
}

/** x(t) = A exp(-zeta w t) sin(w t) after each tap; drawn 0.5 px apart. */
function ringDowns(): string {
  const taps = [
    { at: 26, size: 40 },
    { at: 124, size: 30 },
    { at: 222, size: 36 },
  ];
  let path = 'M0 48';
  for (let x = 0; x <= 320; x += 0.5) {
    const tap = taps.filter(({ at }) => at <= x).at(-1);
    const phase = tap ? ((x - tap.at) / 11) * 2 * Math.PI : 0;
    const y = tap ? 48 - tap.size * Math.exp(-0.075 * phase) * Math.sin(phase) : 48;
    path += `L${x} ${y.toFixed(1)}`;
  }
  return path;
}
