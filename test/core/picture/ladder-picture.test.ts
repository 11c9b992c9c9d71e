import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ladderRangeHz, type LadderContent } from '../../../src/core/picture/ladder-content.ts';
import { ladderItemAt } from '../../../src/core/picture/ladder-item-at.ts';
import { ladderPicture } from '../../../src/core/picture/ladder-picture.ts';
import { ladderShapes } from '../../../src/core/picture/ladder-shapes.ts';
import { svgText } from '../../../src/core/picture/svg-shape.ts';
import { VERDICTS } from '../../../src/core/model/judgement.ts';
import { verdictShape } from '../../../src/core/picture/verdict-shape.ts';
import { LADDER_EXAMPLES } from '../../support/ladder-examples.ts';

const frequency = fc.double({ min: 0.3, max: 300, noNaN: true });
const words = LADDER_EXAMPLES[0]!.content.words;

const anyContent: fc.Arbitrary<LadderContent> = fc.record({
  words: fc.constant(words),
  modes: fc
    .array(
      fc.record({ frequencyHz: frequency, dampingRatio: fc.double({ min: 0.001, max: 0.2, noNaN: true }) }),
      {
        maxLength: 5,
      },
    )
    .map((modes) =>
      modes.map((m, i) => ({
        ...m,
        id: `m${i}`,
        frequencySdHz: m.frequencyHz * 0.01,
        title: '7.42 Hz',
        detail: '1.1 %',
      })),
    ),
  forcings: fc
    .array(fc.record({ low: frequency, ratio: fc.double({ min: 1, max: 2, noNaN: true }), v: fc.nat(5) }), {
      maxLength: 25,
    })
    .map((list) =>
      list.map(({ low, ratio, v }, i) => {
        const verdict = VERDICTS[v];
        return {
          id: `f${i}`,
          label: `walking ${i}`,
          frequencyHz: [low, low * ratio] as const,
          ...(verdict ? { verdict, modeId: 'm0' } : {}),
        };
      }),
    ),
  tones: fc.constant([]),
  broadPeaks: fc.constant([]),
  seenHz: fc.constant([0.6, 26] as const),
  rateHz: fc.constant(60),
});
const anyView = fc.record({
  widthPx: fc.integer({ min: 300, max: 700 }),
  heightPx: fc.integer({ min: 300, max: 700 }),
  textPx: fc.integer({ min: 10, max: 14 }),
});

describe('ladderPicture', () => {
  it('never lets labels overlap or leave the picture, whatever it shows', () => {
    fc.assert(
      fc.property(anyContent, anyView, (content, view) => {
        const { left, right, axis, columns } = ladderPicture(content, view);
        const rows = [...right.forcings, ...right.tones]
          .flatMap((item) => (item.label ? [item.label.yPx] : []))
          .sort((a, b) => a - b);
        for (const [i, y] of rows.entries()) {
          expect(y).toBeGreaterThanOrEqual(axis.topPx);
          expect(y).toBeLessThanOrEqual(axis.bottomPx);
          if (i > 0) expect(y - rows[i - 1]!).toBeGreaterThanOrEqual(view.textPx * 1.3);
        }
        const leftRows = left.modes.flatMap((m) => (m.label ? [m.label.yPx] : [])).sort((a, b) => a - b);
        for (const [i, y] of leftRows.entries())
          if (i > 0) expect(y - leftRows[i - 1]!).toBeGreaterThanOrEqual(view.textPx * 2.5);
        expect(columns.leftRailPx).toBeGreaterThan(view.widthPx * 0.12);
        expect(columns.labelPx + columns.labelRoomPx).toBeLessThanOrEqual(view.widthPx);
        for (const mode of left.modes) expect(mode.tipPx).toBeGreaterThanOrEqual(0);
        const accounted = right.forcings.length + right.outside.length;
        expect(accounted).toBe(content.forcings.length);
      }),
      { numRuns: 150 },
    );
  });

  it('shows every item in its whole range as far as 400 Hz', () => {
    fc.assert(
      fc.property(anyContent, (content) => {
        const [low, high] = ladderRangeHz(content);
        for (const mode of content.modes) {
          expect(mode.frequencyHz).toBeGreaterThanOrEqual(low);
          expect(mode.frequencyHz).toBeLessThanOrEqual(high);
        }
        expect(high / low).toBeGreaterThan(8);
      }),
    );
  });

  it('marks of a coincident bar only the part that reaches into the mode', () => {
    const { content } = LADDER_EXAMPLES[0]!;
    const { right, axis } = ladderPicture(content, { widthPx: 328, heightPx: 440, textPx: 12 });
    const third = right.forcings.find((f) => f.id === 'f2')!;
    expect(third.overlap!.heightPx).toBeLessThan(third.bar.heightPx / 2);
    expect(third.overlap!.yPx).toBeCloseTo(third.bar.yPx, 6);
    expect(third.bar.yPx).toBeGreaterThan(axis.topPx);
    expect(right.forcings.find((f) => f.id === 'f0')!.overlap).toBeUndefined();
  });

  it('hatches what the recording could not see, and says so', () => {
    const { left, axis } = ladderPicture(LADDER_EXAMPLES[0]!.content, {
      widthPx: 328,
      heightPx: 440,
      textPx: 12,
    });
    expect(left.blind[0]).toMatchObject({ xPx: 0, yPx: axis.topPx, widthPx: 328 });
    expect(left.notes[0]!.lines.join(' ')).toContain('blind above 26 Hz');
  });

  it('keeps lanes while zooming, and lists what left the view', () => {
    const { content } = LADDER_EXAMPLES[1]!;
    const view = { widthPx: 328, heightPx: 440, textPx: 12 };
    const whole = ladderPicture(content, view);
    const close = ladderPicture(content, { ...view, rangeHz: [6, 12] });
    for (const forcing of close.right.forcings)
      expect(forcing.bar.xPx).toBe(whole.right.forcings.find((f) => f.id === forcing.id)!.bar.xPx);
    expect(close.right.outside).toContain('f0');
  });

  it('refuses a size without room for words', () => {
    const { content } = LADDER_EXAMPLES[0]!;
    expect(() => ladderPicture(content, { widthPx: 100, heightPx: 440, textPx: 12 })).toThrow(/no room/);
  });
});

describe('ladderItemAt', () => {
  const picture = ladderPicture(LADDER_EXAMPLES[0]!.content, { widthPx: 328, heightPx: 440, textPx: 12 });

  it('finds a mode on the left, a forcing by its bar and by its label', () => {
    const mode = picture.left.modes[0]!;
    expect(ladderItemAt(picture, 40, mode.yPx)).toBe('m0');
    const fan = picture.right.forcings.find((f) => f.id === 'f3')!;
    expect(ladderItemAt(picture, fan.bar.xPx + 2, fan.bar.yPx + 2)).toBe('f3');
    expect(ladderItemAt(picture, picture.columns.labelPx + 5, fan.label!.yPx)).toBe('f3');
  });

  it('finds nothing where nothing is', () => {
    expect(ladderItemAt(picture, 40, picture.axis.bottomPx - 2)).toBeUndefined();
  });
});

describe('ladderShapes', () => {
  it('holds only finite numbers and words, and escapes them', () => {
    for (const { content } of LADDER_EXAMPLES) {
      const picture = ladderPicture(content, { widthPx: 360, heightPx: 440, textPx: 12 });
      const svg = svgText(ladderShapes(picture, new Set(['m0'])), picture.size, 'a < b & "c"', {
        'ladder-rail': { stroke: '#000' },
      });
      expect(svg).not.toMatch(/NaN|Infinity|undefined/);
      expect(svg).toContain('aria-label="a &lt; b &amp; &quot;c&quot;"');
      expect(svg).toContain('stroke="#000"');
    }
  });
});

describe('verdictShape', () => {
  it('is another drawing for each verdict', () => {
    const drawings = VERDICTS.map((verdict) => JSON.stringify(verdictShape(verdict)));
    expect(new Set(drawings).size).toBe(VERDICTS.length);
  });
});
