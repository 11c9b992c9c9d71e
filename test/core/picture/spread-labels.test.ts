import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lanesOf } from '../../../src/core/picture/lanes.ts';
import { spreadLabels } from '../../../src/core/picture/spread-labels.ts';

const label = (id: string, yPx: number, heightPx = 20, rank = 0) => ({ id, yPx, heightPx, rank });

describe('spreadLabels', () => {
  it('leaves labels alone that have room', () => {
    const { placed, left } = spreadLabels([label('a', 50), label('b', 100)], 0, 200);
    expect(placed).toEqual([
      { id: 'a', yPx: 50 },
      { id: 'b', yPx: 100 },
    ]);
    expect(left).toEqual([]);
  });

  it('moves two that want the same place equally far apart', () => {
    const { placed } = spreadLabels([label('a', 100), label('b', 100)], 0, 200);
    expect(placed.map((p) => p.yPx)).toEqual([90, 110]);
  });

  it('leaves out the highest ranks when there is no room for all', () => {
    const { placed, left } = spreadLabels(
      [label('a', 10, 20, 5), label('b', 12, 20, 1), label('c', 14, 20, 3)],
      0,
      45,
    );
    expect(placed.map((p) => p.id)).toEqual(['b', 'c']);
    expect(left).toEqual(['a']);
  });

  it('never overlaps, never leaves the room, keeps the order, loses nothing', () => {
    const many = fc.array(
      fc.record({
        yPx: fc.double({ min: -50, max: 450, noNaN: true }),
        heightPx: fc.integer({ min: 8, max: 40 }),
        rank: fc.integer({ min: 0, max: 5 }),
      }),
      { maxLength: 40 },
    );
    fc.assert(
      fc.property(many, (wanted) => {
        const labels = wanted.map((w, i) => ({ ...w, id: `l${i}` }));
        const byId = new Map(labels.map((l) => [l.id, l]));
        const { placed, left } = spreadLabels(labels, 0, 400);
        expect(placed.length + left.length).toBe(labels.length);
        let lastEnd = 0;
        let lastWanted = -Infinity;
        for (const { id, yPx } of placed) {
          const { heightPx, yPx: wantedPx } = byId.get(id)!;
          expect(yPx - heightPx / 2).toBeGreaterThanOrEqual(lastEnd - 1e-6);
          expect(yPx + heightPx / 2).toBeLessThanOrEqual(400 + 1e-6);
          expect(wantedPx).toBeGreaterThanOrEqual(lastWanted);
          lastEnd = yPx + heightPx / 2;
          lastWanted = wantedPx;
        }
      }),
    );
  });
});

describe('lanesOf', () => {
  it('needs one lane for spans that follow each other and two for two that overlap', () => {
    expect(lanesOf([[0, 10], [20, 30]], 4, 4)).toEqual([0, 0]); // prettier-ignore
    expect(lanesOf([[0, 25], [20, 30]], 4, 4)).toEqual([0, 1]); // prettier-ignore
  });

  it('never lets spans of one lane touch while there are lanes enough', () => {
    const span = fc.tuple(fc.integer({ min: 0, max: 300 }), fc.integer({ min: 0, max: 60 }));
    fc.assert(
      fc.property(fc.array(span, { maxLength: 20 }), (given) => {
        const spans = given.map(([start, length]) => [start, start + length] as const);
        const lanes = lanesOf(spans, spans.length + 1, 3);
        for (const [i, a] of spans.entries())
          for (const [j, b] of spans.entries())
            if (i < j && lanes[i] === lanes[j]) expect(a[0] >= b[1] + 3 || b[0] >= a[1] + 3).toBe(true);
      }),
    );
  });

  it('refuses no lanes', () => {
    expect(() => lanesOf([[0, 1]], 0, 1)).toThrow(RangeError);
  });
});
