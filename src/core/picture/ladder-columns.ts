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

/** Room between the rails beside the digits of a number. */
const RAIL_MARGIN_TEXTS = 1.25;
/** Rails leave room for the four digits of a speed, or for 7.42; the rest are proportions tried on 302, 328, 400 and 560 px (our own, 2026-12). */
const RAIL_LEAST_TEXTS = 3;
const LANE_TEXTS = 0.75;
const LANE_GAP_PX = 2.5;
/** The side of the modes never gets less of the width than this, the labels of the forcings never less than that. */
const LEFT_SHARE = 0.31;
const LABEL_LEAST_SHARE = 0.24;
const LABEL_MOST_SHARE = 0.44;

export const ladderColumns = (
  content: LadderContent,
  size: LadderSize,
  laneCount: number,
  widestNumber: string,
  measure: MeasureText,
): LadderColumns => {
  const { widthPx, textPx } = size;
  const labels = [...content.forcings.map((f) => f.label), ...content.tones.map((t) => t.label)];
  const hasLeft = content.modes.length > 0 || content.seenHz !== undefined;
  const railGapPx = Math.max(
    textPx * RAIL_LEAST_TEXTS,
    measure(widestNumber, textPx * 0.92) + textPx * RAIL_MARGIN_TEXTS,
  );
  const markSizePx = textPx * 1.1;
  const laneWidthPx = Math.max(7, textPx * LANE_TEXTS);
  const laneStepPx = laneWidthPx + LANE_GAP_PX;
  const fixedPx = 4 + markSizePx + 5 + laneCount * laneStepPx + textPx * 0.8 + 6 + railGapPx;
  const leftPx = hasLeft ? widthPx * LEFT_SHARE : textPx;
  const widestPx = Math.max(0, ...labels.map((label) => measure(label, textPx))) + 2;
  const mostPx = Math.min(widthPx * LABEL_MOST_SHARE, widthPx - leftPx - fixedPx);
  // forcings alone stand at the left edge, as a list does
  const labelRoomPx = hasLeft
    ? Math.min(widestPx, Math.max(widthPx * LABEL_LEAST_SHARE, mostPx))
    : Math.max(widthPx * LABEL_LEAST_SHARE, widthPx - leftPx - fixedPx);
  const labelPx = widthPx - labelRoomPx - 4;
  const markPx = labelPx - markSizePx - 5;
  const lanesPx = markPx - laneCount * laneStepPx - textPx * 0.8;
  const rightRailPx = lanesPx - 6;
  return {
    leftRailPx: rightRailPx - railGapPx,
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
