import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatInterval, formatNumber, numberText, withUncertainty } from '../../src/text/number.ts';
import {
  formatAcceleration,
  formatDamping,
  formatDisplacement,
  formatFrequency,
  formatFrequencyRange,
  formatPercent,
  formatSpeed,
  formatVelocity,
  fromUnit,
  toUnit,
} from '../../src/text/quantity.ts';

describe('numbers', () => {
  it('are cut by their uncertainty; ± is the half-width of a 95 % interval', () => {
    expect(withUncertainty(7.4213, 0.0153, 'Hz')).toBe('7.42 Hz ± 0.03');
    expect(withUncertainty(1.1034, 0.1, '%')).toBe('1.1 % ± 0.2');
    expect(withUncertainty(1.1034, 0.06, '%')).toBe('1.10 % ± 0.12');
    expect(withUncertainty(1483.2, 15)).toBe('1480 ± 30');
    expect(withUncertainty(1483.2, 60)).toBe('1480 ± 120');
    expect(withUncertainty(0.00312, 0.00021)).toBe('0.0031 ± 0.0004');
    expect(withUncertainty(7.4213, undefined, 'Hz')).toBe('7.42 Hz');
    expect(withUncertainty(7.4213, 0)).toBe('7.42');
    expect(withUncertainty(-7.4213, 0.5)).toBe('−7.4 ± 1.0');
  });
  it('read without exponent, with so many digits', () => {
    expect([0, 0.00312, 7.4213, 999.6, 1483.2, -2.5].map((value) => formatNumber(value))).toEqual([
      '0',
      '0.00312',
      '7.42',
      '1000',
      '1480',
      '−2.50',
    ]);
    expect(formatInterval([4.8, 7.2])).toBe('4.8 to 7.2');
    expect(formatInterval([5, 5.01])).toBe('5.0');
    expect(formatInterval([5, Infinity])).toBe('5.0 to no limit');
  });
  it('never understate the uncertainty by more than 5 %, nor overstate it by more than the next digit', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e4, noNaN: true }), (sd) => {
        const shown = Number(numberText(100, sd).plusMinus);
        expect(shown).toBeGreaterThanOrEqual(1.96 * sd * 0.9499);
        // of 100 four figures reach to the first decimal
        expect(shown).toBeLessThanOrEqual(1.96 * sd + Math.max(0.1, 0.5 * 1.96 * sd) + 1e-9);
      }),
    );
  });
  it('show four figures at most, with ± rounded up to the last of them', () => {
    expect(withUncertainty(16.16663, 0.000025, 'Hz')).toBe('16.17 Hz ± 0.01');
    expect(withUncertainty(7.3999, 0.00026, 'Hz')).toBe('7.400 Hz ± 0.001');
    expect(withUncertainty(7.3999, 0.0026, 'Hz')).toBe('7.400 Hz ± 0.005');
    expect(withUncertainty(1483.2, 0.001)).toBe('1483 ± 1');
    expect(withUncertainty(0.4, 0.3)).toBe('0.4 ± 0.6');
  });
  it('show value and ± with like decimals', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 1e4, noNaN: true }),
        fc.double({ min: 1e-5, max: 100, noNaN: true }),
        (value, sd) => {
          const text = numberText(value, sd);
          const decimals = (digits: string) => digits.split('.')[1]?.length ?? 0;
          expect(decimals(text.value)).toBe(decimals(text.plusMinus!));
        },
      ),
    );
  });
});

describe('quantities', () => {
  it('come in the units people choose', () => {
    expect(formatFrequency(24.667, 0.01)).toBe('24.67 Hz ± 0.02');
    expect(formatFrequency(24.667, 0.01, 'r/min')).toBe('1480 r/min ± 2');
    expect(formatAcceleration(0.9)).toBe('0.900 m/s²');
    expect(formatAcceleration(9.80665, undefined, 'g')).toBe('1.00 g');
    expect(formatVelocity(0.0045)).toBe('4.50 mm/s');
    expect(formatDisplacement(29e-6, 1e-6)).toBe('29 µm ± 2');
    expect(formatDamping(0.011, 0.001)).toBe('1.1 % ± 0.2');
    expect(formatFrequencyRange([4.8, 7.2])).toBe('4.80 to 7.20 Hz');
    expect(formatPercent(0.034)).toBe('3.4 %');
    expect(formatSpeed(1479.6)).toBe('1480 r/min');
  });
  it('go to every unit and back', () => {
    const units = fc.constantFrom(
      'Hz',
      'r/min',
      'm/s²',
      'g',
      'mg',
      'mm/s',
      'm/s',
      'in/s',
      'µm',
      'mm',
      'mil' as const,
    );
    fc.assert(
      fc.property(units, fc.double({ min: 1e-12, max: 1e6, noNaN: true }), (unit, si) => {
        const back = fromUnit(toUnit(si, unit as 'Hz'), unit as 'Hz');
        expect(Math.abs(back - si)).toBeLessThanOrEqual(1e-12 * Math.abs(si));
      }),
    );
  });
});
