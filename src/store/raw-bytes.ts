import { sha256Hex } from '../core/packet/sha256.ts';
import { StoreError } from './store-error.ts';

/** Largest attachment that is unpacked, bytes: a raw recording at its limit of samples (raw-recording.ts). */
export const RAW_LIMIT_BYTES = 160_000_000;

/** Gzip bytes (RFC 1952), by the browser where it can, else by a small library loaded then. */
export async function gzip(bytes: Uint8Array): Promise<Uint8Array> {
  if (typeof CompressionStream === 'undefined') return (await import('fflate')).gzipSync(bytes, { mtime: 0 });
  return collect(streamOf(bytes).pipeThrough(new CompressionStream('gzip') as never), RAW_LIMIT_BYTES);
}

/**
 * Unpacked bytes. Counts while it reads: a small file that would grow without end is refused.
 * @throws StoreError `damaged`.
 */
export async function gunzip(bytes: Uint8Array, limitBytes = RAW_LIMIT_BYTES): Promise<Uint8Array> {
  try {
    if (typeof DecompressionStream !== 'undefined') {
      return await collect(streamOf(bytes).pipeThrough(new DecompressionStream('gzip') as never), limitBytes);
    }
    return await gunzipByLibrary(bytes, limitBytes);
  } catch (error) {
    throw new StoreError('damaged', error);
  }
}

async function gunzipByLibrary(bytes: Uint8Array, limitBytes: number): Promise<Uint8Array> {
  const { Gunzip } = await import('fflate');
  const parts: Uint8Array[] = [];
  let length = 0;
  const stream = new Gunzip((part) => {
    length += part.length;
    if (length > limitBytes) throw new RangeError(`unpacked bytes must be at most ${limitBytes}`);
    parts.push(part);
  });
  for (let at = 0; at < bytes.length; at += 65_536) {
    stream.push(bytes.subarray(at, at + 65_536), at + 65_536 >= bytes.length);
  }
  // The library does not notice an early end: the length at the end of the file tells (RFC 1952, ISIZE).
  const trailer = new DataView(bytes.buffer, bytes.byteOffset + bytes.length - 4, 4);
  if (trailer.getUint32(0, true) !== length) throw new RangeError('gzip stream ends early');
  return joined(parts, length);
}

export function isGzip(bytes: Uint8Array): boolean {
  return bytes[0] === 0x1f && bytes[1] === 0x8b;
}

/** SHA-256 in hex, by the browser where the page is secure. */
export async function sha256Of(bytes: Uint8Array): Promise<string> {
  if (globalThis.crypto?.subtle === undefined) return sha256Hex(bytes);
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>));
  return [...digest].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** A buffer of its own: what the database clones should not drag a larger buffer along. */
export function ownBuffer(bytes: Uint8Array): ArrayBuffer {
  return bytes.slice().buffer as ArrayBuffer;
}

function streamOf(bytes: Uint8Array): ReadableStream<Uint8Array> {
  return new ReadableStream({
    start(controller) {
      controller.enqueue(bytes);
      controller.close();
    },
  });
}

async function collect(stream: ReadableStream<Uint8Array>, limitBytes: number): Promise<Uint8Array> {
  const reader = stream.getReader();
  const parts: Uint8Array[] = [];
  let length = 0;
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return joined(parts, length);
    length += value.length;
    if (length > limitBytes) {
      await reader.cancel();
      throw new RangeError(`unpacked bytes must be at most ${limitBytes}`);
    }
    parts.push(value);
  }
}

function joined(parts: readonly Uint8Array[], length: number): Uint8Array {
  const bytes = new Uint8Array(length);
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes;
}
