/** The only file that imports uPlot; loaded when the first plot is shown. */
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import type { Interval } from '../../core/model/interval.ts';
import { movedRange, rangeShare } from '../../core/picture/moved-range.ts';
import { attachGestures } from './attach-gestures.ts';
import type { PlotPalette } from './plot-palette.ts';
import type { PlotSeries, PlotSpec } from './plot-spec.ts';

export interface DrawnPlot {
  range(): Interval;
  setRange(range: Interval): void;
  zoom(factor: number): void;
  resize(widthPx: number): void;
  /** Draws a line or leaves it out, by its index. */
  show(seriesIndex: number, isShown: boolean): void;
  /** Moves the cursor to a sample; undefined takes it away. */
  pointAt(index: number | undefined): void;
  pointed(): number | undefined;
  destroy(): void;
}

export interface PlotEvents {
  /** The cursor stands on a sample, or on none. */
  readonly onPoint: (index: number | undefined) => void;
  readonly onRange: (range: Interval) => void;
}

const DOT_PX = 3.5;
/** Rows of labels above a plot with marks. */
const MARK_ROWS = 2;
const MARK_LINE_TEXTS = 1.25;
const DASHES: Readonly<Record<PlotSeries['kind'], number[] | undefined>> = {
  line: undefined,
  dots: undefined,
  dashes: [6, 4],
  dotted: [1.5, 3],
};

const seriesOptions = (series: PlotSeries, palette: PlotPalette): uPlot.Series => {
  const stroke = palette.colour(series.colour);
  const dash = DASHES[series.kind];
  return {
    label: series.label,
    stroke,
    width: series.kind === 'dots' ? 0 : 1.5,
    spanGaps: true,
    ...(dash ? { dash } : {}),
    points: series.kind === 'dots' ? { show: true, size: DOT_PX, fill: stroke, width: 0 } : { show: false },
    ...(series.kind === 'dots' ? { paths: () => null } : {}),
  };
};

/** Of a logarithmic axis only whole decades are drawn: the lines between them would hide the curve. */
const decadesOnly = (_: uPlot, splits: number[]): (number | null)[] =>
  splits.map((value) => (Math.abs(Math.log10(value) - Math.round(Math.log10(value))) < 1e-9 ? value : null));

const axisOptions = (label: string, side: number, palette: PlotPalette, isLog = false): uPlot.Axis => ({
  label,
  side,
  stroke: palette.colour('--text-quiet'),
  font: palette.font,
  labelFont: palette.font,
  labelSize: palette.textPx * 1.7,
  labelGap: 0,
  size: side === 3 ? palette.textPx * 3.6 : palette.textPx * 2.2,
  gap: 4,
  space: side === 3 ? palette.textPx * 3 : palette.textPx * 4.5,
  grid: { stroke: palette.colour('--chart-grid'), width: 1, ...(isLog ? { filter: decadesOnly } : {}) },
  ticks: {
    stroke: palette.colour('--edge-strong'),
    width: 1,
    size: 5,
    ...(isLog ? { filter: decadesOnly } : {}),
  },
  ...(isLog ? { filter: decadesOnly } : {}),
  ...(side === 3 ? { values: (_: uPlot, splits: number[]) => splits.map(tickText) } : {}),
});

const tickText = (value: number | null): string =>
  value === null
    ? ''
    : value !== 0 && Math.abs(value) < 1e-3
      ? value.toExponential(0)
      : String(+value.toPrecision(4));

/** A logarithmic axis cannot show zero: values at or below the floor lie on it. */
const drawable = (values: ArrayLike<number>, floor: number | undefined): (number | null)[] =>
  Array.from(values, (value) => {
    if (Number.isNaN(value)) return null;
    return floor === undefined ? value : Math.max(floor, value);
  });

const hatched = (plot: uPlot, [from, to]: Interval, colour: string) => {
  const { ctx, bbox } = plot;
  const left = Math.max(bbox.left, plot.valToPos(from, 'x', true));
  const right = Math.min(bbox.left + bbox.width, plot.valToPos(to, 'x', true));
  if (right - left < 1) return;
  const step = 7 * devicePixelRatio;
  ctx.save();
  ctx.beginPath();
  ctx.rect(left, bbox.top, right - left, bbox.height);
  ctx.clip();
  ctx.strokeStyle = colour;
  ctx.lineWidth = devicePixelRatio;
  ctx.globalAlpha = 0.5;
  ctx.beginPath();
  for (let x = left - bbox.height; x < right; x += step) {
    ctx.moveTo(x, bbox.top + bbox.height);
    ctx.lineTo(x + bbox.height, bbox.top);
  }
  ctx.stroke();
  ctx.restore();
};

const marked = (plot: uPlot, spec: PlotSpec, palette: PlotPalette) => {
  const { ctx, bbox } = plot;
  const px = devicePixelRatio;
  const line = palette.textPx * px * MARK_LINE_TEXTS;
  ctx.save();
  ctx.font = palette.font.replace(/^[\d.]+px/, `${palette.textPx * px}px`);
  ctx.textBaseline = 'top';
  ctx.textAlign = 'left';
  const taken: number[] = [];
  for (const mark of spec.marks) {
    const x = plot.valToPos(mark.at, 'x', true);
    if (x < bbox.left || x > bbox.left + bbox.width) continue;
    ctx.strokeStyle = palette.colour(mark.colour);
    ctx.lineWidth = 1.2 * px;
    ctx.setLineDash(mark.isDashed ? [4 * px, 3 * px] : []);
    ctx.beginPath();
    ctx.moveTo(x, bbox.top);
    ctx.lineTo(x, bbox.top + bbox.height);
    ctx.stroke();
    const width = ctx.measureText(mark.label).width;
    const start = Math.min(bbox.left + bbox.width - width, Math.max(bbox.left, x - width / 2));
    // above the plot, so that no label covers a peak; one that would cover another goes a row up, or is left out
    let row = 0;
    while (taken[row] !== undefined && start < taken[row]!) row += 1;
    if (row >= MARK_ROWS) continue;
    taken[row] = start + width + 6 * px;
    ctx.fillStyle = palette.colour('--text');
    ctx.fillText(mark.label, start, bbox.top - (row + 1) * line);
  }
  ctx.restore();
};

const headTexts = (spec: PlotSpec): number =>
  spec.marks.length === 0 ? 0.6 : 0.3 + Math.min(MARK_ROWS, spec.marks.length) * MARK_LINE_TEXTS;

/** Draws a plot into an element; the element keeps its height. */
export function drawPlot(
  host: HTMLElement,
  spec: PlotSpec,
  palette: PlotPalette,
  size: { readonly widthPx: number; readonly heightPx: number },
  events: PlotEvents,
): DrawnPlot {
  let range: Interval = spec.wholeX;
  const data = [
    Array.from(spec.x),
    ...spec.series.map((series) => drawable(series.values, spec.isLogY ? spec.floorY : undefined)),
  ] as uPlot.AlignedData;
  const plot = new uPlot(
    {
      width: size.widthPx,
      height: size.heightPx,
      padding: [palette.textPx * headTexts(spec), palette.textPx * 0.9, 0, 0],
      legend: { show: false },
      cursor: {
        drag: { x: false, y: false },
        y: false,
        points: { size: 7, width: 1.5 },
      },
      scales: {
        x: { time: false, range: () => [range[0], range[1]] },
        y: {
          distr: spec.isLogY ? 3 : 1,
          ...(spec.rangeY ? { range: [spec.rangeY[0], spec.rangeY[1]] as uPlot.Range.MinMax } : {}),
        },
      },
      axes: [axisOptions(spec.xLabel, 2, palette), axisOptions(spec.yLabel, 3, palette, spec.isLogY)],
      series: [{}, ...spec.series.map((series) => seriesOptions(series, palette))],
      hooks: {
        drawAxes: [
          (self) => spec.shades.forEach((shade) => hatched(self, shade, palette.colour('--chart-hatch'))),
        ],
        draw: [(self) => marked(self, spec, palette)],
        setCursor: [(self) => events.onPoint(self.cursor.idx ?? undefined)],
      },
    },
    data,
    host,
  );
  const setRange = (next: Interval) => {
    range = next;
    plot.setScale('x', { min: next[0], max: next[1] });
    events.onRange(next);
  };
  const isZoomed = () => rangeShare(range, spec.wholeX) < 0.999;
  const detach = attachGestures(host, {
    along: 'x',
    isZoomed,
    zoomAt: (factor, clientX) => {
      const about = plot.posToVal(clientX - plot.over.getBoundingClientRect().left, 'x');
      setRange(movedRange(range, spec.wholeX, { factor, about }));
    },
    panBy: (pixels) => setRange(movedRange(range, spec.wholeX, { shift: -pixels / plot.over.clientWidth })),
    began: () => undefined,
    dragged: () => undefined,
  });
  return {
    range: () => range,
    setRange,
    zoom: (factor) => setRange(movedRange(range, spec.wholeX, { factor })),
    resize: (widthPx) => plot.setSize({ width: widthPx, height: size.heightPx }),
    show: (index, isShown) => {
      if (plot.series[index + 1]?.show !== isShown) plot.setSeries(index + 1, { show: isShown });
    },
    pointAt: (index) => {
      const value = index === undefined ? undefined : plot.data[0][index];
      const left = value === undefined ? -10 : plot.valToPos(value, 'x');
      plot.setCursor({ left, top: value === undefined ? -10 : plot.over.clientHeight / 2 });
    },
    pointed: () => plot.cursor.idx ?? undefined,
    destroy: () => {
      detach();
      plot.destroy();
    },
  };
}
