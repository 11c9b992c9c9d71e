export interface WantedLabel {
  readonly id: string;
  /** Where its middle would like to be. */
  readonly yPx: number;
  readonly heightPx: number;
  /** Lower is kept first when there is no room for all. */
  readonly rank: number;
}

export interface PlacedLabel {
  readonly id: string;
  readonly yPx: number;
}

export interface SpreadLabels {
  /** From top to bottom; never overlapping, never outside. */
  readonly placed: readonly PlacedLabel[];
  /** Ids of labels for which there was no room. */
  readonly left: readonly string[];
}

/** Keeps the labels of lowest rank until the room is used up. */
const thatFit = (labels: readonly WantedLabel[], roomPx: number): WantedLabel[] => {
  let usedPx = 0;
  return [...labels]
    .sort((a, b) => a.rank - b.rank)
    .filter((label) => {
      const fits = usedPx + label.heightPx <= roomPx;
      if (fits) usedPx += label.heightPx;
      return fits;
    });
};

interface Block {
  sumPx: number;
  count: number;
  readonly meanPx: number;
}

/**
 * Least-squares placement under the order and no-overlap constraints: with the space that the labels before it take
 * subtracted, this is isotonic regression, solved by pooling adjacent violators (Ayer et al. 1955).
 */
const pooled = (wantedPx: readonly number[]): number[] => {
  const block = (sumPx: number, count: number): Block => ({ sumPx, count, meanPx: sumPx / count });
  const blocks: Block[] = [];
  for (const wanted of wantedPx) {
    let last = block(wanted, 1);
    for (let before = blocks.at(-1); before && before.meanPx > last.meanPx; before = blocks.at(-1)) {
      blocks.pop();
      last = block(before.sumPx + last.sumPx, before.count + last.count);
    }
    blocks.push(last);
  }
  return blocks.flatMap((b) => Array.from({ length: b.count }, () => b.meanPx));
};

/** Moves labels as little as possible (least squares) so that none overlaps another or leaves [topPx, bottomPx]. */
export const spreadLabels = (
  labels: readonly WantedLabel[],
  topPx: number,
  bottomPx: number,
): SpreadLabels => {
  const kept = thatFit(labels, bottomPx - topPx).sort((a, b) => a.yPx - b.yPx || a.rank - b.rank);
  const keptIds = new Set(kept.map((label) => label.id));
  let takenPx = 0;
  const offsetsPx = kept.map((label) => {
    const offsetPx = takenPx + label.heightPx / 2;
    takenPx += label.heightPx;
    return offsetPx;
  });
  const slackBottomPx = bottomPx - takenPx;
  const levels = pooled(kept.map((label, i) => label.yPx - offsetsPx[i]!));
  return {
    placed: kept.map((label, i) => ({
      id: label.id,
      yPx: Math.min(slackBottomPx, Math.max(topPx, levels[i]!)) + offsetsPx[i]!,
    })),
    left: labels.filter((label) => !keptIds.has(label.id)).map((label) => label.id),
  };
};
