import { useEffect, useRef, useState } from 'preact/hooks';
import type { Interval } from '../../core/model/interval.ts';
import { DataTable, type TableContent } from './data-table.tsx';
import type { DrawnPlot } from './draw-plot.ts';
import styles from './line-chart.module.css';
import { onThemeChange, plotPalette } from './plot-palette.ts';
import type { PlotSpec } from './plot-spec.ts';
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

const isSame = (a: Interval, b: Interval): boolean =>
  Math.abs(a[0] - b[0]) + Math.abs(a[1] - b[1]) < (b[1] - b[0]) * 1e-6;

/** A plot of lines over an axis: loads its drawing code when first shown, follows theme and width; wheel, pinch, drag and keys. */
export function LineChart(props: LineChartProps) {
  const { name, sentence, spec, words, pointText, heightPx = HEIGHT_PX } = props;
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<DrawnPlot | undefined>(undefined);
  const [pointed, setPointed] = useState<number | undefined>();
  const [spoken, setSpoken] = useState('');
  const [shown, setShown] = useState<Interval>(spec.wholeX);
  const latest = useRef(props);
  latest.current = props;
  const isZoomed = !isSame(shown, spec.wholeX);

  useEffect(() => {
    const element = host.current;
    if (!element) return undefined;
    let isGone = false;
    const stops: (() => void)[] = [];
    void import('./draw-plot.ts').then(({ drawPlot }) => {
      if (isGone) return;
      const draw = () => {
        const before = plot.current?.range();
        plot.current?.destroy();
        const size = { widthPx: element.clientWidth, heightPx };
        plot.current = drawPlot(element, spec, plotPalette(element), size, {
          onPoint: setPointed,
          onRange: (range) => {
            setShown(range);
            latest.current.onRange?.(range);
          },
        });
        spec.series.forEach(({ label }, i) => plot.current?.show(i, !latest.current.hidden?.has(label)));
        const wanted = latest.current.range ?? before;
        if (wanted && !isSame(wanted, spec.wholeX)) plot.current.setRange(wanted);
      };
      draw();
      stops.push(onThemeChange(draw));
      const observer = new ResizeObserver(() => plot.current?.resize(element.clientWidth));
      observer.observe(element);
      stops.push(() => observer.disconnect());
    });
    return () => {
      isGone = true;
      for (const stop of stops) stop();
      plot.current?.destroy();
      plot.current = undefined;
    };
  }, [spec, heightPx]);

  useEffect(() => {
    const { range } = props;
    if (range && plot.current && !isSame(range, plot.current.range())) plot.current.setRange(range);
  }, [props.range]);

  useEffect(() => {
    spec.series.forEach(({ label }, index) => plot.current?.show(index, !props.hidden?.has(label)));
  }, [props.hidden, spec]);

  const whole = () => plot.current?.setRange(spec.wholeX);
  const move = (by: number) => {
    const drawn = plot.current;
    if (!drawn) return;
    const [low, high] = drawn.range();
    // keys go from one measured point to the next where a computed curve runs between them
    const dots = spec.series.find((series) => series.kind === 'dots');
    const stops = Array.from(spec.x, (_, i) => i).filter(
      (i) => spec.x[i]! >= low && spec.x[i]! <= high && !Number.isNaN(dots?.values[i] ?? 0),
    );
    const from = stops.findIndex((stop) => stop >= (drawn.pointed() ?? Infinity));
    const wanted = from === -1 ? (by > 0 ? 0 : stops.length - 1) : from + by;
    const next = stops[Math.min(stops.length - 1, Math.max(0, wanted))];
    if (next === undefined) return;
    drawn.pointAt(next);
    setSpoken(pointText(next));
  };
  const onKey = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const acts: Record<string, () => void> = {
      ArrowLeft: () => move(event.shiftKey ? -10 : -1),
      ArrowRight: () => move(event.shiftKey ? 10 : 1),
      '+': () => plot.current?.zoom(BUTTON_RATIO),
      '=': () => plot.current?.zoom(BUTTON_RATIO),
      '-': () => plot.current?.zoom(1 / BUTTON_RATIO),
      '0': whole,
    };
    const act = acts[event.key];
    if (!act) return;
    event.preventDefault();
    act();
  };

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
          aria-label={sentence}
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
          <ZoomTools
            words={words}
            of={name}
            isZoomed={isZoomed}
            onZoom={(closer) => plot.current?.zoom(closer ? BUTTON_RATIO : 1 / BUTTON_RATIO)}
            onWhole={whole}
          />
        )}
      </div>
      {props.table && <DataTable of={name} {...props.table} />}
    </div>
  );
}
