import type { LadderContent } from './ladder-content.ts';
import { ladderPicture, type LadderView } from './ladder-picture.ts';
import { ladderShapes } from './ladder-shapes.ts';
import { svgText, type SvgPaint } from './svg-shape.ts';

const INK = 'currentColor';
const line = (width: number, more: Readonly<Record<string, string | number>> = {}) => ({
  fill: 'none',
  stroke: INK,
  'stroke-width': width,
  ...more,
});
const tint = (opacity: number) => ({ fill: INK, opacity });

/** One ink on paper: verdicts are told by shape and word, bars by fill, dash and hatching. Also safe on a copying machine. */
const PRINT_PAINT: SvgPaint = {
  // a halo keeps words legible over hatching and lines
  'ladder-text': {
    fill: INK,
    'font-family': 'sans-serif',
    stroke: 'Canvas',
    'stroke-width': 3,
    'stroke-linejoin': 'round',
    'paint-order': 'stroke',
  },
  'ladder-title': { 'font-weight': 650 },
  'ladder-hatch': line(0.7, { opacity: 0.5 }),
  'ladder-between': { fill: 'Canvas' },
  'ladder-plate': { fill: 'Canvas', opacity: 0.9 },
  'ladder-zone': tint(0.1),
  'ladder-profile': { ...line(1.2), fill: INK, 'fill-opacity': 0.08 },
  'ladder-peak': line(1.2, { 'stroke-dasharray': '3 3' }),
  'ladder-band': tint(0.28),
  'ladder-rail': line(1.5),
  'ladder-rung': line(1.1),
  'ladder-leader': line(0.7, { opacity: 0.7 }),
  'ladder-ghost': line(1.1, { 'stroke-dasharray': '2.5 2.5' }),
  'ladder-bar': { ...line(1.2), 'fill-opacity': 0.15 },
  'ladder-bar-hatch': line(0.8),
  'ladder-overlap': { fill: INK },
  'ladder-tone': line(1.8),
  'ladder-tone-end': { fill: 'Canvas', stroke: INK, 'stroke-width': 1.8 },
  'mark-fill': { fill: INK },
  'mark-line': line(1.7),
  'is-undecided': { 'stroke-dasharray': '3 2' },
};

/** The ladder as an SVG element in one ink, for printed reports and files that are read without the program. */
export const ladderSvg = (content: LadderContent, view: LadderView, sentence: string): string => {
  const picture = ladderPicture(content, view);
  return svgText(ladderShapes(picture), picture.size, sentence, PRINT_PAINT);
};
