/** Frequency of a spot over its visits, each with its 95 % interval; the same numbers stand in a table below. */
import { STANDARD_DEVIATIONS_95 } from '../../../core/model/interval.ts';
import { linearTicks } from '../../../core/picture/linear-ticks.ts';
import { formatDamping, formatFrequency, toUnit, type FrequencyUnit } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { dayAndTime } from '../../day-and-time.ts';
import styles from './visit-chart.module.css';

export interface Visit {
  readonly id: string;
  readonly recordedAt: string;
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  readonly dampingRatio: number;
  readonly dampingRatioSd: number;
}

const text = officeText.places;
const WIDTH = 340;
const HEIGHT = 180;
const LEFT = 48;
const RIGHT = 12;
const TOP = 12;
const FOOT = 26;
/** Least height of the picture as a share of the frequency: noise of a per mille must not look like a change. */
const LEAST_SPAN_RATIO = 0.05;

export function VisitChart({
  visits,
  unit,
}: {
  readonly visits: readonly Visit[];
  readonly unit: FrequencyUnit;
}) {
  const [lowHz, highHz] = range(visits);
  const x = (index: number) =>
    visits.length < 2 ? WIDTH / 2 : LEFT + 14 + (index / (visits.length - 1)) * (WIDTH - LEFT - RIGHT - 28);
  const y = (hz: number) => TOP + (1 - (hz - lowHz) / (highHz - lowHz)) * (HEIGHT - TOP - FOOT);
  const ticks = linearTicks(toUnit(lowHz, unit), toUnit(highHz, unit), toUnit(highHz - lowHz, unit) / 4);
  const first = visits[0];
  const last = visits.at(-1);
  return (
    <figure class="stack">
      <svg
        class={styles.chart}
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        role="img"
        aria-label={text.chartSentence(visits.length)}
      >
        {ticks.map((tick) => (
          <g key={tick}>
            <path class={styles.grid} d={`M${LEFT} ${y(tick / toUnit(1, unit))}H${WIDTH - RIGHT}`} />
            <text class={styles.word} x={LEFT - 6} y={y(tick / toUnit(1, unit)) + 4} text-anchor="end">
              {tick}
            </text>
          </g>
        ))}
        {visits.map((visit, index) => {
          const half = STANDARD_DEVIATIONS_95 * visit.frequencySdHz;
          return (
            <g key={visit.id}>
              <path
                class={styles.interval}
                d={`M${x(index)} ${y(visit.frequencyHz - half)}V${y(visit.frequencyHz + half)}`}
              />
              <circle class={styles.point} cx={x(index)} cy={y(visit.frequencyHz)} r="4.5" />
            </g>
          );
        })}
        {first && (
          <text class={styles.word} x={LEFT} y={HEIGHT - 6}>
            {dayAndTime(first.recordedAt)}
          </text>
        )}
        {last && visits.length > 1 && (
          <text class={styles.word} x={WIDTH - RIGHT} y={HEIGHT - 6} text-anchor="end">
            {dayAndTime(last.recordedAt)}
          </text>
        )}
      </svg>
      <details>
        <summary>{text.asTable}</summary>
        <table class={styles.table}>
          <thead>
            <tr>
              <th scope="col">{text.when}</th>
              <th scope="col">{text.frequency}</th>
              <th scope="col">{text.damping}</th>
            </tr>
          </thead>
          <tbody>
            {visits.map((visit) => (
              <tr key={visit.id}>
                <td>{dayAndTime(visit.recordedAt)}</td>
                <td>{formatFrequency(visit.frequencyHz, visit.frequencySdHz, unit)}</td>
                <td>{formatDamping(visit.dampingRatio, visit.dampingRatioSd)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </details>
    </figure>
  );
}

function range(visits: readonly Visit[]): readonly [number, number] {
  const low = Math.min(...visits.map((v) => v.frequencyHz - STANDARD_DEVIATIONS_95 * v.frequencySdHz));
  const high = Math.max(...visits.map((v) => v.frequencyHz + STANDARD_DEVIATIONS_95 * v.frequencySdHz));
  const middle = (low + high) / 2;
  const half = Math.max((high - low) * 0.6, (middle * LEAST_SPAN_RATIO) / 2);
  return [middle - half, middle + half];
}
