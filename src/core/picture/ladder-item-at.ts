import type { LadderPicture } from './ladder-picture.ts';

/** Half the height of a gloved finger's target. */
export const FINGER_PX = 24;

interface Reachable {
  readonly id: string;
  readonly distancePx: number;
}

const nearestOf = (items: readonly Reachable[]): string | undefined =>
  items.filter((item) => item.distancePx <= FINGER_PX).sort((a, b) => a.distancePx - b.distancePx)[0]?.id;

const toBar = (yPx: number, top: number, height: number): number =>
  yPx < top ? top - yPx : Math.max(0, yPx - top - height);

/** Id of what lies nearest to a point: modes left of the rails' middle, forcings and tones right of it. */
export const ladderItemAt = (
  { left, right, columns }: LadderPicture,
  xPx: number,
  yPx: number,
): string | undefined => {
  const middle = (columns.leftRailPx + columns.rightRailPx) / 2;
  if (xPx < middle)
    return nearestOf(
      left.modes.map((mode) => ({
        id: mode.id,
        distancePx: Math.min(Math.abs(yPx - mode.yPx), Math.abs(yPx - (mode.label?.yPx ?? mode.yPx))),
      })),
    );
  const isOnLabels = xPx >= columns.markPx - 4;
  return nearestOf([
    ...right.forcings.map((f) => ({
      id: f.id,
      distancePx: isOnLabels && f.label ? Math.abs(yPx - f.label.yPx) : toBar(yPx, f.bar.yPx, f.bar.heightPx),
    })),
    ...right.tones.map((t) => ({
      id: t.id,
      distancePx: Math.abs(yPx - (isOnLabels && t.label ? t.label.yPx : t.yPx)),
    })),
  ]);
};
