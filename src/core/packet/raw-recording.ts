import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import type { Recording } from '../model/recording.ts';
import { parseRawHeader } from './raw-header.ts';
import { utf8Bytes } from './sha256.ts';

/*
 * Raw v1, little-endian: "THR1", uint32 length of the header, the header as JSON, zeros up to a multiple of 8,
 * then the stamps as Float64 and each axis as Float32. Read by DataView: the same on every machine, any alignment.
 */
const MAGIC = [0x54, 0x48, 0x52, 0x31] as const;
const FIXED_BYTES = 8;
/** Ten hours at 200 Hz: above it a file is damaged or made to hurt (our own bound). */
export const SAMPLE_LIMIT = 7_200_000;
export const HEADER_LIMIT_BYTES = 65_536;

/**
 * The samples as bytes. @throws RangeError when the arrays differ in length.
 */
export function encodeRaw(recording: Recording): Uint8Array {
  const { timeS, accelerationMps2, axes } = recording;
  const count = timeS.length;
  checkLengths(recording);
  const header = utf8Bytes(
    JSON.stringify({
      count,
      axes,
      ...(recording.startedAt === undefined ? {} : { startedAt: recording.startedAt }),
      sensor: recording.sensor,
    }),
  );
  const bodyAt = roundUpTo8(FIXED_BYTES + header.length);
  const bytes = new Uint8Array(bodyAt + count * (8 + 4 * axes.length));
  const view = new DataView(bytes.buffer);
  bytes.set(MAGIC);
  view.setUint32(4, header.length, true);
  bytes.set(header, FIXED_BYTES);
  for (let i = 0; i < count; i += 1) view.setFloat64(bodyAt + 8 * i, timeS[i]!, true);
  accelerationMps2.forEach((axis, k) => {
    const at = bodyAt + 8 * count + 4 * count * k;
    for (let i = 0; i < count; i += 1) view.setFloat32(at + 4 * i, axis[i]!, true);
  });
  return bytes;
}

function checkLengths({ timeS, accelerationMps2, axes }: Recording): void {
  const lengths = [timeS.length, ...accelerationMps2.map((axis) => axis.length)];
  if (accelerationMps2.length !== axes.length || lengths.some((length) => length !== timeS.length)) {
    throw new RangeError(`axes ${axes.length} and lengths must agree, got ${lengths.join(', ')}`);
  }
}

const roundUpTo8 = (length: number): number => Math.ceil(length / 8) * 8;

/** The recording in `bytes`, or why it is not one: `damaged`, `too-large`, `newer-version`. Never throws for content. */
export function decodeRaw(bytes: Uint8Array): Outcome<Recording> {
  if (bytes.length < FIXED_BYTES) return failure('damaged', { part: 'length', byteCount: bytes.length });
  if (MAGIC.slice(0, 3).some((byte, i) => bytes[i] !== byte)) return failure('damaged', { part: 'magic' });
  if (bytes[3] !== MAGIC[3]) return failure('newer-version', { part: 'raw' });
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const headerLength = view.getUint32(4, true);
  if (headerLength > HEADER_LIMIT_BYTES || FIXED_BYTES + headerLength > bytes.length) {
    return failure('damaged', { part: 'header' });
  }
  const header = parseRawHeader(bytes.subarray(FIXED_BYTES, FIXED_BYTES + headerLength));
  if (header === undefined) return failure('damaged', { part: 'header' });
  if (header.count > SAMPLE_LIMIT) return failure('too-large', { sampleCount: header.count });
  const bodyAt = roundUpTo8(FIXED_BYTES + headerLength);
  if (bytes.length !== bodyAt + header.count * (8 + 4 * header.axes.length)) {
    return failure('damaged', { part: 'length', byteCount: bytes.length });
  }
  return readBody(view, bodyAt, header);
}

function readBody(
  view: DataView,
  bodyAt: number,
  header: NonNullable<ReturnType<typeof parseRawHeader>>,
): Outcome<Recording> {
  const { count, axes, sensor, startedAt } = header;
  const timeS = new Float64Array(count);
  for (let i = 0; i < count; i += 1) timeS[i] = view.getFloat64(bodyAt + 8 * i, true);
  const accelerationMps2 = axes.map((_, k) => {
    const at = bodyAt + 8 * count + 4 * count * k;
    return Float32Array.from({ length: count }, (_unused, i) => view.getFloat32(at + 4 * i, true));
  });
  if (![timeS, ...accelerationMps2].every(isFiniteThroughout)) return failure('damaged', { part: 'samples' });
  return success({
    ...(startedAt === undefined ? {} : { startedAt }),
    sensor,
    axes,
    timeS,
    accelerationMps2,
  });
}

function isFiniteThroughout(values: Float32Array | Float64Array): boolean {
  for (let i = 0; i < values.length; i += 1) if (!Number.isFinite(values[i])) return false;
  return true;
}
