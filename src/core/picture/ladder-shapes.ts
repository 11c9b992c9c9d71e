import type { Verdict } from '../model/judgement.ts';
import type { DrawnForcing, DrawnTone, ForcingLabel } from './ladder-forcings.ts';
import { hatchPath, type Box } from './hatch-path.ts';
import { MODE_LINE_TEXTS, type DrawnMode, type LadderNote } from './ladder-modes.ts';
import type { LadderPicture } from './ladder-picture.ts';
import type { SvgShape } from './svg-shape.ts';
import { VERDICT_BOX_PX, verdictShape } from './verdict-shape.ts';

const HATCH_PX = 7;

const at = (value: number): number => Math.round(value * 10) / 10;

const rect = (kind: string, box: Box, radius = 0): SvgShape => ({
  element: 'rect',
  kind,
  attributes: {
    x: at(box.xPx),
    y: at(box.yPx),
    width: at(Math.max(0, box.widthPx)),
    height: at(Math.max(0, box.heightPx)),
    ...(radius > 0 ? { rx: radius } : {}),
  },
});

const path = (kind: string, d: string): SvgShape => ({ element: 'path', kind, attributes: { d } });

const text = (
  kind: string,
  content: string,
  xPx: number,
  yPx: number,
  sizePx: number,
  anchor = 'start',
): SvgShape => ({
  element: 'text',
  kind: `ladder-text ${kind}`,
  attributes: { x: at(xPx), y: at(yPx), 'font-size': at(sizePx), 'text-anchor': anchor },
  text: content,
});

/** The mark of a verdict with its middle at (x, y). */
export const verdictMark = (verdict: Verdict, xPx: number, yPx: number, sizePx: number): SvgShape[] => {
  const { filled, outline } = verdictShape(verdict);
  const scale = at((sizePx / VERDICT_BOX_PX) * 100) / 100;
  const transform = `translate(${at(xPx - sizePx / 2)} ${at(yPx - sizePx / 2)}) scale(${scale})`;
  const part = (kind: string, d: string): SvgShape[] =>
    d === '' ? [] : [{ element: 'path', kind: `${kind} is-${verdict}`, attributes: { d, transform } }];
  return [...part('mark-fill', filled), ...part('mark-line', outline)];
};

const isDim = (selected: ReadonlySet<string>, id: string): boolean => selected.size > 0 && !selected.has(id);

const railShapes = ({ axis, columns, ticks, size }: LadderPicture): SvgShape[] => {
  const { leftRailPx, rightRailPx } = columns;
  const middle = (leftRailPx + rightRailPx) / 2;
  const rung = size.textPx * 0.42;
  return [
    ...ticks.flatMap((tick) => [
      path(
        'ladder-rung',
        `M${at(leftRailPx)} ${at(tick.yPx)}h${at(rung)}M${at(rightRailPx)} ${at(tick.yPx)}h${at(-rung)}`,
      ),
      text('ladder-number', tick.label, middle, tick.yPx + size.textPx * 0.34, size.textPx * 0.92, 'middle'),
    ]),
    path(
      'ladder-rail',
      `M${at(leftRailPx)} ${at(axis.topPx)}V${at(axis.bottomPx)}M${at(rightRailPx)} ${at(axis.topPx)}V${at(axis.bottomPx)}`,
    ),
  ];
};

const plate = (xPx: number, yPx: number, widthPx: number, heightPx: number): SvgShape =>
  rect('ladder-plate', { xPx: xPx - 3, yPx, widthPx: widthPx + 6, heightPx }, 3);

const modeLabelShapes = (mode: DrawnMode, textPx: number, dim: boolean): SvgShape[] => {
  if (mode.label === undefined) return [];
  const { xPx, yPx, title, detail, leaderPath } = mode.label;
  const dimmed = dim ? ' is-dim' : '';
  return [
    path(`ladder-leader${dimmed}`, leaderPath),
    text(`ladder-title${dimmed}`, title, xPx, yPx - textPx * 0.38, textPx * 1.08),
    text(`ladder-detail${dimmed}`, detail, xPx, yPx + textPx * (MODE_LINE_TEXTS - 0.2), textPx),
  ];
};

const ghostShapes = (mode: DrawnMode, leftRailPx: number): SvgShape[] => [
  ...mode.ghosts.map((ghost) =>
    path(
      'ladder-ghost',
      `M${at(leftRailPx)} ${at(ghost.yPx - 5)}L${at(ghost.tipPx)} ${at(ghost.yPx)}L${at(leftRailPx)} ${at(ghost.yPx + 5)}`,
    ),
  ),
  ...(mode.beforeYPx === undefined || Math.abs(mode.beforeYPx - mode.yPx) < 1
    ? []
    : [
        path('ladder-ghost', `M${at(mode.tipPx)} ${at(mode.beforeYPx)}H${at(leftRailPx)}`),
        path(
          'ladder-move',
          `M${at(leftRailPx - 8)} ${at(mode.beforeYPx)}V${at(mode.yPx)}m-3.5 ${mode.yPx < mode.beforeYPx ? 6 : -6}l3.5 ${mode.yPx < mode.beforeYPx ? -6 : 6}l3.5 ${mode.yPx < mode.beforeYPx ? 6 : -6}`,
        ),
      ]),
];

const labelShapes = (
  picture: LadderPicture,
  label: ForcingLabel,
  verdict: Verdict | undefined,
  kind: string,
): SvgShape[] => {
  const { columns, size } = picture;
  return [
    path(`ladder-leader ${kind}`, label.leaderPath),
    ...(verdict
      ? verdictMark(verdict, columns.markPx + columns.markSizePx / 2, label.yPx, columns.markSizePx)
      : []),
    text(`ladder-label ${kind}`, label.text, columns.labelPx, label.yPx + size.textPx * 0.35, size.textPx),
  ];
};

const forcingShapes = (forcing: DrawnForcing, dim: boolean): SvgShape[] => {
  const kind = `is-${forcing.verdict ?? 'none'}${dim ? ' is-dim' : ''}`;
  const hatch =
    forcing.verdict === 'blind' ? [path(`ladder-bar-hatch ${kind}`, hatchPath(forcing.bar, 4))] : [];
  return [
    ...(forcing.before ? [rect('ladder-before', forcing.before, 1.5)] : []),
    rect(`ladder-bar ${kind}`, forcing.bar, 1.5),
    ...hatch,
    ...(forcing.overlap ? [rect(`ladder-overlap ${kind}`, forcing.overlap, 1.5)] : []),
  ];
};

const toneEnd = (xPx: number, yPx: number, kind: string): SvgShape => ({
  element: 'circle',
  kind: `ladder-tone-end ${kind}`,
  attributes: { cx: at(xPx), cy: at(yPx), r: 3.2 },
});

const toneShapes = (tone: DrawnTone, picture: LadderPicture, dim: boolean): SvgShape[] => {
  const { leftRailPx, rightRailPx } = picture.columns;
  const dimmed = dim ? ' is-dim' : '';
  return [
    path(`ladder-tone${dimmed}`, `M${at(leftRailPx)} ${at(tone.yPx)}H${at(rightRailPx)}`),
    toneEnd(rightRailPx, tone.yPx, dimmed),
  ];
};

const noteShapes = (note: LadderNote, textPx: number): SvgShape[] => [
  plate(note.xPx, note.yPx, note.widthPx, note.lines.length * textPx * 1.2 + 5),
  ...note.lines.map((line, i) =>
    text('ladder-note', line, note.xPx, note.yPx + textPx * (1.0 + i * 1.2), textPx * 0.92),
  ),
];

const zoneShapes = (picture: LadderPicture, selected: ReadonlySet<string>): SvgShape[] =>
  picture.left.modes.flatMap((mode) => [
    ...(selected.has(mode.id)
      ? [
          rect('ladder-zone-close', mode.closeZone),
          path(
            'ladder-zone-edge',
            `M${at(mode.closeZone.xPx)} ${at(mode.closeZone.yPx)}h${at(mode.closeZone.widthPx)}M${at(mode.closeZone.xPx)} ${at(mode.closeZone.yPx + mode.closeZone.heightPx)}h${at(mode.closeZone.widthPx)}`,
          ),
        ]
      : []),
    rect(`ladder-zone${isDim(selected, mode.id) ? ' is-dim' : ''}`, mode.coincidentZone),
  ]);

const amplificationShapes = ({ left, size, axis, words }: LadderPicture): SvgShape[] => {
  if (left.amplificationTicks.length === 0) return [];
  const sizePx = size.textPx * 0.84;
  return [
    ...left.amplificationTicks.map((tick, i) =>
      text(
        'ladder-scale',
        tick.label,
        tick.xPx,
        axis.bottomPx + size.textPx * 1.3,
        sizePx,
        i === 0 ? 'end' : i === left.amplificationTicks.length - 1 ? 'start' : 'middle',
      ),
    ),
    text('ladder-scale', words.amplification, 6, axis.bottomPx + size.textPx * 2.5, sizePx),
  ];
};

const headShapes = ({ words, columns, size, left }: LadderPicture): SvgShape[] => {
  const yPx = size.textPx;
  const middle = (columns.leftRailPx + columns.rightRailPx) / 2;
  const hasLeft = left.modes.length > 0 || left.notes.length > 0 || left.blind.length > 0;
  return [
    ...(hasLeft ? [text('ladder-head', words.structure, 6, yPx, size.textPx * 0.92)] : []),
    text('ladder-head', words.sources, columns.lanesPx, yPx, size.textPx * 0.92),
    text('ladder-head', words.unit, middle, yPx, size.textPx * 0.92, 'middle'),
  ];
};

/** Everything to draw, from back to front. `selected`: ids of modes, forcings and tones to stand out; empty for none. */
export const ladderShapes = (
  picture: LadderPicture,
  selected: ReadonlySet<string> = new Set(),
): SvgShape[] => {
  const { left, right, size, columns } = picture;
  const labelKind = (id: string): string =>
    selected.has(id) ? 'is-picked' : isDim(selected, id) ? 'is-dim' : '';
  return [
    ...headShapes(picture),
    ...left.blind.map((box) => path('ladder-hatch', hatchPath(box, HATCH_PX))),
    rect('ladder-between', {
      xPx: columns.leftRailPx,
      yPx: picture.axis.topPx,
      widthPx: columns.rightRailPx - columns.leftRailPx,
      heightPx: picture.axis.bottomPx - picture.axis.topPx,
    }),
    ...zoneShapes(picture, selected),
    ...(left.profilePath ? [path('ladder-profile', left.profilePath)] : []),
    ...left.peaks.map((peak) =>
      path(
        'ladder-peak',
        `M${at(columns.leftRailPx)} ${at(peak.yPx)}Q${at(peak.tipPx)} ${at(peak.yPx + peak.heightPx / 2)} ${at(columns.leftRailPx)} ${at(peak.yPx + peak.heightPx)}`,
      ),
    ),
    ...left.modes.flatMap((mode) => mode.bands.map((box) => rect('ladder-band', box))),
    ...left.modes.flatMap((mode) => ghostShapes(mode, columns.leftRailPx)),
    ...railShapes(picture),
    ...right.forcings.flatMap((f) => forcingShapes(f, isDim(selected, f.id))),
    ...right.images
      .filter(({ id }) => selected.has(id))
      .map((image) => path('ladder-image', `M${at(columns.rightRailPx + 1)} ${at(image.yPx)}l6 -3.5v7z`)),
    ...right.tones.flatMap((tone) => toneShapes(tone, picture, isDim(selected, tone.id))),
    ...left.modes.flatMap((mode) => modeLabelShapes(mode, size.textPx, isDim(selected, mode.id))),
    ...left.notes.flatMap((note) => noteShapes(note, size.textPx)),
    ...right.forcings.flatMap((f) =>
      f.label ? labelShapes(picture, f.label, f.verdict, labelKind(f.id)) : [],
    ),
    ...right.tones.flatMap((t): SvgShape[] =>
      t.label
        ? [
            ...labelShapes(picture, t.label, undefined, labelKind(t.id)),
            toneEnd(columns.markPx + columns.markSizePx / 2, t.label.yPx, labelKind(t.id)),
          ]
        : [],
    ),
    ...amplificationShapes(picture),
  ];
};
