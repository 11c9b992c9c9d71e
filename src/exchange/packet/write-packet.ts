import type { Watch } from '../../app/ports.ts';
import type { Entity, Fact, ReadingFact } from '../../core/model/fact.ts';
import { PACKET_VERSION, type PacketManifest } from '../../core/packet/packet-manifest.ts';
import { READINGS_TABLE_NAME, REPORT_NAME } from '../../core/packet/packet-layout.ts';
import {
  readingsTableHead,
  readingsTableRow,
  type TableReading,
} from '../../core/packet/packet-readings-table.ts';
import { selectFacts, type PacketSelection } from '../../core/packet/packet-selection.ts';
import { packetPieces } from '../../core/packet/packet-write.ts';
import { INDICATIVE_LINE } from '../../text/indicative.ts';
import { createBreath } from '../breath.ts';
import type { ExchangeParts } from '../exchange-parts.ts';

/** Pieces are handed to the browser as a part of a file when so many bytes have come together: it keeps them on disk. */
const PART_BYTES = 4_194_304;

export interface PacketOrder {
  readonly readings: readonly string[] | 'all';
  /** The page of the packet; made when the readings have been seen. Absent: none. */
  readonly report?: (rows: readonly TableReading[]) => readonly BlobPart[];
  readonly hasTable: boolean;
}

/** A packet as a Blob, written piece by piece; memory stays within a few megabytes. */
export async function writePacket(parts: ExchangeParts, order: PacketOrder, watch: Watch): Promise<Blob> {
  const { store } = parts;
  const breath = createBreath(watch.signal);
  const selection = await selectFacts(breathing(store.facts(), breath), order.readings);
  const totalCount = Object.values(selection.factCounts).reduce((sum, count) => sum + count, 0);
  const rows: TableReading[] = [];
  const content = {
    manifest: manifestOf(parts, order, selection),
    facts: seen(store.facts(), selection, (row) => rows.push(row)),
    storedRaw: (id: string) => store.storedRawOf(id),
    extras: async () => [
      ...(order.hasTable ? [{ name: READINGS_TABLE_NAME, bytes: tableBytes(rows) }] : []),
      ...(order.report ? [{ name: REPORT_NAME, bytes: await bytesOf(order.report(rows)) }] : []),
    ],
  };
  const pieces = packetPieces(content, async (doneCount) => {
    watch.onProgress(doneCount / Math.max(1, totalCount));
    await breath();
  });
  return collected(pieces);
}

async function* breathing(facts: AsyncIterable<Fact>, breath: () => Promise<void>): AsyncGenerator<Fact> {
  for await (const fact of facts) {
    await breath();
    yield fact;
  }
}

function manifestOf(parts: ExchangeParts, order: PacketOrder, selection: PacketSelection): PacketManifest {
  return {
    format: 'thrumbook-packet',
    v: PACKET_VERSION,
    writtenAt: parts.now().toISOString(),
    app: parts.about,
    factCounts: selection.factCounts,
    scope: order.readings === 'all' ? 'all' : 'selection',
    remark: INDICATIVE_LINE,
  };
}

async function* seen(
  facts: AsyncIterable<Fact>,
  selection: PacketSelection,
  onReading: (row: TableReading) => void,
): AsyncGenerator<Fact> {
  for await (const fact of facts) {
    if (!selection.has(fact)) continue;
    if (fact.kind === 'reading' && fact.v === 1) onReading(tableReading(fact as ReadingFact, selection));
    yield fact;
  }
}

const field = (entity: Entity | undefined, name: string): string | undefined => {
  const value = entity?.fields[name];
  return typeof value === 'string' && value !== '' ? value : undefined;
};

/** What a table says of a reading: its numbers, and where it belongs in words. */
export function tableReading(reading: ReadingFact, selection: PacketSelection): TableReading {
  const place = selection.placeOf(reading);
  const own = selection.entity(reading._id);
  const named = (key: 'site' | 'asset' | 'spot') =>
    place[key] === undefined ? undefined : field(selection.entity(place[key]), 'name');
  const texts = {
    site: named('site'),
    asset: named('asset'),
    spot: named('spot'),
    label: field(own, 'label'),
    notes: field(own, 'notes'),
  };
  const given = Object.entries(texts).filter(([, text]) => text !== undefined);
  return { reading, analysis: selection.analysisOf(reading), ...Object.fromEntries(given) };
}

const tableBytes = (rows: readonly TableReading[]): Uint8Array =>
  // The mark at the front tells spreadsheets that this is UTF-8.
  new TextEncoder().encode(
    `\ufeff${readingsTableHead()}${rows.map((row) => readingsTableRow(row, INDICATIVE_LINE)).join('')}`,
  );

/** All readings asked for, as the table of a file of its own. */
export async function readingsTableParts(
  parts: ExchangeParts,
  readings: readonly string[] | 'all',
  watch: Watch,
): Promise<readonly BlobPart[]> {
  const breath = createBreath(watch.signal);
  const selection = await selectFacts(breathing(parts.store.facts(), breath), readings);
  const rows: TableReading[] = [];
  for await (const fact of seen(breathing(parts.store.facts(), breath), selection, (row) => rows.push(row)))
    if (fact.kind === 'reading') watch.onProgress(rows.length / Math.max(1, selection.readingCount));
  return [tableBytes(rows) as BlobPart];
}

const bytesOf = async (blobParts: readonly BlobPart[]): Promise<Uint8Array> =>
  new Uint8Array(await new Blob([...blobParts]).arrayBuffer());

async function collected(pieces: AsyncIterable<Uint8Array>): Promise<Blob> {
  const done: Blob[] = [];
  let held: BlobPart[] = [];
  let heldBytes = 0;
  for await (const piece of pieces) {
    held.push(piece as BlobPart);
    heldBytes += piece.length;
    if (heldBytes < PART_BYTES) continue;
    done.push(new Blob(held));
    [held, heldBytes] = [[], 0];
  }
  return new Blob([...done, ...held]);
}
