import { useRef, useState } from 'preact/hooks';
import type { Interval } from '../../core/model/interval.ts';
import { DataTable, type TableContent } from './data-table.tsx';
import type { DrawnPlot } from './draw-plot.ts';
import { keyActs } from './key-acts.ts';
import styles from './line-chart.module.css';
import type { PlotSpec } from './plot-spec.ts';
import { usePlot } from './use-plot.ts';
import { ZoomTools, type ZoomWords } from './zoom-tools.tsx';

export interface LineChartWords extends ZoomWords {
  readonly keys: string;
}

export interface LineChartProps {
  readonly name: string;
  /** What the picture shows, for those who do not see it. */
  readonly sentence: string;
  readonly spec: PlotSpec;
  readonly words: LineChartWords;
  readonly heightPx?: number;
  /** What stands at a sample, in words. */
  readonly pointText: (index: number) => string;
  readonly table?: TableContent;
  /** Labels of lines that are not drawn. */
  readonly hidden?: ReadonlySet<string>;
  /** A view shared with another chart. */
  readonly range?: Interval | undefined;
  readonly onRange?: (range: Interval) => void;
  /** Without its own zoom buttons: another chart moves it along. */
  readonly isFollower?: boolean;
}

const HEIGHT_PX = 260;
const BUTTON_RATIO = 1.8;
/** Samples that the cursor jumps with the shift key. */
const LEAP = 10;

/** The sample that the cursor goes to: from one measured point to the next where a computed curve runs between them. */
function nextStop(spec: PlotSpec, drawn: DrawnPlot, by: number): number | undefined {
  const [low, high] = drawn.range();
  const dots = spec.series.find((series) => series.kind === 'dots');
  const stops = Array.from(spec.x, (_, i) => i).filter(
    (i) => spec.x[i]! >= low && spec.x[i]! <= high && !Number.isNaN(dots?.values[i] ?? 0),
  );
  const pointed = drawn.pointed();
  const from = pointed === undefined ? -1 : stops.findIndex((stop) => stop >= pointed);
  const wanted = from === -1 ? (by > 0 ? 0 : stops.length - 1) : from + by;
  return stops[Math.min(stops.length - 1, Math.max(0, wanted))];
}

/** A plot of lines over an axis, with a sentence, a cursor that says where it stands, and its numbers below. */
export function LineChart(props: LineChartProps) {
  const { name, spec, words, pointText, heightPx = HEIGHT_PX, hidden, range, onRange } = props;
  const host = useRef<HTMLDivElement>(null);
  const { plot, pointed, isZoomed } = usePlot(host, { spec, heightPx, hidden, range, onRange });
  const [spoken, setSpoken] = useState('');

  const zoom = (closer: boolean) => plot.current?.zoom(closer ? BUTTON_RATIO : 1 / BUTTON_RATIO);
  const whole = () => plot.current?.setRange(spec.wholeX);
  const move = (by: number) => {
    const next = plot.current && nextStop(spec, plot.current, by);
    if (next === undefined) return;
    plot.current?.pointAt(next);
    setSpoken(pointText(next));
  };
  const onKey = keyActs({
    ArrowLeft: ({ shiftKey }) => move(shiftKey ? -LEAP : -1),
    ArrowRight: ({ shiftKey }) => move(shiftKey ? LEAP : 1),
    '+': () => zoom(true),
    '=': () => zoom(true),
    '-': () => zoom(false),
    '0': whole,
  });

  return (
    <div class={styles.chart}>
      <div
        role="group"
        tabIndex={0}
        class={styles.group}
        aria-label={`${name}. ${words.keys}`}
        onKeyDown={onKey}
      >
        <div
          ref={host}
          role="img"
          aria-label={props.sentence}
          class={`${styles.host} ${isZoomed ? styles.zoomed : ''}`}
          style={{ blockSize: `${heightPx}px` }}
        />
      </div>
      <p class="unseen" aria-live="polite">
        {spoken}
      </p>
      <div class={`${styles.foot} no-print`}>
        <p class={styles.point} aria-hidden="true">
          {pointed === undefined ? '' : pointText(pointed)}
        </p>
        {!props.isFollower && (
          <ZoomTools words={words} of={name} isZoomed={isZoomed} onZoom={zoom} onWhole={whole} />
        )}
      </div>
      {props.table && <DataTable of={name} {...props.table} />}
    </div>
  );
}
