import type { Fact } from '../model/fact.ts';

/* Where things lie in a packet. Colons of ids become dashes: some systems forbid them in file names. */
export const MANIFEST_NAME = 'manifest.json';
export const READINGS_TABLE_NAME = 'readings.csv';
export const REPORT_NAME = 'report.html';
export const PACKET_ENDING = '.thrumbook.zip';
export const PACKET_TYPE = 'application/zip';

const bare = (id: string): string => id.slice(id.indexOf(':') + 1).replaceAll(':', '-');

/** `facts/<kind>/<id>.json`. */
export const factName = (fact: Pick<Fact, '_id' | 'kind'>): string =>
  `facts/${fact.kind}/${bare(fact._id)}.json`;

/** `raw/<id>.thr` for a reading's samples, `raw/<id>.jpg` for a photo; undefined for facts without an attachment. */
export function rawName(fact: Pick<Fact, '_id' | 'kind'>): string | undefined {
  if (fact.kind === 'reading') return `raw/${bare(fact._id)}.thr`;
  return fact.kind === 'photo' ? `raw/${bare(fact._id)}.jpg` : undefined;
}

export type PacketPart = 'manifest' | 'fact' | 'raw' | 'other';

const FACT = /^facts\/[a-z][a-z0-9-]{0,30}\/[A-Za-z0-9_-]{1,140}\.json$/;
const RAW = /^raw\/[A-Za-z0-9_-]{1,140}\.(?:thr|jpg)$/;

/** What an entry is, by its name; a folder around everything (packed again by hand) is looked through. */
export function packetPart(name: string): { readonly part: PacketPart; readonly name: string } {
  const inner = name.replace(/^(?!facts\/|raw\/)[^/]+\//, '');
  if (inner === MANIFEST_NAME) return { part: 'manifest', name: inner };
  if (FACT.test(inner)) return { part: 'fact', name: inner };
  if (RAW.test(inner)) return { part: 'raw', name: inner };
  return { part: 'other', name };
}

/** Names that would lead out of a folder on somebody's disk: never written by this program. */
export const isPathTrick = (name: string): boolean =>
  name.includes('\\') ||
  name.startsWith('/') ||
  /^[A-Za-z]:/.test(name) ||
  name.split('/').includes('..') ||
  [...name].some((letter) => letter < ' ' || letter === '\u007f');
