import type { PlotSeries } from '../../charts/plot-spec.ts';
import { readingText } from '../../../text/reading-screen.ts';
import styles from './series-legend.module.css';

const DASHES: Readonly<Record<PlotSeries['kind'], string | undefined>> = {
  line: undefined,
  dots: '0.1 5',
  dashes: '6 4',
  dotted: '1.5 3',
};

type Entry = Omit<PlotSeries, 'values'>;

const Sample = ({ colour, kind }: Entry) => (
  <svg viewBox="0 0 24 8" aria-hidden="true" focusable="false">
    <path
      d="M1 4H23"
      style={{ stroke: `var(${colour})` }}
      stroke-width={kind === 'dots' ? 4 : 2}
      stroke-linecap={kind === 'dots' ? 'round' : 'butt'}
      stroke-dasharray={DASHES[kind]}
    />
  </svg>
);

/** Which line is which, by colour and by stroke. */
export const SeriesLegend = ({ series }: { readonly series: readonly Entry[] }) => (
  <ul class={styles.legend}>
    {series.map((entry) => (
      <li key={entry.label}>
        <Sample {...entry} />
        {entry.label}
      </li>
    ))}
  </ul>
);

/** The same, and a press hides or shows a line: three axes over each other are hard to tell apart. */
export const SeriesToggles = (props: {
  readonly series: readonly Entry[];
  readonly hidden: ReadonlySet<string>;
  readonly onToggle: (label: string) => void;
}) => (
  <div class={styles.legend} role="group" aria-label={readingText.plots.lines}>
    {props.series.map((entry) => (
      <button
        key={entry.label}
        type="button"
        aria-pressed={!props.hidden.has(entry.label)}
        onClick={() => props.onToggle(entry.label)}
      >
        <Sample {...entry} />
        <span>{entry.label}</span>
      </button>
    ))}
  </div>
);
