import type { Interval } from '../model/interval.ts';
import { ladderColumns, type LadderColumns, type LadderSize } from './ladder-columns.ts';
import { ladderRangeHz, type LadderContent } from './ladder-content.ts';
import { forcingLanes, ladderRight, type LadderRight } from './ladder-forcings.ts';
import { ladderLeft, type LadderLeft } from './ladder-modes.ts';
import { logAxis, type LogAxis } from './log-axis.ts';
import { logTicks, type AxisTick } from './log-ticks.ts';
import { estimatedTextPx, type MeasureText } from './text-width.ts';

export interface LadderView extends LadderSize {
  /** The part shown; the whole ladder where absent. */
  readonly rangeHz?: Interval;
  /** 1 for Hz, 60 for r/min. */
  readonly shownPerHz?: number;
  readonly measure?: MeasureText;
}

/** Where everything of a ladder lies, in px. Pure: the same content and view give the same picture on screen and paper. */
export interface LadderPicture {
  readonly size: LadderSize;
  readonly axis: LogAxis;
  readonly columns: LadderColumns;
  readonly words: LadderContent['words'];
  readonly ticks: readonly AxisTick[];
  readonly left: LadderLeft;
  readonly right: LadderRight;
}

/** @throws RangeError when the view is smaller than 12 texts in either direction. */
export const ladderPicture = (content: LadderContent, view: LadderView): LadderPicture => {
  const { widthPx, heightPx, textPx, measure = estimatedTextPx, shownPerHz = 1 } = view;
  if (!(textPx > 0) || widthPx < 12 * textPx || heightPx < 12 * textPx)
    throw new RangeError(`ladderPicture: ${widthPx} by ${heightPx} px has no room for text of ${textPx} px`);
  const size: LadderSize = { widthPx, heightPx, textPx };
  const topPx = textPx * 2;
  const bottomPx = heightPx - textPx * 2.9;
  const wholeHz = ladderRangeHz(content);
  const axis = logAxis(view.rangeHz ?? wholeHz, topPx, bottomPx);
  const lanes = forcingLanes(content, logAxis(wholeHz, topPx, bottomPx));
  const laneCount = Math.max(1, ...lanes.map((lane) => lane + 1));
  // by the whole range, so that the rails stand still while the view is zoomed
  const widestNumber = String(Math.round(wholeHz[1] * shownPerHz));
  const columns = ladderColumns(content, size, laneCount, widestNumber, measure);
  return {
    size,
    axis,
    columns,
    words: content.words,
    ticks: logTicks(axis, textPx * 1.45, shownPerHz),
    left: ladderLeft(axis, columns, size, content, measure),
    right: ladderRight(axis, columns, size, content, lanes, measure),
  };
};
