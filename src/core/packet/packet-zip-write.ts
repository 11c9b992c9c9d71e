/*
 * ZIP written as a stream (APPNOTE 6.3.10): sizes and checksum stand before each entry, so that a reader who gets only the
 * first half can still use it, and a stored gzip's body is taken over as it is instead of being packed again.
 */
import { deflateSync } from 'fflate';
import { packetCrc } from './packet-crc.ts';
import { PACKET_SIZE_LIMIT_BYTES } from './packet-limits.ts';
import { utf8Bytes } from './sha256.ts';

export interface ZipWriter {
  /** Packs and frames one entry; @throws RangeError above 4 GB. */
  entry(name: string, bytes: Uint8Array, how?: 'pack' | 'store'): readonly Uint8Array[];
  /** An entry whose body was packed before: the inside of a gzip file. */
  gzipEntry(name: string, gzip: Uint8Array): readonly Uint8Array[];
  /** What closes the file. */
  end(): Uint8Array;
}

interface Written {
  readonly name: Uint8Array;
  readonly method: number;
  readonly crc: number;
  readonly packedBytes: number;
  readonly sizeBytes: number;
  readonly offsetBytes: number;
}

export const STORED = 0;
export const DEFLATED = 8;
export const LOCAL_SIGNATURE = 0x04034b50;
export const CENTRAL_SIGNATURE = 0x02014b50;
export const END_SIGNATURE = 0x06054b50;
export const END64_SIGNATURE = 0x06064b50;
const LOCATOR64_SIGNATURE = 0x07064b50;
/** Version 2.0 needed for deflate; 4.5 only where the end needs 64 bits. */
const VERSION_NEEDED = 20;
/** Names are UTF-8. */
const FLAGS = 0x0800;
/** 1980-01-01: the same content gives the same bytes. */
const DOS_DATE = 0x0021;

export function createZipWriter(): ZipWriter {
  const written: Written[] = [];
  let offsetBytes = 0;
  const add = (name: string, method: number, body: Uint8Array, crc: number, sizeBytes: number) => {
    const entry = { name: utf8Bytes(name), method, crc, packedBytes: body.length, sizeBytes, offsetBytes };
    const head = localHeader(entry);
    offsetBytes += head.length + body.length;
    if (offsetBytes > PACKET_SIZE_LIMIT_BYTES)
      throw new RangeError(`a packet must be at most ${PACKET_SIZE_LIMIT_BYTES} bytes, got ${offsetBytes}`);
    written.push(entry);
    return [head, body];
  };
  return {
    entry(name, bytes, how = 'pack') {
      const isPacked = how === 'pack' && bytes.length > 0;
      const body = isPacked ? deflateSync(bytes, { level: 6 }) : bytes;
      return add(name, isPacked ? DEFLATED : STORED, body, packetCrc(bytes), bytes.length);
    },
    gzipEntry(name, gzip) {
      const { body, crc, sizeBytes } = insideOfGzip(gzip);
      return add(name, DEFLATED, body, crc, sizeBytes);
    },
    end: () => endOfZip(written, offsetBytes),
  };
}

/** Body, checksum and length of a one-member gzip file (RFC 1952). @throws RangeError when it is none. */
function insideOfGzip(gzip: Uint8Array): { body: Uint8Array; crc: number; sizeBytes: number } {
  const flags = gzip[3] ?? 0xff;
  if (gzip.length < 18 || gzip[0] !== 0x1f || gzip[1] !== 0x8b || flags !== 0)
    throw new RangeError('gzip must be one plain member');
  const trailer = new DataView(gzip.buffer, gzip.byteOffset + gzip.length - 8, 8);
  return {
    body: gzip.subarray(10, gzip.length - 8),
    crc: trailer.getUint32(0, true),
    sizeBytes: trailer.getUint32(4, true),
  };
}

function localHeader(entry: Written): Uint8Array {
  const bytes = new Uint8Array(30 + entry.name.length);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, LOCAL_SIGNATURE, true);
  view.setUint16(4, VERSION_NEEDED, true);
  commonHeader(view, 6, entry);
  bytes.set(entry.name, 30);
  return bytes;
}

/** Flags, method, time, checksum, sizes and length of the name: alike in both headers. */
function commonHeader(view: DataView, at: number, entry: Written): void {
  view.setUint16(at, FLAGS, true);
  view.setUint16(at + 2, entry.method, true);
  view.setUint16(at + 6, DOS_DATE, true);
  view.setUint32(at + 8, entry.crc, true);
  view.setUint32(at + 12, entry.packedBytes, true);
  view.setUint32(at + 16, entry.sizeBytes, true);
  view.setUint16(at + 20, entry.name.length, true);
}

function centralHeader(entry: Written): Uint8Array {
  const bytes = new Uint8Array(46 + entry.name.length);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, CENTRAL_SIGNATURE, true);
  view.setUint16(4, VERSION_NEEDED, true);
  view.setUint16(6, VERSION_NEEDED, true);
  commonHeader(view, 8, entry);
  view.setUint32(42, entry.offsetBytes, true);
  bytes.set(entry.name, 46);
  return bytes;
}

const MOST_ENTRIES_16_BIT = 0xffff;

function endOfZip(written: readonly Written[], startBytes: number): Uint8Array {
  const heads = written.map(centralHeader);
  const sizeBytes = heads.reduce((sum, head) => sum + head.length, 0);
  const needs64 = written.length >= MOST_ENTRIES_16_BIT || startBytes + sizeBytes > PACKET_SIZE_LIMIT_BYTES;
  const end64Bytes = needs64 ? 76 : 0;
  const bytes = new Uint8Array(sizeBytes + end64Bytes + 22);
  let at = 0;
  for (const head of heads) {
    bytes.set(head, at);
    at += head.length;
  }
  const view = new DataView(bytes.buffer);
  if (needs64) writeEnd64(view, at, written.length, sizeBytes, startBytes);
  const end = at + end64Bytes;
  const shownCount = Math.min(written.length, MOST_ENTRIES_16_BIT);
  view.setUint32(end, END_SIGNATURE, true);
  view.setUint16(end + 8, shownCount, true);
  view.setUint16(end + 10, shownCount, true);
  view.setUint32(end + 12, Math.min(sizeBytes, 0xffffffff), true);
  view.setUint32(end + 16, startBytes, true);
  return bytes;
}

function writeEnd64(
  view: DataView,
  at: number,
  entryCount: number,
  sizeBytes: number,
  startBytes: number,
): void {
  view.setUint32(at, END64_SIGNATURE, true);
  view.setBigUint64(at + 4, 44n, true);
  view.setUint16(at + 12, 45, true);
  view.setUint16(at + 14, 45, true);
  view.setBigUint64(at + 24, BigInt(entryCount), true);
  view.setBigUint64(at + 32, BigInt(entryCount), true);
  view.setBigUint64(at + 40, BigInt(sizeBytes), true);
  view.setBigUint64(at + 48, BigInt(startBytes), true);
  view.setUint32(at + 56, LOCATOR64_SIGNATURE, true);
  view.setBigUint64(at + 64, BigInt(startBytes + sizeBytes), true);
  view.setUint32(at + 72, 1, true);
}
