import type { Fact } from '../model/fact.ts';
import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import type { Problem } from '../model/problem.ts';
import { factName, isPathTrick, MANIFEST_NAME, packetPart, rawName } from './packet-layout.ts';
import { PACKET_FACT_LIMIT_BYTES } from './packet-limits.ts';
import { PACKET_VERSION, parseManifest, type PacketManifest } from './packet-manifest.ts';
import { packedBody, unpackedBody, zipEntries, type ByteSource, type ZipEntry } from './packet-zip-read.ts';
import { parseFact } from './parse-fact.ts';
import { parseJsonBytes } from './parse-json.ts';
import { sha256Hex } from './sha256.ts';

/** A fact of a packet that is whole; its body is read again when it is taken. */
export interface PacketFact {
  readonly fact: Fact;
  /** False for a kind or version that this code does not know: kept and handed on untouched. */
  readonly isKnown: boolean;
  readonly raw?: ZipEntry;
}

export interface Refused {
  /** Name of the entry; empty for the file itself. */
  readonly name: string;
  readonly problem: Problem;
}

export interface ExaminedPacket {
  readonly manifest?: PacketManifest;
  readonly facts: readonly PacketFact[];
  readonly refused: readonly Refused[];
}

export interface Examination {
  /** SHA-256 in hex; the browser's own is quicker than ours. */
  readonly sha256?: (bytes: Uint8Array) => Promise<string>;
  /** True where the attachment need not be unpacked, because it is here already. */
  readonly isKept?: (fact: Fact) => Promise<boolean>;
  /** Called often; may throw to stop. */
  readonly onByte?: (doneBytes: number) => void | Promise<void>;
}

/**
 * Looks at everything in a packet without keeping anything: which facts are whole (shape, checksum, name, hash of the
 * samples), and by name and reason what is not. Never throws for content.
 */
export async function examinePacket(source: ByteSource, how: Examination = {}): Promise<ExaminedPacket> {
  const refused: Refused[] = [];
  const taken = new Set<string>();
  const raws = new Map<string, ZipEntry[]>();
  let manifest: PacketManifest | undefined;
  const facts: { fact: Fact; isKnown: boolean }[] = [];
  for await (const found of zipEntries(source)) {
    if ('flaw' in found) {
      if (isOurs(found.flaw.name)) refused.push(found.flaw);
      continue;
    }
    const { entry } = found;
    await how.onByte?.(entry.fromByte);
    const { part, name } = packetPart(entry.name);
    if (isPathTrick(entry.name)) refused.push({ name: entry.name, problem: damaged('path') });
    else if (part === 'raw') raws.set(name, [...(raws.get(name) ?? []), entry]);
    if (isPathTrick(entry.name) || part === 'other' || part === 'raw') continue;
    if (taken.has(name)) {
      refused.push({ name, problem: damaged('twice') });
      continue;
    }
    const value = await jsonOf(source, entry);
    if (part === 'manifest') {
      taken.add(name);
      manifest = value.ok ? parseManifest(value.value) : undefined;
      const flaw = manifestProblem(value, manifest);
      if (flaw) refused.push({ name: MANIFEST_NAME, problem: flaw });
      continue;
    }
    const parsed = value.ok ? namedFact(value.value, name) : value;
    // Only what is whole takes its name: a damaged namesake must not keep the true one out.
    if (parsed.ok) {
      facts.push(parsed.value);
      taken.add(name);
    } else refused.push({ name, problem: parsed.problem });
  }
  const whole = await withAttachments(source, facts, raws, refused, how);
  return { ...(manifest === undefined ? {} : { manifest }), facts: whole, refused };
}

const damaged = (reason: string): Problem => ({ code: 'damaged', facts: { reason } });

/** Damage outside of what we write (a picture that somebody added) is nobody's loss. */
const isOurs = (name: string): boolean =>
  name === '' || isPathTrick(name) || packetPart(name).part !== 'other';

function manifestProblem(value: Outcome<unknown>, manifest: PacketManifest | undefined): Problem | undefined {
  if (!value.ok) return value.problem;
  if (manifest === undefined) return damaged('manifest');
  return manifest.v > PACKET_VERSION ? { code: 'newer-version', facts: { version: manifest.v } } : undefined;
}

async function jsonOf(source: ByteSource, entry: ZipEntry): Promise<Outcome<unknown>> {
  if (entry.sizeBytes > PACKET_FACT_LIMIT_BYTES) return failure('too-large', { sizeBytes: entry.sizeBytes });
  const bytes = unpackedBody(entry, await packedBody(source, entry));
  if (!bytes.ok) return bytes;
  const value = parseJsonBytes(bytes.value);
  return value === undefined ? failure('damaged', { reason: 'not-json' }) : success(value);
}

function namedFact(value: unknown, name: string): Outcome<{ fact: Fact; isKnown: boolean }> {
  const parsed = parseFact(value);
  if (!parsed.ok) return parsed;
  const { fact, known } = parsed.value;
  return factName(fact) === name ? success({ fact, isKnown: known }) : failure('damaged', { reason: 'name' });
}

async function withAttachments(
  source: ByteSource,
  facts: readonly { fact: Fact; isKnown: boolean }[],
  raws: ReadonlyMap<string, readonly ZipEntry[]>,
  refused: Refused[],
  how: Examination,
): Promise<PacketFact[]> {
  const whole: PacketFact[] = [];
  for (const { fact, isKnown } of facts) {
    const name = rawName(fact);
    const candidates = (name === undefined ? undefined : raws.get(name)) ?? [];
    if (candidates[0]) await how.onByte?.(candidates[0].fromByte);
    const needsRaw = name !== undefined && isKnown;
    const { raw, flaw } = needsRaw
      ? await attachmentOf(source, fact, candidates, how)
      : { raw: candidates[0], flaw: undefined };
    if (flaw === undefined) whole.push({ fact, isKnown, ...(raw === undefined ? {} : { raw }) });
    else refused.push({ name: name ?? '', problem: flaw });
  }
  return whole;
}

/** The attachment that fits, of those under its name; else what is wrong with the first. */
async function attachmentOf(
  source: ByteSource,
  fact: Fact,
  candidates: readonly ZipEntry[],
  how: Examination,
): Promise<{ readonly raw?: ZipEntry | undefined; readonly flaw?: Problem | undefined }> {
  let flaw: Problem | undefined;
  for (const raw of candidates) {
    const problem = await attachmentProblem(source, fact, raw, how);
    if (problem === undefined) return { raw };
    flaw ??= problem;
  }
  return { flaw: flaw ?? damaged('samples-missing') };
}

/** What is wrong with the samples of a reading or the picture of a photo: cut, or not what the fact says. */
async function attachmentProblem(
  source: ByteSource,
  fact: Fact,
  raw: ZipEntry,
  how: Examination,
): Promise<Problem | undefined> {
  if (await how.isKept?.(fact)) return undefined;
  const { rawSha256, rawBytes } = fact as { rawSha256?: unknown; rawBytes?: unknown };
  if (raw.sizeBytes !== rawBytes) return damaged('samples-size');
  const bytes = unpackedBody(raw, await packedBody(source, raw));
  if (!bytes.ok) return bytes.problem;
  const hash = how.sha256 ? await how.sha256(bytes.value) : sha256Hex(bytes.value);
  return hash === rawSha256 ? undefined : damaged('samples-hash');
}
