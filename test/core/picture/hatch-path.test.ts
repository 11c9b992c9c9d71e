import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldedFrequencyHz } from '../../../src/core/picture/folded-frequency.ts';
import { hatchPath } from '../../../src/core/picture/hatch-path.ts';
import { estimatedTextPx, fittedText, wrappedText } from '../../../src/core/picture/text-width.ts';

const numbersOf = (path: string) => (path.match(/-?[\d.]+/g) ?? []).map(Number);

describe('hatchPath', () => {
  it('stays inside its box', () => {
    const size = fc.integer({ min: 1, max: 300 });
    fc.assert(
      fc.property(size, size, size, size, fc.integer({ min: 3, max: 12 }), (x, y, width, height, spacing) => {
        const numbers = numbersOf(hatchPath({ xPx: x, yPx: y, widthPx: width, heightPx: height }, spacing));
        for (let i = 0; i < numbers.length; i += 2) {
          expect(numbers[i]!).toBeGreaterThanOrEqual(x - 0.06);
          expect(numbers[i]!).toBeLessThanOrEqual(x + width + 0.06);
          expect(numbers[i + 1]!).toBeGreaterThanOrEqual(y - 0.06);
          expect(numbers[i + 1]!).toBeLessThanOrEqual(y + height + 0.06);
        }
      }),
    );
  });

  it('is nothing for an empty box and refuses no spacing', () => {
    expect(hatchPath({ xPx: 0, yPx: 0, widthPx: 0, heightPx: 10 }, 5)).toBe('');
    expect(() => hatchPath({ xPx: 0, yPx: 0, widthPx: 5, heightPx: 10 }, 0)).toThrow(RangeError);
  });
});

describe('foldedFrequencyHz', () => {
  it('folds about half the rate', () => {
    expect(foldedFrequencyHz(20, 60)).toBe(20);
    expect(foldedFrequencyHz(40, 60)).toBe(20);
    expect(foldedFrequencyHz(120, 60)).toBe(0);
    expect(foldedFrequencyHz(124, 60)).toBe(4);
  });

  it('always appears between 0 and half the rate, as the same samples', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 500, noNaN: true }), (f) => {
        const seen = foldedFrequencyHz(f, 60);
        expect(seen).toBeGreaterThanOrEqual(0);
        expect(seen).toBeLessThanOrEqual(30);
        // equal cosines at the sample times are what folding means
        expect(Math.cos((2 * Math.PI * f * 7) / 60)).toBeCloseTo(Math.cos((2 * Math.PI * seen * 7) / 60), 6);
      }),
    );
  });

  it('refuses no rate', () => expect(() => foldedFrequencyHz(1, 0)).toThrow(RangeError));
});

describe('fittedText and wrappedText', () => {
  it('cut with an ellipsis and break at spaces', () => {
    expect(fittedText('pump', 100, 10, estimatedTextPx)).toBe('pump');
    expect(fittedText('air handler two', 58, 10, estimatedTextPx)).toBe('air handl…');
    expect(wrappedText('blind above 26 Hz', 60, 10, estimatedTextPx)).toEqual(['blind', 'above 26', 'Hz']);
  });
});
