import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import { ulid, ULID_PATTERN } from '../../../src/core/packet/ulid.ts';

const bytes10 = fc.uint8Array({ minLength: 10, maxLength: 10 });
const time = fc.integer({ min: 0, max: 2 ** 48 - 1 });

describe('ulid', () => {
  it('encodes the time of the published example (ULID specification, from memory)', () => {
    expect(ulid(1469918176385, new Uint8Array(10)).slice(0, 10)).toBe('01ARYZ6S41');
  });

  it('uses all 80 bits of chance', () => {
    expect(ulid(0, new Uint8Array(10).fill(255))).toBe('0000000000ZZZZZZZZZZZZZZZZ');
    expect(ulid(0, Uint8Array.of(0, 0, 0, 0, 0, 0, 0, 0, 0, 1))).toBe('00000000000000000000000001');
  });

  it('sorts by time and always has its pattern (property)', () => {
    fc.assert(
      fc.property(time, time, bytes10, bytes10, (a, b, chanceA, chanceB) => {
        const [first, second] = [ulid(a, chanceA), ulid(b, chanceB)];
        expect(first).toMatch(ULID_PATTERN);
        if (a !== b) expect(first < second).toBe(a < b);
      }),
    );
  });

  it('refuses a time or chance that does not fit', () => {
    expect(() => ulid(-1, new Uint8Array(10))).toThrow(RangeError);
    expect(() => ulid(2 ** 48, new Uint8Array(10))).toThrow(RangeError);
    expect(() => ulid(0, new Uint8Array(9))).toThrow(RangeError);
  });
});
