import type { LadderContent } from './ladder-content.ts';
import type { MeasureText } from './text-width.ts';

/** Where the columns of a ladder stand, left to right: mode labels and profile, rails, lanes, marks, forcing labels. */
export interface LadderColumns {
  readonly leftRailPx: number;
  readonly rightRailPx: number;
  readonly lanesPx: number;
  readonly laneWidthPx: number;
  readonly laneStepPx: number;
  readonly laneCount: number;
  readonly markPx: number;
  readonly markSizePx: number;
  readonly labelPx: number;
  readonly labelRoomPx: number;
}

export interface LadderSize {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Size of the labels; everything else follows it, so that larger text keeps its room. */
  readonly textPx: number;
}

/** Rails must leave room for four digits; the rest are proportions tried on 328, 400 and 560 px (our own, 2026-12). */
const RAIL_GAP_TEXTS = 3.2;
const LANE_TEXTS = 0.85;
const LABEL_SHARE = 0.4;
const LABEL_SHARE_WITHOUT_MODES = 0.46;

export const ladderColumns = (
  content: LadderContent,
  size: LadderSize,
  laneCount: number,
  measure: MeasureText,
): LadderColumns => {
  const { widthPx, textPx } = size;
  const labels = [...content.forcings.map((f) => f.label), ...content.tones.map((t) => t.label)];
  const hasLeft = content.modes.length > 0;
  const roomPx = widthPx * (hasLeft ? LABEL_SHARE : LABEL_SHARE_WITHOUT_MODES);
  const widestPx = Math.max(0, ...labels.map((label) => measure(label, textPx)));
  const labelRoomPx = Math.min(widestPx + 2, roomPx);
  const markSizePx = textPx * 1.1;
  const laneWidthPx = Math.max(7, textPx * LANE_TEXTS);
  const laneStepPx = laneWidthPx + 3;
  const labelPx = widthPx - labelRoomPx - 4;
  const markPx = labelPx - markSizePx - 5;
  const lanesPx = markPx - laneCount * laneStepPx - textPx * 0.8;
  const rightRailPx = lanesPx - 6;
  return {
    leftRailPx: rightRailPx - textPx * RAIL_GAP_TEXTS,
    rightRailPx,
    lanesPx,
    laneWidthPx,
    laneStepPx,
    laneCount,
    markPx,
    markSizePx,
    labelPx,
    labelRoomPx,
  };
};
