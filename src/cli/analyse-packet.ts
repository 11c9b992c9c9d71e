import { open, readFile, type FileHandle } from 'node:fs/promises';
import { analyse } from '../core/analyse.ts';
import type { Analysis, AnalysisSettings } from '../core/model/analysis.ts';
import type { ReadingFact } from '../core/model/fact.ts';
import type { Outcome } from '../core/model/outcome.ts';
import { success } from '../core/model/outcome.ts';
import { canonicalJson } from '../core/packet/canonical-json.ts';
import { examinePacket, type PacketFact } from '../core/packet/packet-examine.ts';
import { packetInReport } from '../core/packet/packet-in-report.ts';
import { packedBody, readAhead, unpackedBody, type ByteSource } from '../core/packet/packet-zip-read.ts';
import { decodeRaw } from '../core/packet/raw-recording.ts';
import { storedNumbers } from '../core/packet/stored-numbers.ts';

/** A reading of a packet analysed again from its raw samples, beside what was stored with it. */
export interface RedoneReading {
  readonly analysis: Analysis;
  readonly stored: Analysis;
  /** Same version and all numbers the same. */
  readonly equal: boolean;
  readonly rawSha256: string;
}

export interface PacketLine {
  /** Id of the reading, or name of an entry that is not whole; empty for the file itself. */
  readonly name: string;
  readonly outcome: Outcome<RedoneReading>;
}

/**
 * Every reading of a packet (or of a report with one inside), its samples checked against their hash and analysed again by
 * the settings it was made with, or by `settings` where they say more than "auto". Nothing for a file that is no packet; rejects when it cannot be read.
 */
export async function* analysePacket(path: string, settings: AnalysisSettings): AsyncGenerator<PacketLine> {
  const { source, close } = await openPacket(path);
  try {
    const packet = await examinePacket(source);
    // A page or archive of somebody else's: nothing to name in it.
    if (packet.facts.length === 0 && packet.manifest === undefined && packet.refused.length <= 1) return;
    const readings = packet.facts.filter(({ fact, isKnown }) => fact.kind === 'reading' && isKnown);
    for (const reading of readings)
      yield { name: reading.fact._id, outcome: await redone(source, reading, settings) };
    for (const { name, problem } of packet.refused) yield { name, outcome: { ok: false, problem } };
  } finally {
    await close();
  }
}

async function redone(
  source: ByteSource,
  { fact, raw }: PacketFact,
  asked: AnalysisSettings,
): Promise<Outcome<RedoneReading>> {
  const reading = fact as ReadingFact;
  if (raw === undefined) throw new RangeError(`${reading._id} must have samples`);
  const bytes = unpackedBody(raw, await packedBody(source, raw));
  if (!bytes.ok) return bytes;
  const recording = decodeRaw(bytes.value);
  if (!recording.ok) return recording;
  const stored = reading.analysis;
  const result = analyse(recording.value, {
    procedure: asked.procedure === 'auto' ? stored.settings.procedure : asked.procedure,
    timing: asked.timing === 'auto' ? stored.settings.timing : asked.timing,
  });
  if (!result.ok) return result;
  const { analysis } = result.value;
  const equal = canonicalJson(storedNumbers(analysis)) === canonicalJson(stored);
  return success({ analysis, stored, equal, rawSha256: reading.rawSha256 });
}

async function openPacket(path: string): Promise<{ source: ByteSource; close: () => Promise<void> }> {
  const inside = /\.html?$/i.test(path) ? packetInReport(await readFile(path)) : undefined;
  if (inside !== undefined) return { source: bytesSource(inside), close: async () => {} };
  const file = await open(path, 'r');
  return { source: readAhead(await fileSource(file)), close: () => file.close() };
}

const bytesSource = (bytes: Uint8Array): ByteSource => ({
  sizeBytes: bytes.length,
  read: async (from, to) => bytes.subarray(from, to),
});

async function fileSource(file: FileHandle): Promise<ByteSource> {
  const { size } = await file.stat();
  return {
    sizeBytes: size,
    async read(from, to) {
      const bytes = new Uint8Array(to - from);
      const { bytesRead } = await file.read(bytes, 0, bytes.length, from);
      if (bytesRead !== bytes.length) throw new Error('the file changed while it was read');
      return bytes;
    },
  };
}
