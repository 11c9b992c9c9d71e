import type { EditFact, Fact, ReadingFact } from '../../src/core/model/fact.ts';
import { gzipSync } from 'fflate';
import { PACKET_VERSION, type PacketManifest } from '../../src/core/packet/packet-manifest.ts';
import { packetPieces } from '../../src/core/packet/packet-write.ts';
import type { ByteSource } from '../../src/core/packet/packet-zip-read.ts';
import { encodeRaw } from '../../src/core/packet/raw-recording.ts';
import { sha256Hex } from '../../src/core/packet/sha256.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

/** ULIDs that count up. */
export const sampleId = (kind: string, index: number): string =>
  `${kind}:01J${String(index).padStart(23, '0')}`;

export interface SampleReading {
  readonly fact: ReadingFact;
  readonly raw: Uint8Array;
}

export function sampleReading(index: number, count = 60): SampleReading {
  const recording = sampleRecording(count);
  recording.accelerationMps2[0]![0] = index;
  const raw = encodeRaw(recording);
  const fact: ReadingFact = {
    ...readingDraft(),
    _id: sampleId('reading', index),
    v: 1,
    kind: 'reading',
    rawSha256: sha256Hex(raw),
    rawBytes: raw.length,
  };
  return { fact, raw };
}

export const sampleEdit = (index: number, entity: string, set: EditFact['set']): EditFact => ({
  _id: sampleId('edit', index),
  v: 1,
  kind: 'edit',
  entity,
  set,
  over: {},
  device: 'device:test',
  at: '2026-03-01T10:05:00.000Z',
});

export const sampleManifest = (over: Partial<PacketManifest> = {}): PacketManifest => ({
  format: 'thrumbook-packet',
  v: PACKET_VERSION,
  writtenAt: '2026-03-01T12:00:00.000Z',
  app: { version: '0.1.0', commit: 'abc', analysisVersion: 1 },
  factCounts: {},
  scope: 'all',
  remark: 'test',
  ...over,
});

/** A packet of facts and attachments (by id, unpacked) as bytes. */
export async function packetOf(
  facts: readonly Fact[],
  raws: ReadonlyMap<string, Uint8Array>,
  manifest = sampleManifest(),
): Promise<Uint8Array> {
  const pieces: Uint8Array[] = [];
  const content = {
    manifest,
    facts: (async function* () {
      yield* facts;
    })(),
    storedRaw: async (id: string) => {
      const raw = raws.get(id);
      return raw && (id.startsWith('photo:') ? raw : gzipSync(raw, { mtime: 0 }));
    },
    extras: async () => [{ name: 'readings.csv', bytes: new TextEncoder().encode('a,b\r\n') }],
  };
  for await (const piece of packetPieces(content)) pieces.push(piece);
  return joined(pieces);
}

export function joined(pieces: readonly Uint8Array[]): Uint8Array {
  const bytes = new Uint8Array(pieces.reduce((sum, piece) => sum + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    bytes.set(piece, at);
    at += piece.length;
  }
  return bytes;
}

export const sourceOf = (bytes: Uint8Array): ByteSource => ({
  sizeBytes: bytes.length,
  read: async (from, to) => {
    if (from < 0 || to > bytes.length || from > to) throw new RangeError(`read ${from} to ${to}`);
    return bytes.subarray(from, to);
  },
});

/** Three readings with a name each, and a photo. */
export async function samplePacket(): Promise<{
  readonly bytes: Uint8Array;
  readonly facts: readonly Fact[];
}> {
  const readings = [1, 2, 3].map((index) => sampleReading(index));
  const jpeg = new Uint8Array([0xff, 0xd8, 0xff, 0xe0, 1, 2, 3, 0xff, 0xd9]);
  const photo = {
    _id: sampleId('photo', 1),
    v: 1,
    kind: 'photo',
    entity: readings[0]!.fact._id,
    type: 'image/jpeg',
    widthCount: 1,
    heightCount: 1,
    rawSha256: sha256Hex(jpeg),
    rawBytes: jpeg.length,
    at: '2026-03-01T10:05:00.000Z',
  } as const;
  const facts: Fact[] = [
    ...readings.map(({ fact }, i) => sampleEdit(i, fact._id, { label: `Post ${i}` })),
    photo,
    ...readings.map(({ fact }) => fact),
  ];
  const raws = new Map<string, Uint8Array>([
    [photo._id, jpeg],
    ...readings.map(({ fact, raw }) => [fact._id, raw] as const),
  ]);
  return { bytes: await packetOf(facts, raws), facts };
}
