import 'fake-indexeddb/auto';
import { unzipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import type { Fact } from '../../src/core/model/fact.ts';
import { readCsv } from '../../src/core/packet/read-csv.ts';
import type { Store } from '../../src/store/open-store.ts';
import { phone, takeIn, watch } from '../support/exchange-of.ts';
import { readingDraft, sampleAnalysis, sampleRecording } from '../support/reading-draft.ts';

async function factsOf(store: Store): Promise<Fact[]> {
  const facts: Fact[] = [];
  for await (const fact of store.facts()) facts.push(fact);
  return facts;
}
const bytesOf = async (file: Blob) => new Uint8Array(await file.arrayBuffer());
const cutAt = (file: Blob, share: number) => file.slice(0, Math.floor(file.size * share));

/** A site with a spot and a source, another site with its own, a reading at each spot with a photo and a redone analysis. */
async function furnished() {
  const it = await phone();
  const { store } = it;
  const place = async (name: string) => {
    const site = await store.newEntity('site', { name });
    const asset = await store.newEntity('asset', { name: `${name} stair`, site: site.id });
    const spot = await store.newEntity('spot', { name: `${name} rail`, asset: asset.id, kind: 'handrail' });
    const source = await store.newEntity('source', { name: `${name} pump`, kind: 'machine', site: site.id });
    const reading = await store.saveReading(
      readingDraft({ spot: spot.id }),
      sampleRecording(120 + name.length),
      { label: `=1+1 ${name}` },
    );
    await store.saveResult({
      reading: reading._id,
      analysisVersion: 1,
      settings: { procedure: 'tap', timing: 'clock' },
      analysis: sampleAnalysis(7.5),
      at: '2026-03-01T11:00:00.000Z',
    });
    await store.savePhoto(spot.id, new Uint8Array([0xff, 0xd8, name.length, 0xff, 0xd9]), 4, 3);
    return { site, asset, spot, source, reading };
  };
  return { ...it, mill: await place('Mill'), quay: await place('Quay yard') };
}

describe('packet', () => {
  it('of everything restores everything on an empty phone, byte for byte, and once', async () => {
    const from = await furnished();
    const packet = await from.exchange.packet('all', undefined, watch());
    expect(packet.name).toBe('thrumbook-everything-2026-03-02.thrumbook.zip');
    const to = await phone();
    const facts = await factsOf(from.store);
    expect(await takeIn(to.exchange, packet)).toBe(facts.length);
    expect(await factsOf(to.store)).toEqual(facts);
    for (const { _id } of facts) expect(await to.store.rawOf(_id)).toEqual(await from.store.rawOf(_id));
    expect(await takeIn(to.exchange, packet)).toBe(0);
    const again = await to.exchange.preview(packet, watch());
    expect(again).toMatchObject({ ok: true, value: { newReadings: [], knownReadingCount: 2, refused: [] } });
  });

  it('of a reading brings what it needs and nothing of other places', async () => {
    const from = await furnished();
    const to = await phone();
    await takeIn(to.exchange, await from.exchange.packet([from.mill.reading._id], undefined, watch()));
    const { mill, quay } = from;
    for (const { id } of [mill.site, mill.asset, mill.spot, mill.source])
      expect((await to.store.entity(id))?.fields).toEqual((await from.store.entity(id))?.fields);
    expect(await to.store.photos(mill.spot.id)).toHaveLength(1);
    expect((await to.store.openReading(mill.reading._id))?.results).toHaveLength(1);
    const about = JSON.stringify(await factsOf(to.store));
    for (const { id } of [quay.site, quay.asset, quay.spot, quay.source]) expect(about).not.toContain(id);
    expect(about).not.toContain(quay.reading._id);
  });

  it('tells what is new with its place in words before anything is taken', async () => {
    const from = await furnished();
    const to = await phone();
    const packet = await from.exchange.packet([from.mill.reading._id], undefined, watch());
    const seen = await to.exchange.preview(packet, watch());
    expect(seen.ok && seen.value.newReadings).toMatchObject([
      { id: from.mill.reading._id, where: ['=1+1 Mill', 'Mill rail', 'Mill stair', 'Mill'] },
    ]);
    expect(await factsOf(to.store)).toEqual([]);
  });

  it('gives its whole readings when it was cut, and the rest with the next copy', async () => {
    const from = await phone();
    for (let i = 0; i < 8; i += 1) await from.store.saveReading(readingDraft(), sampleRecording(300 + i));
    const packet = await from.exchange.packet('all', undefined, watch());
    const to = await phone();
    const first = await takeIn(to.exchange, cutAt(packet, 0.6));
    expect(first).toBeGreaterThan(2);
    expect(first).toBeLessThan(8);
    expect(await takeIn(to.exchange, packet)).toBe(8 - first);
  });

  it('never overwrites: the same reading with other numbers is named and the first kept', async () => {
    const from = await phone();
    const reading = await from.store.saveReading(readingDraft(), sampleRecording(60));
    const to = await phone();
    const forged = { ...reading, analysis: sampleAnalysis(9.9) };
    await to.store.putFacts([{ fact: forged }]);
    const seen = await to.exchange.preview(await from.exchange.packet('all', undefined, watch()), watch());
    expect(seen.ok && seen.value.refused.map(({ problem }) => problem.facts['reason'])).toEqual(['differs']);
    expect(seen.ok && (await seen.value.take(watch())).added).toBe(0);
    expect((await to.store.fact(reading._id))?.fact).toEqual(forged);
  });

  it('can be stopped while it is written and while it is taken; what was taken stays, the rest comes later', async () => {
    const from = await phone();
    for (let i = 0; i < 130; i += 1) await from.store.saveReading(readingDraft(), sampleRecording(20 + i));
    const stop = new AbortController();
    const half = (share: number) => {
      if (share >= 0.5) stop.abort();
    };
    const stopped = { signal: stop.signal, onProgress: half };
    await expect(from.exchange.packet('all', undefined, stopped)).rejects.toThrow(/abort/i);
    const packet = await from.exchange.packet('all', undefined, watch());
    const to = await phone();
    const seen = await to.exchange.preview(packet, watch());
    if (!seen.ok) throw new Error('not read');
    const taking = new AbortController();
    const onProgress = (share: number) => {
      if (share >= 0.5) taking.abort();
    };
    await expect(seen.value.take({ signal: taking.signal, onProgress })).rejects.toThrow(/abort/i);
    const kept = (await to.store.listReadings()).length;
    expect(kept).toBeGreaterThan(0);
    expect(kept).toBeLessThan(130);
    expect(await takeIn(to.exchange, packet)).toBe(130 - kept);
  });

  it('of ten phones arrives once on one laptop, in any order and cut in between', async () => {
    const packets: Blob[] = [];
    for (let i = 0; i < 10; i += 1) {
      const { store, exchange } = await phone();
      for (let k = 0; k < 3; k += 1) await store.saveReading(readingDraft(), sampleRecording(40 + 3 * i + k));
      packets.push(await exchange.packet('all', undefined, watch()));
    }
    const laptop = await phone();
    const order = [...packets, ...packets].map((file, i) => (i % 3 === 0 ? cutAt(file, 0.7) : file));
    for (const file of [...order, ...[...packets].reverse()])
      await takeIn(laptop.exchange, file).catch(() => undefined);
    expect(await laptop.store.listReadings()).toHaveLength(30);
  });

  it('holds a table whose free text no spreadsheet takes for a formula, and bare numbers', async () => {
    const from = await furnished();
    const files = unzipSync(await bytesOf(await from.exchange.packet('all', undefined, watch())));
    const table = new TextDecoder().decode(files['readings.csv']);
    const [head, units, first] = table.split('\r\n');
    expect(head).toContain('mode1_frequency,');
    expect(units!.split(',')).toHaveLength(head!.split(',').length);
    expect(first).toContain('"\'=1+1 Mill"');
    expect(first).toContain(',7.5,');
    expect(first).toMatch(/Indicative survey, not a certified measurement\."?$/);
    expect(new TextDecoder().decode(files['report.html'])).toContain('Mill rail');
  });
});

describe('other files', () => {
  it('are refused with a reason when they carry no packet', async () => {
    const { exchange } = await phone();
    for (const content of ['', 'PK', '<html>', 'a,b\n1,2', 'x'.repeat(200_000)])
      expect(await exchange.preview(new Blob([content]), watch())).toMatchObject({
        ok: false,
        problem: { code: 'unreadable-file', facts: { reason: 'no-packet' } },
      });
  });

  it('samples go out as CSV that reads back the same, practice marked, and as NPY', async () => {
    const { store, exchange } = await phone();
    const reading = await store.saveReading(readingDraft({ practice: true }), sampleRecording(500, true));
    const opened = (await store.openReading(reading._id))!;
    const csv = readCsv(await exchange.samples(opened, 'csv').text(), { name: 'samples.csv' });
    if (!csv.ok) throw new Error(JSON.stringify(csv.problem));
    expect(csv.value.timeS).toEqual(opened.recording.timeS);
    expect(csv.value.accelerationMps2).toEqual(opened.recording.accelerationMps2);
    expect(csv.value.sensor.practice).toBe(true);
    const npy = await bytesOf(exchange.samples(opened, 'npy'));
    const headBytes = 10 + new DataView(npy.buffer).getUint16(8, true);
    expect(headBytes % 64).toBe(0);
    expect(new TextDecoder().decode(npy.subarray(10, headBytes))).toContain("'shape': (500, 4)");
    const values = new Float64Array(npy.buffer.slice(headBytes));
    expect(values[4 * 7]).toBe(opened.recording.timeS[7]);
    expect(values[4 * 7 + 3]).toBe(opened.recording.accelerationMps2[2]![7]);
  });
});
