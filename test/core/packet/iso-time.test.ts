import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseIsoStamp, secondsToIso } from '../../../src/core/packet/iso-time.ts';

describe('parseIsoStamp and secondsToIso', () => {
  it('agree with the platform calendar from 1970 to 2100, leap days included', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 4_102_444_800_000 }), (epochMs) => {
        const iso = new Date(epochMs).toISOString();
        expect(secondsToIso(epochMs / 1000)).toBe(iso);
        const stamp = parseIsoStamp(iso)!;
        expect(Math.round((stamp.wholeS + stamp.fractionS) * 1000)).toBe(epochMs);
        expect(stamp.isInstant).toBe(true);
      }),
    );
  });

  it('keeps microseconds apart from the whole seconds', () => {
    expect(parseIsoStamp('2026-03-01T10:00:00.000123Z')!.fractionS).toBe(0.000123);
  });

  it.each(['', '2026-03-01', '2026-00-01T10:00:00Z', '2026-01-32T10:00:00Z', '24:00:00', '10:60:00', '1.5'])(
    'refuses "%s"',
    (text) => expect(parseIsoStamp(text)).toBeUndefined(),
  );

  it('throws on a time that is no number', () => {
    expect(() => secondsToIso(Number.NaN)).toThrow(RangeError);
  });
});
