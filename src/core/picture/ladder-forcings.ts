import type { Interval } from '../model/interval.ts';
import type { Verdict } from '../model/judgement.ts';
import type { LadderColumns, LadderSize } from './ladder-columns.ts';
import type { LadderContent, LadderForcing } from './ladder-content.ts';
import { foldedFrequencyHz } from './folded-frequency.ts';
import type { Box } from './hatch-path.ts';
import { lanesOf } from './lanes.ts';
import { hzToY, type LogAxis } from './log-axis.ts';
import { separationZones } from './separation-zones.ts';
import { spreadLabels } from './spread-labels.ts';
import { fittedText, type MeasureText } from './text-width.ts';

export interface ForcingLabel {
  readonly yPx: number;
  readonly text: string;
  readonly leaderPath: string;
}

export interface DrawnForcing {
  readonly id: string;
  readonly verdict: Verdict | undefined;
  readonly bar: Box;
  /** The part of the bar that reaches into the coincident zone of its mode. */
  readonly overlap?: Box;
  readonly before?: Box;
  readonly label?: ForcingLabel;
}

export interface DrawnTone {
  readonly id: string;
  readonly yPx: number;
  readonly label?: ForcingLabel;
}

export interface LadderRight {
  readonly forcings: readonly DrawnForcing[];
  readonly tones: readonly DrawnTone[];
  /** Where forcings above half the rate appear, on the right rail. */
  readonly images: readonly { readonly id: string; readonly yPx: number }[];
  /** Ids of forcings and tones that are drawn without a label for want of room. */
  readonly unlabelled: readonly string[];
  /** Ids of forcings and tones outside of the view. */
  readonly outside: readonly string[];
}

const BAR_LEAST_PX = 3;
const LABEL_TEXTS = 1.32;
export const MOST_LANES = 4;
/** Which labels go first when there is no room: the ones a person must act on stay. */
const RANK: Readonly<Record<Verdict | 'none', number>> = {
  coincident: 0,
  undecided: 100,
  close: 200,
  blind: 400,
  apart: 500,
  none: 600,
};
const TONE_RANK = 300;

const at = (value: number): string => value.toFixed(1);

const spanPx = (axis: LogAxis, [lowHz, highHz]: Interval): Interval => {
  const top = hzToY(axis, highHz);
  const bottom = hzToY(axis, lowHz);
  const missing = Math.max(0, BAR_LEAST_PX - (bottom - top)) / 2;
  return [top - missing, bottom + missing];
};

const isInView = (axis: LogAxis, [lowHz, highHz]: Interval): boolean =>
  highHz >= axis.rangeHz[0] && lowHz <= axis.rangeHz[1];

/** Lanes are dealt over the whole range, so that a bar keeps its lane while the view is zoomed. */
export const forcingLanes = (content: LadderContent, wholeAxis: LogAxis): number[] =>
  lanesOf(
    content.forcings.map((f) => spanPx(wholeAxis, f.frequencyHz)),
    MOST_LANES,
    4,
  );

interface Right {
  readonly axis: LogAxis;
  readonly columns: LadderColumns;
  readonly content: LadderContent;
}

const barOf = ({ axis, columns }: Right, hz: Interval, lane: number): Box => {
  const [top, bottom] = spanPx(axis, hz);
  const clippedTop = Math.max(axis.topPx, Math.min(axis.bottomPx - BAR_LEAST_PX, top));
  const clippedBottom = Math.min(axis.bottomPx, Math.max(clippedTop + BAR_LEAST_PX, bottom));
  return {
    xPx: columns.lanesPx + lane * columns.laneStepPx,
    yPx: clippedTop,
    widthPx: columns.laneWidthPx,
    heightPx: clippedBottom - clippedTop,
  };
};

const overlapOf = (right: Right, forcing: LadderForcing, bar: Box): Box | undefined => {
  const mode = right.content.modes.find((m) => m.id === forcing.modeId);
  if (mode === undefined || forcing.verdict !== 'coincident') return undefined;
  const [zoneLowHz, zoneHighHz] = separationZones(mode).coincidentHz;
  const top = Math.max(bar.yPx, hzToY(right.axis, zoneHighHz));
  const bottom = Math.min(bar.yPx + bar.heightPx, hzToY(right.axis, zoneLowHz));
  // a verdict counts both uncertainties, so a coincident bar may stop short of the zone: then its near end is marked
  if (bottom - top >= BAR_LEAST_PX) return { ...bar, yPx: top, heightPx: bottom - top };
  const nearTop = hzToY(right.axis, mode.frequencyHz) < bar.yPx + bar.heightPx / 2;
  const heightPx = Math.min(bar.heightPx, BAR_LEAST_PX);
  return { ...bar, yPx: nearTop ? bar.yPx : bar.yPx + bar.heightPx - heightPx, heightPx };
};

const leader = ({ columns }: Right, fromX: number, fromY: number, toY: number): string => {
  const end = columns.markPx - 2;
  const bend = Math.max(fromX, columns.lanesPx + columns.laneCount * columns.laneStepPx);
  return `M${at(fromX + 1)} ${at(fromY)}H${at(bend)}L${at(end)} ${at(toY)}`;
};

interface Anchor {
  readonly id: string;
  readonly fromX: number;
  readonly fromY: number;
  readonly text: string;
  readonly rank: number;
}

/** The side of the sources: bars in lanes, measured tones, folded images, labels. */
export const ladderRight = (
  axis: LogAxis,
  columns: LadderColumns,
  size: LadderSize,
  content: LadderContent,
  lanes: readonly number[],
  measure: MeasureText,
): LadderRight => {
  const right: Right = { axis, columns, content };
  const bars = content.forcings.map((f, i) => barOf(right, f.frequencyHz, lanes[i] ?? 0));
  const overlaps = content.forcings.map((f, i) => overlapOf(right, f, bars[i]!));
  const seenForcings = content.forcings.filter((f) => isInView(axis, f.frequencyHz));
  const seenTones = content.tones.filter((t) => isInView(axis, [t.frequencyHz, t.frequencyHz]));
  const anchors: Anchor[] = [
    ...seenForcings.map((f): Anchor => {
      const index = content.forcings.indexOf(f);
      const box = overlaps[index] ?? bars[index]!;
      return {
        id: f.id,
        fromX: box.xPx + box.widthPx,
        fromY: box.yPx + box.heightPx / 2,
        text: f.label,
        rank: RANK[f.verdict ?? 'none'] + index,
      };
    }),
    ...seenTones.map((t, i): Anchor => ({
      id: t.id,
      fromX: columns.rightRailPx + size.textPx * 0.35,
      fromY: hzToY(axis, t.frequencyHz),
      text: t.label,
      rank: TONE_RANK + i,
    })),
  ];
  const heightPx = size.textPx * LABEL_TEXTS;
  const { placed, left } = spreadLabels(
    anchors.map((a) => ({ id: a.id, yPx: a.fromY, heightPx, rank: a.rank })),
    axis.topPx,
    axis.bottomPx,
  );
  const yOf = new Map(placed.map((p) => [p.id, p.yPx]));
  const anchorOf = new Map(anchors.map((a) => [a.id, a]));
  const labelOf = (id: string): { label?: ForcingLabel } => {
    const yPx = yOf.get(id);
    const anchor = anchorOf.get(id);
    if (yPx === undefined || anchor === undefined) return {};
    const text = fittedText(anchor.text, columns.labelRoomPx, size.textPx, measure);
    return { label: { yPx, text, leaderPath: leader(right, anchor.fromX, anchor.fromY, yPx) } };
  };
  const seen = new Set(anchors.map((a) => a.id));
  return {
    forcings: content.forcings.flatMap((f): DrawnForcing[] => {
      if (!seen.has(f.id)) return [];
      const index = content.forcings.indexOf(f);
      const overlap = overlaps[index];
      return [
        {
          id: f.id,
          verdict: f.verdict,
          bar: bars[index]!,
          ...(overlap ? { overlap } : {}),
          ...(f.beforeHz && isInView(axis, f.beforeHz)
            ? { before: barOf(right, f.beforeHz, lanes[index] ?? 0) }
            : {}),
          ...labelOf(f.id),
        },
      ];
    }),
    tones: seenTones.map((t) => ({ id: t.id, yPx: hzToY(axis, t.frequencyHz), ...labelOf(t.id) })),
    images: imagesOf(axis, content),
    unlabelled: left,
    outside: [...content.forcings, ...content.tones].map((item) => item.id).filter((id) => !seen.has(id)),
  };
};

const imagesOf = (axis: LogAxis, { forcings, rateHz }: LadderContent): LadderRight['images'] => {
  if (rateHz === undefined) return [];
  return forcings
    .filter((f) => f.frequencyHz[0] > rateHz / 2)
    .map((f) => ({
      id: f.id,
      frequencyHz: foldedFrequencyHz((f.frequencyHz[0] + f.frequencyHz[1]) / 2, rateHz),
    }))
    .filter(({ frequencyHz }) => isInView(axis, [frequencyHz, frequencyHz]))
    .map(({ id, frequencyHz }) => ({ id, yPx: hzToY(axis, frequencyHz) }));
};
