import fc from 'fast-check';
import { unzipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import type { Fact } from '../../../src/core/model/fact.ts';
import { examinePacket, type ExaminedPacket } from '../../../src/core/packet/packet-examine.ts';
import { createZipWriter } from '../../../src/core/packet/packet-zip-write.ts';
import { revisionOf } from '../../../src/core/packet/revision.ts';
import {
  joined,
  packetOf,
  sampleEdit,
  sampleManifest,
  samplePacket,
  sampleReading,
  sourceOf,
} from '../../support/sample-packet.ts';

const packet = await samplePacket();
const revisions = new Map(packet.facts.map((fact) => [fact._id, revisionOf(fact)]));
const examine = (bytes: Uint8Array) => examinePacket(sourceOf(bytes));
const text = (value: unknown) => new TextEncoder().encode(JSON.stringify(value));
/** Every fact that came through is exactly one that went in. */
const isGenuine = ({ facts }: ExaminedPacket) =>
  facts.every(({ fact }) => revisions.get(fact._id) === revisionOf(fact));
const readingsOf = ({ facts }: ExaminedPacket) => facts.filter(({ fact }) => fact.kind === 'reading');

describe('examinePacket', () => {
  it('gives back every fact of a whole packet, and the manifest', async () => {
    const examined = await examine(packet.bytes);
    expect(examined.facts.map(({ fact }) => fact)).toEqual(packet.facts);
    expect(examined.refused).toEqual([]);
    expect(examined.manifest).toEqual(sampleManifest());
  });

  it('is a ZIP that others can unpack (fflate, by the directory at its end)', () => {
    const files = unzipSync(packet.bytes);
    expect(Object.keys(files)).toContain('manifest.json');
    expect(Object.keys(files).filter((name) => name.startsWith('raw/'))).toHaveLength(4);
    expect(files['raw/01J00000000000000000000001.thr']).toEqual(sampleReading(1).raw);
  });

  it('takes whole readings and nothing wrong from a packet cut anywhere', async () => {
    let before = 0;
    const end = new DataView(packet.bytes.buffer, packet.bytes.length - 22);
    const directoryAt = end.getUint32(16, true);
    for (let length = 0; length <= packet.bytes.length; length += 1) {
      const examined = await examine(packet.bytes.subarray(0, length));
      expect(isGenuine(examined)).toBe(true);
      const count = readingsOf(examined).length;
      expect(count).toBeGreaterThanOrEqual(before);
      before = count;
      if (length < directoryAt) expect(examined.refused).not.toEqual([]);
    }
    expect(before).toBe(3);
  }, 60_000);

  it('lets a flipped bit cost the one entry that it hit and never gives a wrong reading (200 random bits)', async () => {
    const property = fc.asyncProperty(fc.nat(packet.bytes.length * 8 - 1), async (bit) => {
      const bytes = packet.bytes.slice();
      bytes[bit >> 3]! ^= 1 << (bit & 7);
      const examined = await examine(bytes);
      expect(isGenuine(examined)).toBe(true);
      expect(readingsOf(examined).length).toBeGreaterThanOrEqual(2);
      expect(examined.facts.length).toBeGreaterThanOrEqual(packet.facts.length - 1);
    });
    await fc.assert(property, { numRuns: 200 });
  }, 60_000);

  it('gives nothing wrong from random damage of many bytes', async () => {
    const damage = fc.array(fc.tuple(fc.nat(packet.bytes.length - 1), fc.nat(255)), {
      minLength: 1,
      maxLength: 60,
    });
    const property = fc.asyncProperty(damage, async (places) => {
      const bytes = packet.bytes.slice();
      for (const [at, value] of places) bytes[at] = value;
      expect(isGenuine(await examine(bytes))).toBe(true);
    });
    await fc.assert(property, { numRuns: 100 });
  }, 60_000);

  it('reads what other programs packed again: sizes behind the body, a folder around it', async () => {
    const { Zip, ZipDeflate } = await import('fflate');
    const pieces: Uint8Array[] = [];
    const zip = new Zip((error, piece) => {
      if (error) throw error;
      pieces.push(piece);
    });
    for (const [name, bytes] of Object.entries(unzipSync(packet.bytes))) {
      const file = new ZipDeflate(`my packet/${name}`);
      zip.add(file);
      file.push(bytes, true);
    }
    zip.end();
    const examined = await examine(joined(pieces));
    expect(examined.facts).toHaveLength(packet.facts.length);
    expect(examined.refused).toEqual([]);
  });
});

/** A packet of entries as given, whatever they hold. */
function zipOf(entries: readonly (readonly [string, Uint8Array])[]): Uint8Array {
  const zip = createZipWriter();
  const pieces = entries.flatMap(([name, bytes]) => [...zip.entry(name, bytes)]);
  return joined([...pieces, zip.end()]);
}
const reasonsOf = ({ refused }: ExaminedPacket) =>
  refused.map(({ name, problem }) => `${name}: ${String(problem.facts['reason'] ?? problem.code)}`);

describe('examinePacket against hostile packets', () => {
  const edit = sampleEdit(1, 'site:01J00000000000000000000009', { name: 'Mill yard' });
  const editName = 'facts/edit/01J00000000000000000000001.json';

  it('refuses a bomb by its ratio before unpacking it', async () => {
    const bomb = zipOf([['raw/01J00000000000000000000001.thr', new Uint8Array(30_000_000)]]);
    const examined = await examine(bomb);
    expect(bomb.length).toBeLessThan(40_000);
    expect(examined.refused.map(({ problem }) => problem.code)).toEqual(['too-large']);
  });

  it.each([
    ['sizes that overlap', 0],
    ['sizes said to follow', 0x0008],
  ])('is done in good time with 20,000 headers of %s', async (_, flags) => {
    const head = new Uint8Array(40);
    const view = new DataView(head.buffer);
    view.setUint32(0, 0x04034b50, true);
    view.setUint16(6, flags, true);
    view.setUint16(8, 8, true);
    view.setUint32(18, flags === 0 ? 700_000 : 0, true);
    view.setUint32(22, 100_000_000, true);
    view.setUint16(26, 10, true);
    head.set(new TextEncoder().encode('raw/0a.thr'), 30);
    const bytes = joined(Array.from({ length: 20_000 }, () => head));
    const startMs = performance.now();
    const examined = await examine(bytes);
    expect(examined.facts).toEqual([]);
    // Work in proportion to the square of the headers would take minutes.
    expect(performance.now() - startMs).toBeLessThan(15_000);
  });

  it('refuses what unpacks to another length or checksum than it says', async () => {
    const honest = zipOf([[editName, text(edit)]]);
    const view = new DataView(honest.buffer);
    view.setUint32(22, 12, true);
    expect(reasonsOf(await examine(honest))).toEqual([`${editName}: checksum`]);
  });

  it('refuses names that lead out, double names, facts under another name', async () => {
    const tricks = ['../facts/edit/a.json', '/etc/passwd', 'facts\\edit\\a.json', 'C:facts/edit/a.json'];
    const examined = await examine(
      zipOf([
        ...tricks.map((name) => [name, text(edit)] as const),
        [editName, text(edit)],
        [editName, text({ ...edit, device: 'other' })],
        ['facts/edit/01J00000000000000000000002.json', text(edit)],
      ]),
    );
    expect(examined.facts.map(({ fact }) => fact)).toEqual([edit]);
    expect(reasonsOf(examined)).toEqual([
      ...tricks.map((name) => `${name}: path`),
      `${editName}: twice`,
      'facts/edit/01J00000000000000000000002.json: name',
    ]);
  });

  it.each([
    ['a prototype key', `{"__proto__":{"polluted":true},${JSON.stringify(edit).slice(1)}`],
    ['a giant number', JSON.stringify(edit).replace('"v":1', '"v":1e400')],
    ['a wrong type', JSON.stringify({ ...edit, set: 'all' })],
    ['deep nesting', `${'['.repeat(5000)}${']'.repeat(5000)}`],
    ['no JSON', '<html></html>'],
  ])('refuses %s', async (_, content) => {
    const examined = await examine(zipOf([[editName, new TextEncoder().encode(content)]]));
    expect(examined.facts).toEqual([]);
    expect(examined.refused).toHaveLength(1);
    expect(({} as { polluted?: boolean }).polluted).toBeUndefined();
  });

  it('keeps what a newer version wrote untouched, and says so of a newer packet', async () => {
    const newer = { _id: 'edit:01J00000000000000000000001', v: 2, kind: 'edit', shape: { of: 'tomorrow' } };
    const bytes = await packetOf([newer as Fact], new Map(), sampleManifest({ v: 2 }));
    const examined = await examine(bytes);
    expect(examined.facts).toEqual([{ fact: newer, isKnown: false }]);
    expect(examined.refused).toEqual([
      { name: 'manifest.json', problem: { code: 'newer-version', facts: { version: 2 } } },
    ]);
  });

  it('refuses a reading without its samples, or with other samples', async () => {
    const { fact } = sampleReading(1);
    const without = await examine(await packetOf([fact], new Map()));
    const other = await examine(await packetOf([fact], new Map([[fact._id, sampleReading(2).raw]])));
    expect(reasonsOf(without)[0]).toContain('samples-missing');
    expect(reasonsOf(other)[0]).toContain('samples-hash');
    expect([...without.facts, ...other.facts]).toEqual([]);
  });

  it('never throws for random bytes, with or without a ZIP’s first letters', async () => {
    const property = fc.asyncProperty(
      fc.uint8Array({ maxLength: 600 }),
      fc.boolean(),
      async (tail, isZip) => {
        const head = isZip ? new Uint8Array([0x50, 0x4b, 3, 4]) : new Uint8Array();
        expect((await examine(joined([head, tail]))).facts).toEqual([]);
      },
    );
    await fc.assert(property, { numRuns: 200 });
  });
});
