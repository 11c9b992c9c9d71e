import type { RefObject } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Interval } from '../../core/model/interval.ts';
import type { DrawnPlot } from './draw-plot.ts';
import { onThemeChange, plotPalette } from './plot-palette.ts';
import type { PlotSpec } from './plot-spec.ts';

const isSame = (a: Interval, b: Interval): boolean =>
  Math.abs(a[0] - b[0]) + Math.abs(a[1] - b[1]) < (b[1] - b[0]) * 1e-6;

export interface PlotOptions {
  readonly spec: PlotSpec;
  readonly heightPx: number;
  readonly hidden: ReadonlySet<string> | undefined;
  readonly range: Interval | undefined;
  readonly onRange: ((range: Interval) => void) | undefined;
}

export interface LivePlot {
  /** Undefined until the drawing code is loaded. */
  readonly plot: RefObject<DrawnPlot | undefined>;
  /** Index of the sample under the cursor. */
  readonly pointed: number | undefined;
  readonly isZoomed: boolean;
}

const showLines = (plot: DrawnPlot | undefined, spec: PlotSpec, hidden: ReadonlySet<string> | undefined) =>
  spec.series.forEach(({ label }, index) => plot?.show(index, !hidden?.has(label)));

/** A plot in an element: its drawing code is loaded when first shown; it follows data, theme, width, hidden lines and a shared view. */
export function usePlot(host: RefObject<HTMLDivElement | null>, options: PlotOptions): LivePlot {
  const { spec, heightPx } = options;
  const plot = useRef<DrawnPlot | undefined>(undefined);
  const latest = useRef(options);
  latest.current = options;
  const [pointed, setPointed] = useState<number | undefined>();
  const [shown, setShown] = useState<Interval>(spec.wholeX);

  useEffect(() => {
    const element = host.current;
    if (!element) return undefined;
    const stops: (() => void)[] = [];
    let isGone = false;
    const start = async () => {
      const { drawPlot } = await import('./draw-plot.ts');
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
        showLines(plot.current, spec, latest.current.hidden);
        const wanted = latest.current.range ?? before;
        if (wanted && !isSame(wanted, spec.wholeX)) plot.current.setRange(wanted);
      };
      draw();
      stops.push(onThemeChange(draw));
      const observer = new ResizeObserver(() => plot.current?.resize(element.clientWidth));
      observer.observe(element);
      stops.push(() => observer.disconnect());
    };
    void start();
    return () => {
      isGone = true;
      for (const stop of stops) stop();
      plot.current?.destroy();
      plot.current = undefined;
      setShown(spec.wholeX);
    };
  }, [spec, heightPx]);

  useEffect(() => {
    const { range } = options;
    if (range && plot.current && !isSame(range, plot.current.range())) plot.current.setRange(range);
  }, [options.range]);
  useEffect(() => showLines(plot.current, spec, options.hidden), [options.hidden, spec]);

  return { plot, pointed, isZoomed: !isSame(shown, spec.wholeX) };
}
