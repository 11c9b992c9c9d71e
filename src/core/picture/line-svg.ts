import type { Interval } from '../model/interval.ts';
import { linearTicks } from './linear-ticks.ts';
import { svgText, type SvgPaint, type SvgShape } from './svg-shape.ts';

export interface LineSvgSeries {
  readonly label: string;
  readonly values: ArrayLike<number>;
  /** Where its values stand, where that is not the plot's own `x`. */
  readonly x?: ArrayLike<number>;
  /** `dots` for what was measured. */
  readonly kind: 'line' | 'dots' | 'dashes';
}

export interface LineSvgContent {
  readonly x: ArrayLike<number>;
  readonly xLabel: string;
  readonly yLabel: string;
  readonly series: readonly LineSvgSeries[];
  /** Marked places on the x axis, e.g. modes. */
  readonly marks: readonly { readonly at: number; readonly label: string }[];
  /** Logarithmic y axis with so many decades below the largest value. */
  readonly decades?: number;
}

export interface LineSvgSize {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly textPx: number;
}

const INK = 'currentColor';
const PRINT_PAINT: SvgPaint = {
  'plot-text': { fill: INK, 'font-family': 'sans-serif' },
  'plot-grid': { fill: 'none', stroke: INK, 'stroke-width': 0.5, opacity: 0.25 },
  'plot-edge': { fill: 'none', stroke: INK, 'stroke-width': 1 },
  'plot-line': { fill: 'none', stroke: INK, 'stroke-width': 1.1, 'stroke-linejoin': 'round' },
  'plot-dashes': { fill: 'none', stroke: INK, 'stroke-width': 1, 'stroke-dasharray': '4 3' },
  'plot-dots': { fill: 'none', stroke: INK, 'stroke-width': 2.2, 'stroke-linecap': 'round' },
  'plot-mark': { fill: 'none', stroke: INK, 'stroke-width': 0.8, 'stroke-dasharray': '2 2' },
};

interface Scale {
  readonly toPx: (value: number) => number;
  readonly ticks: readonly { readonly px: number; readonly label: string }[];
}

const at = (value: number): number => Math.round(value * 10) / 10;
const plain = (value: number): string => String(Number(value.toPrecision(5)));

const linearScale = ([low, high]: Interval, fromPx: number, toPx: number, gapPx: number): Scale => {
  const position = (value: number) => fromPx + ((value - low) / (high - low)) * (toPx - fromPx);
  const smallest = ((high - low) * gapPx) / Math.abs(toPx - fromPx);
  return {
    toPx: position,
    ticks: linearTicks(low, high, smallest).map((value) => ({ px: position(value), label: plain(value) })),
  };
};

const decadeScale = (largest: number, decades: number, fromPx: number, toPx: number): Scale => {
  const top = Math.ceil(Math.log10(largest));
  const floor = top - decades;
  const position = (value: number) =>
    fromPx + ((Math.max(floor, Math.log10(Math.max(value, 1e-300))) - floor) / decades) * (toPx - fromPx);
  return {
    toPx: position,
    ticks: Array.from({ length: decades + 1 }, (_, i) => ({
      px: position(10 ** (floor + i)),
      label: floor + i < -3 ? `1e${floor + i}` : plain(10 ** (floor + i)),
    })),
  };
};

const extent = (lists: readonly ArrayLike<number>[]): Interval => {
  let low = Infinity;
  let high = -Infinity;
  for (const list of lists)
    for (let i = 0; i < list.length; i += 1) {
      low = Math.min(low, list[i]!);
      high = Math.max(high, list[i]!);
    }
  return low <= high ? [low, high] : [0, 1];
};
const widened = ([low, high]: Interval): Interval => (high > low ? [low, high] : [low - 1, high + 1]);

const seriesPath = (series: LineSvgSeries, plotX: ArrayLike<number>, across: Scale, up: Scale): string => {
  const x = series.x ?? plotX;
  const parts: string[] = [];
  for (let i = 0; i < x.length; i += 1) {
    const point = `${at(across.toPx(x[i]!))} ${at(up.toPx(series.values[i] ?? 0))}`;
    parts.push(series.kind === 'dots' ? `M${point}h0` : `${i === 0 ? 'M' : 'L'}${point}`);
  }
  return parts.join('');
};

const text = (content: string, x: number, y: number, sizePx: number, anchor: string): SvgShape => ({
  element: 'text',
  kind: 'plot-text',
  attributes: { x: at(x), y: at(y), 'font-size': at(sizePx), 'text-anchor': anchor },
  text: content,
});
const path = (kind: string, d: string): SvgShape => ({ element: 'path', kind, attributes: { d } });

/** A plot of lines as an SVG element in one ink, for printed reports: axes with units, grid, marks. */
export function lineSvg(content: LineSvgContent, size: LineSvgSize, sentence: string): string {
  const { widthPx, heightPx, textPx } = size;
  const [left, right] = [textPx * 4.6, widthPx - textPx];
  const [top, bottom] = [textPx * 1.6, heightPx - textPx * 3.2];
  const values = content.series.map((series) => series.values);
  const [low, high] = widened(extent(values));
  const across = linearScale(widened(extent([content.x])), left, right, textPx * 5);
  const up =
    content.decades === undefined
      ? linearScale([low, high], bottom, top, textPx * 2)
      : decadeScale(Math.max(high, 1e-300), content.decades, bottom, top);
  const shapes: SvgShape[] = [
    ...across.ticks.map((tick) => path('plot-grid', `M${at(tick.px)} ${at(top)}V${at(bottom)}`)),
    ...up.ticks.map((tick) => path('plot-grid', `M${at(left)} ${at(tick.px)}H${at(right)}`)),
    ...content.marks.flatMap((mark) => [
      path('plot-mark', `M${at(across.toPx(mark.at))} ${at(top)}V${at(bottom)}`),
      text(mark.label, across.toPx(mark.at), top - textPx * 0.4, textPx, 'middle'),
    ]),
    ...content.series.map((series) => path(`plot-${series.kind}`, seriesPath(series, content.x, across, up))),
    path('plot-edge', `M${at(left)} ${at(top)}V${at(bottom)}H${at(right)}`),
    ...across.ticks.map((tick) => text(tick.label, tick.px, bottom + textPx * 1.3, textPx, 'middle')),
    ...up.ticks.map((tick) => text(tick.label, left - 5, tick.px + textPx * 0.35, textPx, 'end')),
    text(content.xLabel, (left + right) / 2, heightPx - textPx * 0.5, textPx, 'middle'),
    {
      element: 'text',
      kind: 'plot-text',
      attributes: {
        'font-size': at(textPx),
        'text-anchor': 'middle',
        transform: `translate(${at(textPx)} ${at((top + bottom) / 2)}) rotate(-90)`,
      },
      text: content.yLabel,
    },
  ];
  return svgText(shapes, size, sentence, PRINT_PAINT);
}
