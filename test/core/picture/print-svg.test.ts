import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ladderSvg } from '../../../src/core/picture/ladder-svg.ts';
import { lineSvg } from '../../../src/core/picture/line-svg.ts';
import { LADDER_EXAMPLES } from '../../support/ladder-examples.ts';

const size = { widthPx: 400, heightPx: 240, textPx: 10 };

describe('ladderSvg', () => {
  it('is one element in one ink with its sentence, for every example', () => {
    for (const { name, content } of LADDER_EXAMPLES) {
      const svg = ladderSvg(content, { widthPx: 360, heightPx: 440, textPx: 11 }, `Ladder of ${name}`);
      expect(svg).toMatch(/^<svg [^>]*role="img" aria-label="Ladder of [^"]*">.*<\/svg>$/s);
      expect(svg).not.toMatch(/NaN|Infinity|#[0-9a-f]{3}/);
      for (const colour of svg.matchAll(/(?:fill|stroke)="([^"]+)"/g))
        expect(['none', 'currentColor', 'Canvas']).toContain(colour[1]);
    }
  });
});

describe('lineSvg', () => {
  it('draws axes with their units, every mark and one path a series', () => {
    const svg = lineSvg(
      {
        x: [0, 1, 2, 3],
        xLabel: 'frequency, Hz',
        yLabel: 'amplitude, m/s²',
        series: [
          { label: 'fit', values: [0, 2, 1, 0], kind: 'line' },
          { label: 'measured', values: [0.1, 1.9, 1, 0], kind: 'dots' },
        ],
        marks: [{ at: 1, label: '1.00 Hz' }],
      },
      size,
      'A peak at 1 Hz',
    );
    for (const words of ['frequency, Hz', 'amplitude, m/s²', '1.00 Hz', 'A peak at 1 Hz'])
      expect(svg).toContain(words);
    expect(svg.match(/stroke-linecap="round"/g)).toHaveLength(1);
  });

  it('stays finite and inside its size, whatever is drawn, also on a logarithmic axis', () => {
    const values = fc.array(fc.double({ min: 0, max: 1e3, noNaN: true }), { minLength: 1, maxLength: 40 });
    fc.assert(
      fc.property(values, fc.option(fc.integer({ min: 2, max: 6 }), { nil: undefined }), (list, decades) => {
        const svg = lineSvg(
          {
            x: list.map((_, i) => i),
            xLabel: '',
            yLabel: '',
            series: [{ label: '', values: list, kind: 'line' }],
            marks: [],
            ...(decades === undefined ? {} : { decades }),
          },
          size,
          '',
        );
        expect(svg).not.toMatch(/NaN|Infinity/);
        for (const [, x, y] of svg.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)) {
          expect(Number(x)).toBeGreaterThanOrEqual(0);
          expect(Number(x)).toBeLessThanOrEqual(size.widthPx);
          expect(Number(y)).toBeGreaterThanOrEqual(0);
          expect(Number(y)).toBeLessThanOrEqual(size.heightPx);
        }
      }),
    );
  });
});
