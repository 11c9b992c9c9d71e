/*
 * ZIP read from its beginning, entry by entry. The directory at its end is not needed, because a cut file has none. Where a
 * header does not lead to the next, the search goes on at the next sign of one: one damaged place costs one entry.
 */
import { inflateSync } from 'fflate';
import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import type { Problem } from '../model/problem.ts';
import { packetCrc } from './packet-crc.ts';
import {
  PACKET_ENTRY_LIMIT,
  PACKET_NAME_LIMIT,
  PACKET_RATIO_FREE_BYTES,
  PACKET_RATIO_LIMIT,
  PACKET_RAW_LIMIT_BYTES,
} from './packet-limits.ts';
import {
  CENTRAL_SIGNATURE,
  DEFLATED,
  END64_SIGNATURE,
  END_SIGNATURE,
  LOCAL_SIGNATURE,
  STORED,
} from './packet-zip-write.ts';
import { utf8Text } from './parse-json.ts';

/** A file by pieces. `read` gives exactly `to - from` bytes within the size. */
export interface ByteSource {
  readonly sizeBytes: number;
  read(fromByte: number, toByte: number): Promise<Uint8Array>;
}

export interface ZipEntry {
  readonly name: string;
  readonly isPacked: boolean;
  /** Where its body begins. */
  readonly fromByte: number;
  readonly packedBytes: number;
  /** Unpacked. */
  readonly sizeBytes: number;
  readonly crc: number;
}

export type ZipFound =
  { readonly entry: ZipEntry } | { readonly flaw: { readonly name: string; readonly problem: Problem } };

const HEADER_BYTES = 30;
const DESCRIPTOR_SIGNATURE = 0x08074b50;
const DESCRIPTOR_BYTES = 16;
const FLAG_ENCRYPTED = 0x0001;
const FLAG_SIZES_FOLLOW = 0x0008;
/** Read at a time while searching; larger than any header. */
const STEP_BYTES = 65_536;

interface Header extends ZipEntry {
  readonly atByte: number;
  readonly flags: number;
  readonly method: number;
}

/** Entries in their order, and what was unreadable between them. Never throws for content. */
export async function* zipEntries(source: ByteSource): AsyncGenerator<ZipFound> {
  let at = 0;
  let isLost = false;
  for (let count = 0; at < source.sizeBytes; count += 1) {
    if (count >= PACKET_ENTRY_LIMIT) {
      yield flaw('', 'too-large', { maxCount: PACKET_ENTRY_LIMIT });
      return;
    }
    const signature = await signatureAt(source, at);
    if (isClosing(signature) && !isLost) return;
    const header = signature === LOCAL_SIGNATURE ? await headerAt(source, at) : undefined;
    if (header === undefined) {
      if (!isLost) yield flaw('', 'damaged', { reason: 'not-an-entry', byte: at });
      isLost = true;
      at = await searched(source, at + 1, LOCAL_SIGNATURE);
      continue;
    }
    isLost = false;
    const { found, next } = await entryOf(source, header);
    yield found;
    at = next;
  }
  if (!isLost) yield flaw('', 'damaged', { reason: 'cut-short' });
}

const flaw = (name: string, code: Problem['code'], facts: Problem['facts']): ZipFound => ({
  flaw: { name, problem: { code, facts } },
});

const isClosing = (signature: number): boolean =>
  signature === CENTRAL_SIGNATURE || signature === END_SIGNATURE || signature === END64_SIGNATURE;

async function signatureAt(source: ByteSource, at: number): Promise<number> {
  if (at + 4 > source.sizeBytes) return 0;
  return viewOf(await source.read(at, at + 4)).getUint32(0, true);
}

const viewOf = (bytes: Uint8Array): DataView =>
  new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);

async function headerAt(source: ByteSource, at: number): Promise<Header | undefined> {
  if (at + HEADER_BYTES > source.sizeBytes) return undefined;
  const view = viewOf(await source.read(at, at + HEADER_BYTES));
  const nameBytes = view.getUint16(26, true);
  const fromByte = at + HEADER_BYTES + nameBytes + view.getUint16(28, true);
  if (nameBytes === 0 || nameBytes > PACKET_NAME_LIMIT || fromByte > source.sizeBytes) return undefined;
  const name = utf8Text(await source.read(at + HEADER_BYTES, at + HEADER_BYTES + nameBytes));
  if (name === undefined) return undefined;
  const method = view.getUint16(8, true);
  return {
    name,
    atByte: at,
    flags: view.getUint16(6, true),
    method,
    isPacked: method === DEFLATED,
    crc: view.getUint32(14, true),
    packedBytes: view.getUint32(18, true),
    sizeBytes: view.getUint32(22, true),
    fromByte,
  };
}

/** The entry that a header announces, and where to go on. Something must begin at its end, or its checksum must hold. */
async function entryOf(source: ByteSource, header: Header): Promise<{ found: ZipFound; next: number }> {
  const whole =
    header.flags & FLAG_SIZES_FOLLOW && header.packedBytes === 0 ? await sized(source, header) : header;
  const end = whole && (await endOfEntry(source, whole));
  if (whole === undefined || end === undefined) {
    // Any length in the header may be the one that is wrong: nothing of it is skipped.
    const next = await searched(source, header.atByte + 1, LOCAL_SIGNATURE);
    const reason = header.fromByte + header.packedBytes > source.sizeBytes ? 'cut-short' : 'size';
    // A header inside what it claims tells that the claim is wrong; it also keeps the work in proportion to the file.
    const isApart = whole !== undefined && next >= whole.fromByte + whole.packedBytes;
    const isProven = isApart && (await isSound(source, whole));
    return { found: isProven ? { entry: whole } : flaw(header.name, 'damaged', { reason }), next };
  }
  return { found: bounded(whole) ?? { entry: whole }, next: end };
}

/** Where the next thing begins, if one does right after this entry (or after its trailing sizes) or the file ends. */
async function endOfEntry(source: ByteSource, header: Header): Promise<number | undefined> {
  const end = header.fromByte + header.packedBytes;
  if (end > source.sizeBytes) return undefined;
  // Cut within the next signature: this entry is whole.
  if (end + 4 > source.sizeBytes) return end;
  const signature = await signatureAt(source, end);
  if (signature === DESCRIPTOR_SIGNATURE) return end + DESCRIPTOR_BYTES;
  return signature === LOCAL_SIGNATURE || isClosing(signature) ? end : undefined;
}

/** Whether the checksum holds: then only what comes after it is damaged. */
async function isSound(source: ByteSource, header: Header): Promise<boolean> {
  const isInside = header.fromByte + header.packedBytes <= source.sizeBytes;
  if (!isInside || bounded(header) !== undefined) return false;
  return unpackedBody(header, await packedBody(source, header)).ok;
}

function bounded(header: Header): ZipFound | undefined {
  const { name, packedBytes, sizeBytes } = header;
  if (header.flags & FLAG_ENCRYPTED) return flaw(name, 'unreadable-file', { reason: 'encrypted' });
  if (header.method !== STORED && header.method !== DEFLATED)
    return flaw(name, 'unreadable-file', { reason: 'packing' });
  if (!header.isPacked && packedBytes !== sizeBytes) return flaw(name, 'damaged', { reason: 'size' });
  const isDense = sizeBytes > PACKET_RATIO_FREE_BYTES && sizeBytes > packedBytes * PACKET_RATIO_LIMIT;
  if (sizeBytes > PACKET_RAW_LIMIT_BYTES || isDense) return flaw(name, 'too-large', { sizeBytes });
  return undefined;
}

/** Sizes that stand behind the body: the first trailing record, before the next header, that fits the distance it is at. */
async function sized(source: ByteSource, header: Header): Promise<Header | undefined> {
  const next = await searched(source, header.fromByte, LOCAL_SIGNATURE);
  const last = Math.min(next, header.fromByte + PACKET_RAW_LIMIT_BYTES);
  for (let at = header.fromByte; at < last; at += 1) {
    at = await searched(source, at, DESCRIPTOR_SIGNATURE);
    if (at + DESCRIPTOR_BYTES > last) return undefined;
    const view = viewOf(await source.read(at, at + DESCRIPTOR_BYTES));
    const packedBytes = view.getUint32(8, true);
    if (packedBytes === at - header.fromByte)
      return { ...header, crc: view.getUint32(4, true), packedBytes, sizeBytes: view.getUint32(12, true) };
  }
  return undefined;
}

/** Next place of a signature from `at` on; the end of the file where there is none. */
async function searched(source: ByteSource, at: number, signature: number): Promise<number> {
  for (let from = at; from + 4 <= source.sizeBytes; from += STEP_BYTES - 3) {
    const bytes = await source.read(from, Math.min(source.sizeBytes, from + STEP_BYTES));
    for (let i = bytes.indexOf(0x50); i >= 0; i = bytes.indexOf(0x50, i + 1)) {
      if (i + 4 <= bytes.length && viewOf(bytes).getUint32(i, true) === signature) return from + i;
    }
  }
  return source.sizeBytes;
}

/** Body of an entry as it lies in the file. */
export const packedBody = (source: ByteSource, entry: ZipEntry): Promise<Uint8Array> =>
  source.read(entry.fromByte, entry.fromByte + entry.packedBytes);

/** Unpacks and checks a body; memory stays within the size that the entry states. */
export function unpackedBody(entry: ZipEntry, body: Uint8Array): Outcome<Uint8Array> {
  try {
    const bytes = entry.isPacked ? inflateSync(body, { out: new Uint8Array(entry.sizeBytes) }) : body;
    if (bytes.length !== entry.sizeBytes || packetCrc(bytes) !== entry.crc)
      return failure('damaged', { reason: 'checksum' });
    return success(bytes);
  } catch {
    return failure('damaged', { reason: 'packing' });
  }
}

/** A gzip file (RFC 1952) around the body of a packed entry: what the store keeps, without packing again. */
export function gzipOfBody(entry: ZipEntry, body: Uint8Array): Uint8Array {
  const gzip = new Uint8Array(body.length + 18);
  gzip.set([0x1f, 0x8b, 8, 0, 0, 0, 0, 0, 0, 0xff]);
  gzip.set(body, 10);
  const view = viewOf(gzip);
  view.setUint32(body.length + 10, entry.crc, true);
  view.setUint32(body.length + 14, entry.sizeBytes, true);
  return gzip;
}

/** Reads ahead, so that many small reads one after the other cost one large one. */
export function readAhead(source: ByteSource, aheadBytes = 1_048_576): ByteSource {
  let held: { from: number; bytes: Uint8Array } | undefined;
  return {
    sizeBytes: source.sizeBytes,
    async read(from, to) {
      if (held === undefined || from < held.from || to > held.from + held.bytes.length) {
        const end = Math.min(source.sizeBytes, Math.max(to, from + aheadBytes));
        held = { from, bytes: await source.read(from, end) };
      }
      return held.bytes.subarray(from - held.from, to - held.from);
    },
  };
}
