import { describe, expect, it } from 'vitest';
import { parseNumber } from '../../src/ui/parse-number.ts';

describe('a typed number', () => {
  it.each([
    ['1480', 1480],
    ['1,6', 1.6],
    [' 2.5 ', 2.5],
    ['1 480', 1480],
    ['\u22123', -3],
    ['1e-3', 0.001],
    ['.5', 0.5],
  ])('%j is %d', (typed, value) => {
    expect(parseNumber(typed)).toBe(value);
  });

  it.each(['', '-', 'abc', '1.2.3', '12 Hz', 'Infinity', '0x10', '1,480.5'])('%j is none', (typed) => {
    expect(parseNumber(typed)).toBeUndefined();
  });
});
