import { createHash } from 'node:crypto';
import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import { sha256Hex, sha256HexOfText, utf8Bytes } from '../../../src/core/packet/sha256.ts';

describe('sha256Hex', () => {
  it('gives the digests of FIPS 180-4 example messages (NIST, "SHA Examples")', () => {
    expect(sha256HexOfText('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
    expect(sha256HexOfText('abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq')).toBe(
      '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
    );
    expect(sha256HexOfText('')).toBe('e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855');
    expect(sha256HexOfText('a'.repeat(1_000_000))).toBe(
      'cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0',
    );
  });

  it('agrees with OpenSSL for any bytes, also inside a larger buffer (property)', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), fc.nat(7), (bytes, shift) => {
        const larger = new Uint8Array(bytes.length + shift);
        larger.set(bytes, shift);
        expect(sha256Hex(larger.subarray(shift))).toBe(createHash('sha256').update(bytes).digest('hex'));
      }),
      { numRuns: 300 },
    );
  });
});

describe('utf8Bytes', () => {
  it('agrees with the platform for any text without lone surrogates (property)', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        expect([...utf8Bytes(text)]).toEqual([...new TextEncoder().encode(text)]);
      }),
      { numRuns: 200 },
    );
  });
});
