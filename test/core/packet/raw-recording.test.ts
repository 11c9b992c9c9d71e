import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import type { Recording } from '../../../src/core/model/recording.ts';
import { decodeRaw, encodeRaw } from '../../../src/core/packet/raw-recording.ts';
import { sampleRecording } from '../../support/reading-draft.ts';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const single = fc.float({ noNaN: true, noDefaultInfinity: true });
const axisSets = fc.constantFrom(['x'], ['x', 'y'], ['z', 'x', 'y'], ['x', 'y', 'z']) as fc.Arbitrary<
  Recording['axes']
>;

const recordings: fc.Arbitrary<Recording> = fc
  .record({
    axes: axisSets,
    timeS: fc.array(finite, { maxLength: 40 }),
    name: fc.string(),
    hasStart: fc.boolean(),
  })
  .chain(({ axes, timeS, name, hasStart }) =>
    fc
      .array(fc.array(single, { minLength: timeS.length, maxLength: timeS.length }), {
        minLength: axes.length,
        maxLength: axes.length,
      })
      .map((values) => ({
        ...(hasStart ? { startedAt: '2026-03-01T10:00:00.000Z' } : {}),
        sensor: { source: 'accelerometer' as const, practice: false, name },
        axes,
        timeS: Float64Array.from(timeS),
        accelerationMps2: values.map((axis) => Float32Array.from(axis)),
      })),
  );

describe('raw v1', () => {
  it('lays the bytes out as sync.md says', () => {
    const bytes = encodeRaw({
      sensor: { source: 'file', practice: false, name: 'a' },
      axes: ['z'],
      timeS: Float64Array.of(0.5, 1),
      accelerationMps2: [Float32Array.of(9.5, -1)],
    });
    const view = new DataView(bytes.buffer);
    const headerLength = view.getUint32(4, true);
    expect(String.fromCharCode(...bytes.subarray(0, 4))).toBe('THR1');
    const header = new TextDecoder().decode(bytes.subarray(8, 8 + headerLength));
    expect(JSON.parse(header)).toEqual({
      count: 2,
      axes: ['z'],
      sensor: { source: 'file', practice: false, name: 'a' },
    });
    const bodyAt = Math.ceil((8 + headerLength) / 8) * 8;
    expect([...bytes.subarray(8 + headerLength, bodyAt)].every((byte) => byte === 0)).toBe(true);
    expect([view.getFloat64(bodyAt, true), view.getFloat64(bodyAt + 8, true)]).toEqual([0.5, 1]);
    expect([view.getFloat32(bodyAt + 16, true), view.getFloat32(bodyAt + 20, true)]).toEqual([9.5, -1]);
    expect(bytes.length).toBe(bodyAt + 24);
  });

  it('reads back what it wrote, bit for bit (property)', () => {
    fc.assert(
      fc.property(recordings, (recording) => {
        const decoded = decodeRaw(encodeRaw(recording));
        expect(decoded.ok && decoded.value).toEqual(recording);
      }),
      { numRuns: 200 },
    );
  });

  it('refuses every truncation and surplus', () => {
    const bytes = encodeRaw(sampleRecording(5));
    for (let length = 0; length < bytes.length; length += 1) {
      expect(decodeRaw(bytes.subarray(0, length)).ok).toBe(false);
    }
    expect(decodeRaw(Uint8Array.of(...bytes, 0))).toMatchObject({ ok: false, problem: { code: 'damaged' } });
  });

  it('tells a newer layout, a count beyond reason and samples that are no numbers', () => {
    const bytes = encodeRaw(sampleRecording(5));
    const newer = bytes.slice();
    newer[3] = 0x32;
    expect(decodeRaw(newer)).toMatchObject({ problem: { code: 'newer-version' } });
    const notNumber = bytes.slice();
    notNumber.set([0xff, 0xff, 0xff, 0xff], bytes.length - 4);
    expect(decodeRaw(notNumber)).toMatchObject({ problem: { code: 'damaged', facts: { part: 'samples' } } });
    const header = '{"count":1000000000,"axes":["x"],"sensor":{"source":"file","practice":false,"name":""}}';
    const huge = new Uint8Array(8 + header.length);
    huge.set([0x54, 0x48, 0x52, 0x31, header.length, 0, 0, 0]);
    huge.set(new TextEncoder().encode(header), 8);
    expect(decodeRaw(huge)).toMatchObject({ problem: { code: 'too-large' } });
  });

  it('never throws for any damage (fuzz)', () => {
    const bytes = encodeRaw(sampleRecording(5));
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(bytes.length - 1), fc.nat(255)), { maxLength: 8 }), (hits) => {
        const hurt = bytes.slice();
        for (const [at, value] of hits) hurt[at] = value;
        const decoded = decodeRaw(hurt);
        if (decoded.ok) expect(decoded.value.timeS).toHaveLength(5);
      }),
      { numRuns: 1000 },
    );
  });

  it('throws for arrays of different lengths', () => {
    const { sensor, axes, timeS } = sampleRecording(5);
    expect(() => encodeRaw({ sensor, axes, timeS, accelerationMps2: [new Float32Array(5)] })).toThrow(
      RangeError,
    );
  });
});
