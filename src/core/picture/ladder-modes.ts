import type { LadderColumns, LadderSize } from './ladder-columns.ts';
import type { LadderContent, LadderMode } from './ladder-content.ts';
import type { Box } from './hatch-path.ts';
import { hzToY, type LogAxis } from './log-axis.ts';
import { modeBandHz } from './mode-band.ts';
import { forceAmplification, resonanceProfile } from './resonance-profile.ts';
import { separationZones } from './separation-zones.ts';
import { spreadLabels, type WantedLabel } from './spread-labels.ts';
import { wrappedText, type MeasureText } from './text-width.ts';

export interface ModeLabel {
  readonly xPx: number;
  readonly yPx: number;
  readonly title: string;
  readonly detail: string;
  readonly widthPx: number;
  readonly leaderPath: string;
}

export interface DrawnMode {
  readonly id: string;
  readonly yPx: number;
  readonly tipPx: number;
  /** Nested boxes of bandwidth and uncertainty, widest first, across the rails. */
  readonly bands: readonly Box[];
  readonly coincidentZone: Box;
  readonly closeZone: Box;
  /** Absent where there was no room. */
  readonly label?: ModeLabel;
  readonly ghosts: readonly { readonly yPx: number; readonly tipPx: number }[];
  readonly beforeYPx?: number;
}

/** A few lines of quiet text on the side of the modes. */
export interface LadderNote {
  readonly xPx: number;
  readonly yPx: number;
  readonly lines: readonly string[];
  readonly widthPx: number;
}

export interface LadderLeft {
  readonly modes: readonly DrawnMode[];
  readonly profilePath: string;
  readonly amplificationTicks: readonly { readonly xPx: number; readonly label: string }[];
  readonly peaks: readonly { readonly yPx: number; readonly heightPx: number; readonly tipPx: number }[];
  readonly blind: readonly Box[];
  readonly notes: readonly LadderNote[];
}

/** Amplification at the far end of the profile's logarithmic scale; 100 is a damping ratio of 0.5 %. */
const PROFILE_END_RATIO = 100;
const LEFT_EDGE_PX = 6;
export const MODE_LINE_TEXTS = 1.28;

const at = (value: number): string => value.toFixed(1);

interface Left {
  readonly axis: LogAxis;
  readonly columns: LadderColumns;
  readonly size: LadderSize;
  readonly measure: MeasureText;
}

const amplificationX = ({ columns }: Left, ratio: number): number => {
  const share = Math.min(1, Math.max(0, Math.log(Math.max(ratio, 1e-9)) / Math.log(PROFILE_END_RATIO)));
  return columns.leftRailPx - share * (columns.leftRailPx - LEFT_EDGE_PX);
};

const boxBetween = (
  { axis }: Left,
  [lowHz, highHz]: readonly [number, number],
  fromPx: number,
  toPx: number,
): Box => {
  const top = Math.max(axis.topPx, Math.min(axis.bottomPx, hzToY(axis, highHz)));
  const bottom = Math.max(axis.topPx, Math.min(axis.bottomPx, hzToY(axis, lowHz)));
  return { xPx: fromPx, yPx: top, widthPx: toPx - fromPx, heightPx: Math.max(0, bottom - top) };
};

const profilePath = (left: Left, modes: readonly LadderMode[]): string => {
  const points = resonanceProfile(
    modes.filter((mode) => !mode.isUnsure),
    left.axis.rangeHz,
  );
  if (points.length === 0) return '';
  const rail = at(left.columns.leftRailPx);
  const line = points.map(
    (p) => `L${at(amplificationX(left, p.amplificationRatio))} ${at(hzToY(left.axis, p.frequencyHz))}`,
  );
  return `M${rail} ${at(left.axis.bottomPx)}${line.join('')}L${rail} ${at(left.axis.topPx)}Z`;
};

const drawnMode = (left: Left, mode: LadderMode): Omit<DrawnMode, 'label'> => {
  const { axis, columns } = left;
  const zones = separationZones(mode);
  const endPx = columns.markPx - 3;
  const tipPx = amplificationX(left, forceAmplification(mode.frequencyHz, mode));
  const inView = (f: number): boolean => f >= axis.rangeHz[0] && f <= axis.rangeHz[1];
  return {
    id: mode.id,
    yPx: hzToY(axis, mode.frequencyHz),
    tipPx,
    bands: modeBandHz(mode).map((hz) => boxBetween(left, hz, columns.leftRailPx, columns.rightRailPx)),
    coincidentZone: boxBetween(left, zones.coincidentHz, columns.leftRailPx, endPx),
    closeZone: boxBetween(left, zones.closeHz, columns.leftRailPx, endPx),
    ghosts: [...(mode.isUnsure ? [mode.frequencyHz] : []), ...(mode.candidatesHz ?? [])]
      .filter(inView)
      .map((f) => ({ yPx: hzToY(axis, f), tipPx })),
    ...(mode.beforeHz !== undefined && inView(mode.beforeHz)
      ? { beforeYPx: hzToY(axis, mode.beforeHz) }
      : {}),
  };
};

/** Quiet notes (blind ranges, "no mode") take part in the spreading, so that no label covers another. */
const wantedNotes = (left: Left, content: LadderContent, blind: readonly Box[]) => {
  const { axis, columns, size, measure } = left;
  const textPx = size.textPx * 0.92;
  const roomPx = columns.leftRailPx - LEFT_EDGE_PX - 8;
  const note = (id: string, text: string, yPx: number, rank: number) => {
    const lines = wrappedText(text, roomPx, textPx, measure);
    const heightPx = lines.length * size.textPx * 1.2 + 6;
    return { wanted: { id, yPx, heightPx, rank } satisfies WantedLabel, lines, heightPx };
  };
  const notes = blind
    .filter((box) => box.heightPx > size.textPx)
    .map((box) => {
      const isUpper = box.yPx <= axis.topPx + 0.5;
      const text = isUpper ? content.words.blindAbove : content.words.blindBelow;
      return note(isUpper ? 'above' : 'below', text, box.yPx + box.heightPx / 2, 900);
    });
  if (content.modes.length === 0 && content.seenHz !== undefined && content.words.noMode !== '')
    notes.push(note('no-mode', content.words.noMode, (axis.topPx + axis.bottomPx) / 2, 0));
  return notes;
};

const blindBoxes = (left: Left, content: LadderContent): Box[] => {
  if (content.seenHz === undefined) return [];
  const [lowHz, highHz] = left.axis.rangeHz;
  const [seenLowHz, seenHighHz] = content.seenHz;
  const boxes: Box[] = [];
  const width = left.size.widthPx;
  if (seenHighHz < highHz) boxes.push(boxBetween(left, [Math.max(lowHz, seenHighHz), highHz], 0, width));
  if (seenLowHz > lowHz) boxes.push(boxBetween(left, [lowHz, Math.min(highHz, seenLowHz)], 0, width));
  return boxes.filter((box) => box.heightPx > 0);
};

const modeLabel = (left: Left, mode: LadderMode, drawn: Omit<DrawnMode, 'label'>, yPx: number): ModeLabel => {
  const { size, measure } = left;
  const widthPx = Math.max(measure(mode.title, size.textPx) * 1.08, measure(mode.detail, size.textPx));
  const tip = Math.min(drawn.tipPx, left.columns.leftRailPx - 4);
  const shiftedPx = Math.abs(yPx - drawn.yPx);
  const bend = Math.max(LEFT_EDGE_PX, Math.min(tip - shiftedPx, LEFT_EDGE_PX + widthPx));
  const straight = `M${at(LEFT_EDGE_PX)} ${at(yPx)}`;
  return {
    xPx: LEFT_EDGE_PX,
    yPx,
    title: mode.title,
    detail: mode.detail,
    widthPx,
    leaderPath:
      shiftedPx < 1
        ? `${straight}H${at(tip)}`
        : `${straight}H${at(bend)}L${at(Math.max(bend, tip))} ${at(drawn.yPx)}`,
  };
};

/** The side of the structure: profile, bands, labels, blind ranges. */
export const ladderLeft = (
  axis: LogAxis,
  columns: LadderColumns,
  size: LadderSize,
  content: LadderContent,
  measure: MeasureText,
): LadderLeft => {
  const left: Left = { axis, columns, size, measure };
  const visible = content.modes.filter(
    (m) => m.frequencyHz >= axis.rangeHz[0] && m.frequencyHz <= axis.rangeHz[1],
  );
  const drawn = content.modes.map((mode) => drawnMode(left, mode));
  const blind = blindBoxes(left, content);
  const notes = wantedNotes(left, content, blind);
  const heightPx = size.textPx * MODE_LINE_TEXTS * 2 + 4;
  const wanted = visible.map((mode) => ({
    id: mode.id,
    yPx: hzToY(axis, mode.frequencyHz),
    heightPx,
    rank: 1 + content.modes.indexOf(mode),
  }));
  const { placed } = spreadLabels([...wanted, ...notes.map((n) => n.wanted)], axis.topPx, axis.bottomPx);
  const yOf = new Map(placed.map((p) => [p.id, p.yPx]));
  return {
    modes: content.modes.map((mode, i) => {
      const yPx = yOf.get(mode.id);
      return { ...drawn[i]!, ...(yPx === undefined ? {} : { label: modeLabel(left, mode, drawn[i]!, yPx) }) };
    }),
    profilePath: profilePath(left, content.modes),
    amplificationTicks:
      content.modes.length === 0
        ? []
        : [1, 10, PROFILE_END_RATIO].map((ratio) => ({
            xPx: amplificationX(left, ratio),
            label: `×${ratio}`,
          })),
    peaks: content.broadPeaks.map((peak) => {
      const box = boxBetween(
        left,
        [Math.max(1e-3, peak.frequencyHz - peak.widthHz / 2), peak.frequencyHz + peak.widthHz / 2],
        0,
        1,
      );
      return { yPx: box.yPx, heightPx: box.heightPx, tipPx: columns.leftRailPx - size.textPx * 3 };
    }),
    blind,
    notes: notes.flatMap(({ wanted: { id }, lines, heightPx: noteHeightPx }) => {
      const yPx = yOf.get(id);
      const widthPx = Math.max(...lines.map((line) => measure(line, size.textPx * 0.92)));
      return yPx === undefined ? [] : [{ xPx: LEFT_EDGE_PX, yPx: yPx - noteHeightPx / 2, lines, widthPx }];
    }),
  };
};
