export interface Box {
  readonly xPx: number;
  readonly yPx: number;
  readonly widthPx: number;
  readonly heightPx: number;
}

const at = (value: number): string => value.toFixed(1);

/**
 * Diagonal hatching of a box as one SVG path, every line cut at the box. A path rather than a pattern: it needs no id,
 * prints everywhere and follows forced colours.
 */
export const hatchPath = ({ xPx, yPx, widthPx, heightPx }: Box, spacingPx: number): string => {
  if (!(spacingPx > 0)) throw new RangeError(`hatchPath: spacingPx must be > 0, got ${spacingPx}`);
  if (widthPx <= 0 || heightPx <= 0) return '';
  const right = xPx + widthPx;
  const bottom = yPx + heightPx;
  const lines: string[] = [];
  // Lines x + y = s; anchored to the plane, not the box, so that neighbouring boxes line up.
  for (let s = Math.ceil((xPx + yPx) / spacingPx) * spacingPx; s <= right + bottom; s += spacingPx) {
    const fromX = Math.max(xPx, s - bottom);
    const toX = Math.min(right, s - yPx);
    if (toX > fromX) lines.push(`M${at(fromX)} ${at(s - fromX)}L${at(toX)} ${at(s - toX)}`);
  }
  return lines.join('');
};
