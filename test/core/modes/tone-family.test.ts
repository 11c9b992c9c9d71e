import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../src/core/model/analysis.ts';
import { withFamilies } from '../../../src/core/modes/tone-family.ts';
import { verticalShare } from '../../../src/core/modes/direction.ts';

const toneAt = (frequencyHz: number): Tone => ({
  frequencyHz,
  frequencySdHz: 0.0005,
  amplitudeMps2: 1,
  amplitudeSdMps2: 0.01,
  direction: [0, 0, 1],
  nature: 'forced',
  fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
});
const ordersOf = (...frequencies: number[]): (readonly [number | undefined, number | undefined])[] =>
  withFamilies(frequencies.map(toneAt), 1 / 60).map((t) => [t.familyHz, t.familyOrder] as const);

describe('withFamilies', () => {
  it('gives multiples their fundamental and order, whatever their strength', () => {
    expect(ordersOf(57.45, 19.15, 38.3)).toEqual([
      [19.15, 3],
      [19.15, 1],
      [19.15, 2],
    ]);
  });

  it('prefers the largest family: a stride carries the steps', () => {
    expect(ordersOf(1.7, 0.85, 2.55, 3.4)).toEqual([
      [0.85, 2],
      [0.85, 1],
      [0.85, 3],
      [0.85, 4],
    ]);
  });

  it('leaves alone what is no multiple', () => {
    expect(ordersOf(10, 20.4, 13.7)).toEqual([
      [undefined, undefined],
      [undefined, undefined],
      [undefined, undefined],
    ]);
  });
});

describe('verticalShare', () => {
  it('is the squared cosine to gravity, unknown without it', () => {
    expect(verticalShare([0.6, 0, 0.8], [0, 0, 1])).toBeCloseTo(0.64, 9);
    expect(verticalShare([0, 0, 1], undefined)).toBeUndefined();
    expect(verticalShare([1], [0, 0, 1])).toBeUndefined();
  });
});
