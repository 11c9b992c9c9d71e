import type { ImportPreview, NewReading, Watch } from '../../app/ports.ts';
import type { Fact, ReadingFact } from '../../core/model/fact.ts';
import type { Outcome } from '../../core/model/outcome.ts';
import { failure, success } from '../../core/model/outcome.ts';
import type { Problem } from '../../core/model/problem.ts';
import {
  examinePacket,
  type ExaminedPacket,
  type PacketFact,
  type Refused,
} from '../../core/packet/packet-examine.ts';
import { packetInReport } from '../../core/packet/packet-in-report.ts';
import { factName } from '../../core/packet/packet-layout.ts';
import { PACKET_REPORT_LIMIT_BYTES } from '../../core/packet/packet-limits.ts';
import { selectFacts } from '../../core/packet/packet-selection.ts';
import { readAhead, type ByteSource } from '../../core/packet/packet-zip-read.ts';
import { revisionOf } from '../../core/packet/revision.ts';
import { createBreath } from '../breath.ts';
import type { ExchangeParts } from '../exchange-parts.ts';
import { tableReading } from '../packet/write-packet.ts';
import { blobSource, bytesSource } from './byte-source.ts';
import { sha256 } from './sha256.ts';
import { takeFacts } from './take-facts.ts';

type Here = 'new' | 'known' | 'other';

/** What a packet, or a report with one inside, would bring; nothing is kept yet. */
export async function previewPacket(
  parts: ExchangeParts,
  file: Blob,
  watch: Watch,
): Promise<Outcome<ImportPreview>> {
  const source = await sourceOf(file);
  if (!source.ok) return source;
  const breath = createBreath(watch.signal);
  const { store } = parts;
  const packet = await examinePacket(source.value, {
    sha256,
    isKept: async (fact) =>
      (await hereNow(parts, fact)) === 'known' && (await store.storedRawOf(fact._id)) !== undefined,
    onByte: async (byte) => {
      watch.onProgress(byte / source.value.sizeBytes);
      await breath();
    },
  });
  if (packet.facts.length === 0) return failure('unreadable-file', reasonOf(packet));
  const here = await sorted(parts, packet.facts, breath);
  return success(await previewOf(parts, source.value, packet, here));
}

const reasonOf = ({ refused, manifest }: ExaminedPacket): Problem['facts'] => ({
  reason: manifest === undefined && refused.length <= 1 ? 'no-packet' : 'nothing-whole',
});

/** A ZIP by its first letters; else a page that carries one. */
async function sourceOf(file: Blob): Promise<Outcome<ByteSource>> {
  const head = new Uint8Array(await file.slice(0, 2).arrayBuffer());
  if (head[0] === 0x50 && head[1] === 0x4b) return success(readAhead(blobSource(file)));
  if (file.size > PACKET_REPORT_LIMIT_BYTES) return failure('too-large', {});
  const inside = packetInReport(new Uint8Array(await file.arrayBuffer()));
  // A packet whose first bytes are damaged is still searched through.
  return success(inside === undefined ? readAhead(blobSource(file)) : bytesSource(inside));
}

async function hereNow(parts: ExchangeParts, fact: Fact): Promise<Here> {
  const kept = await parts.store.fact(fact._id);
  if (kept === undefined) return 'new';
  return kept.revision === revisionOf(fact) || fact.kind === 'erase' ? 'known' : 'other';
}

/** Facts looked up at a time. */
const LOOK_UP_COUNT = 100;

async function sorted(
  parts: ExchangeParts,
  facts: readonly PacketFact[],
  breath: () => Promise<void>,
): Promise<ReadonlyMap<PacketFact, Here>> {
  const here = new Map<PacketFact, Here>();
  for (let from = 0; from < facts.length; from += LOOK_UP_COUNT) {
    const some = facts.slice(from, from + LOOK_UP_COUNT);
    const found = await Promise.all(some.map(({ fact }) => hereNow(parts, fact)));
    some.forEach((entry, i) => here.set(entry, found[i]!));
    await breath();
  }
  return here;
}

async function previewOf(
  parts: ExchangeParts,
  source: ByteSource,
  packet: ExaminedPacket,
  here: ReadonlyMap<PacketFact, Here>,
): Promise<ImportPreview> {
  const of = (state: Here) => packet.facts.filter((entry) => here.get(entry) === state);
  const fresh = of('new');
  const isReading = ({ fact, isKnown }: PacketFact) => fact.kind === 'reading' && isKnown;
  const differing = of('other').map(({ fact }): Refused => ({
    name: factName(fact),
    problem: { code: 'damaged', facts: { reason: 'differs' } },
  }));
  return {
    newReadings: await newReadings(fresh.filter(isReading), packet.facts),
    knownReadingCount: of('known').filter(isReading).length,
    otherNewCount: fresh.filter((entry) => !isReading(entry) && entry.isKnown).length,
    newerCount: fresh.filter(({ isKnown }) => !isKnown).length,
    refused: [...packet.refused, ...differing],
    take: (watch) => takeFacts(parts.store, source, fresh, watch),
  };
}

/** Newest first, with their places in the words of the packet. */
async function newReadings(
  fresh: readonly PacketFact[],
  all: readonly PacketFact[],
): Promise<readonly NewReading[]> {
  const selection = await selectFacts(factsOf(all), 'all');
  return fresh
    .map(({ fact }): NewReading => {
      const { reading, analysis, site, asset, spot, label } = tableReading(fact as ReadingFact, selection);
      const { _id, recordedAt, procedure, practice } = reading;
      const where = [label, spot, asset, site].filter((word) => word !== undefined);
      return { id: _id, recordedAt, procedure, practice, where, analysis };
    })
    .sort((a, b) => (a.recordedAt < b.recordedAt ? 1 : -1));
}

async function* factsOf(all: readonly PacketFact[]): AsyncGenerator<Fact> {
  for (const { fact, isKnown } of all) if (isKnown) yield fact;
}
