import 'fake-indexeddb/auto';
import { describe, it, expect } from 'vitest';
import type { Fact } from '../../src/core/model/fact.ts';
import { revisionOf } from '../../src/core/packet/revision.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';
import { fuzzReadBack } from '../support/fuzz-read-back.ts';
import { readingDraft, sampleAnalysis, sampleRecording } from '../support/reading-draft.ts';

let serial = 0;
const freshName = () => `store-${(serial += 1)}`;
const fresh = () => openStore({ name: freshName() });
const RAIL = { text: 'rail' };

async function factsOf(store: Store): Promise<Fact[]> {
  const facts: Fact[] = [];
  for await (const fact of store.facts()) facts.push(fact);
  return facts;
}

describe('readings', () => {
  it('come back as kept, sample for sample', async () => {
    const store = await fresh();
    const recording = sampleRecording(600);
    const saved = await store.saveReading(readingDraft(), recording, { label: 'north rail' });
    const opened = await store.openReading(saved._id);
    expect(opened?.reading).toEqual(saved);
    expect(opened?.recording).toEqual(recording);
    expect(opened?.entity.fields).toEqual({ label: 'north rail' });
    expect(saved.rawBytes).toBe((await store.rawOf(saved._id))?.length);
  });

  it('hold results of 7 significant digits, and practice for good', async () => {
    const store = await fresh();
    const analysis = sampleAnalysis(7.123456789);
    const saved = await store.saveReading(readingDraft({ analysis }), sampleRecording(60, true));
    expect(saved.analysis.modes[0]?.frequencyHz).toBe(7.123457);
    expect(saved.practice).toBe(true);
  });

  it('are never written malformed', async () => {
    const store = await fresh();
    const draft = readingDraft({ recordedAt: 'yesterday' });
    await expect(store.saveReading(draft, sampleRecording(60))).rejects.toThrow(/recordedAt/);
    const recording = sampleRecording(60);
    recording.accelerationMps2[0]![3] = Number.NaN;
    await expect(store.saveReading(readingDraft(), recording)).rejects.toThrow(/samples/);
    expect(await factsOf(store)).toEqual([]);
  });

  it('list newest first and answer filters', async () => {
    const store = await fresh();
    const site = await store.newEntity('site', { name: 'Hafenmühle' });
    const old = await store.saveReading(
      readingDraft({ recordedAt: '2026-01-01T10:00:00.000Z' }),
      sampleRecording(60),
    );
    const late = await store.saveReading(
      readingDraft({ recordedAt: '2026-02-01T10:00:00.000Z', procedure: 'running', site: site.id }),
      sampleRecording(60),
      { label: 'Pump rail' },
    );
    const ids = async (filter = {}) => (await store.listReadings(filter)).map(({ id }) => id);
    expect(await ids()).toEqual([late._id, old._id]);
    expect(await ids({ procedure: 'tap' })).toEqual([old._id]);
    expect(await ids({ site: site.id })).toEqual([late._id]);
    expect(await ids(RAIL)).toEqual([late._id]);
    expect(await ids({ text: 'hafenmuhle 2026-02' })).toEqual([late._id]);
    expect(await ids({ text: 'nowhere' })).toEqual([]);
    await store.edit(site.id, { name: 'Quay' });
    expect(await ids({ text: 'quay' })).toEqual([late._id]);
  });

  it('follow their edits: place named later, trash and back', async () => {
    const store = await fresh();
    const spot = await store.newEntity('spot', { name: 'third post' });
    const { _id } = await store.saveReading(readingDraft(), sampleRecording(60));
    await store.edit(_id, { spot: spot.id, label: 'rail' });
    expect((await store.listReadings({ spot: spot.id }))[0]?.label).toBe('rail');
    await store.edit(_id, { trashed: true });
    expect(await store.listReadings()).toEqual([]);
    expect(await store.listReadings({ trashed: true })).toHaveLength(1);
    await store.edit(_id, { trashed: false, spot: null });
    expect(await store.listReadings({ spot: spot.id })).toEqual([]);
    expect((await store.listReadings())[0]?.spot).toBeUndefined();
    expect(await store.history(_id)).toHaveLength(3);
  });

  it('take redone analyses beside them, untouched themselves', async () => {
    const store = await fresh();
    const { _id } = await store.saveReading(readingDraft(), sampleRecording(60));
    const before = (await store.openReading(_id))?.reading;
    const analysis = sampleAnalysis(8.8);
    const at = '2026-03-02T10:00:00.000Z';
    await store.saveResult({ reading: _id, analysisVersion: 1, settings: analysis.settings, analysis, at });
    const opened = await store.openReading(_id);
    expect(opened?.reading).toEqual(before);
    expect(opened?.results.map(({ analysis: one }) => one.modes[0]?.frequencyHz)).toEqual([8.8]);
  });
});

describe('edits', () => {
  it('show a conflict written unknown to each other, until a person chooses', async () => {
    const [a, b] = [await fresh(), await fresh()];
    const site = await a.newEntity('site', { name: 'Quay' });
    const copy = async (from: Store, to: Store) =>
      to.putFacts((await factsOf(from)).map((fact) => ({ fact })));
    await copy(a, b);
    await a.edit(site.id, { name: 'North quay' });
    await b.edit(site.id, { name: 'Old quay' });
    await copy(a, b);
    await copy(b, a);
    const [seenA, seenB] = [await a.entity(site.id), await b.entity(site.id)];
    expect(seenA).toEqual(seenB);
    expect(seenA?.conflicts['name']).toHaveLength(2);
    await a.edit(site.id, { name: 'Old quay' });
    expect(await a.entity(site.id)).toMatchObject({ fields: { name: 'Old quay' }, conflicts: {} });
    expect(await a.history(site.id)).toHaveLength(4);
  });

  it('list entities of a kind only', async () => {
    const store = await fresh();
    const site = await store.newEntity('site', { name: 'Quay' });
    await store.newEntity('spot', { name: 'post' });
    expect(await store.entities('site')).toEqual([await store.entity(site.id)]);
    expect(await store.entity('site:01J00000000000000000000000')).toBeUndefined();
  });
});

describe('erasing', () => {
  it('takes body, samples, edits and photos, keeps the id and refuses them from then on', async () => {
    const store = await fresh();
    const { _id } = await store.saveReading(readingDraft(), sampleRecording(60), { label: 'mine' });
    await store.savePhoto(_id, Uint8Array.of(0xff, 0xd8, 1), 4, 3);
    const before = await Promise.all(
      (await factsOf(store)).map(async (fact) => ({ fact, raw: await store.rawOf(fact._id) })),
    );
    await store.erase(_id);
    expect((await factsOf(store)).map(({ _id: id }) => id)).toEqual([`erase:${_id}`]);
    expect(await store.openReading(_id)).toBeUndefined();
    expect(await store.rawOf(_id)).toBeUndefined();
    expect(await store.listReadings()).toEqual([]);
    const again = await store.putFacts(
      before.map(({ fact, raw }) => (raw === undefined ? { fact } : { fact, raw })),
    );
    expect(again).toMatchObject({ added: 0, damaged: [] });
    expect(await store.rawOf(_id)).toBeUndefined();
  });
});

describe('putFacts', () => {
  it('adds once, forwards what it does not understand, reports damage and keeps the first', async () => {
    const [from, to] = [await fresh(), await fresh()];
    const { _id } = await from.saveReading(readingDraft(), sampleRecording(60), { label: 'x' });
    const raw = (await from.rawOf(_id))!;
    const strange = { _id: 'drawing:1', v: 3, kind: 'drawing', lines: [1, 2] };
    const facts = [...(await factsOf(from)), strange];
    const batch = facts.map((fact) => (fact._id === _id ? { fact, raw } : { fact }));
    expect(await to.putFacts(batch)).toEqual({ added: 3, known: 0, damaged: [] });
    expect(await to.putFacts(batch)).toEqual({ added: 0, known: 3, damaged: [] });
    expect(await to.fact('drawing:1')).toEqual({ fact: strange, revision: revisionOf(strange) });
    expect((await to.openReading(_id))?.recording.timeS).toHaveLength(60);
    expect((await to.listReadings())[0]?.label).toBe('x');
    const forged = { ...strange, lines: [] };
    expect(await to.putFacts([{ fact: forged }])).toMatchObject({ added: 0, damaged: ['drawing:1'] });
    expect((await to.fact('drawing:1'))?.fact).toEqual(strange);
  });

  it('refuses samples whose hash differs, takes the stored form, and fills in samples that come later', async () => {
    const [from, to] = [await fresh(), await fresh()];
    const { _id } = await from.saveReading(readingDraft(), sampleRecording(60));
    const { fact } = (await from.fact(_id))!;
    const hurt = (await from.rawOf(_id))!.slice();
    hurt[hurt.length - 1]! ^= 1;
    expect(await to.putFacts([{ fact, raw: hurt }])).toEqual({ added: 0, known: 0, damaged: [_id] });
    expect(await to.putFacts([{ fact }])).toMatchObject({ added: 1 });
    await expect(to.openReading(_id)).rejects.toMatchObject({ code: 'damaged' });
    expect(await to.putFacts([{ fact, raw: (await from.storedRawOf(_id))! }])).toMatchObject({ known: 1 });
    expect((await to.openReading(_id))?.recording.timeS).toHaveLength(60);
  });

  it('names readings of a newer version, which are kept but not listed', async () => {
    const store = await fresh();
    const { _id } = await store.saveReading(readingDraft(), sampleRecording(60));
    const newer = { _id: 'reading:01K00000000000000000000000', v: 2, kind: 'reading', spirit: 'level' };
    expect(await store.putFacts([{ fact: newer }])).toMatchObject({ added: 1, damaged: [] });
    expect(await store.newerReadings()).toEqual([newer._id]);
    expect((await store.listReadings()).map(({ id }) => id)).toEqual([_id]);
    expect(await store.openReading(newer._id)).toBeUndefined();
    expect((await store.fact(newer._id))?.fact).toEqual(newer);
  });

  it('reports what is no fact at all', async () => {
    const store = await fresh();
    const bad = [null, 7, {}, { _id: 'x', v: 1, kind: 'y' }] as unknown as Fact[];
    expect((await store.putFacts(bad.map((fact) => ({ fact })))).damaged).toHaveLength(4);
  });
});

describe('changesSince', () => {
  it('gives every new fact once, in the order of arrival', async () => {
    const store = await fresh();
    for (let i = 0; i < 5; i += 1) await store.newEntity('site', { name: `${i}` });
    const first = await store.changesSince(0, 3);
    const rest = await store.changesSince(first.last, 100);
    expect(first.ids).toHaveLength(3);
    expect(new Set([...first.ids, ...rest.ids]).size).toBe(5);
    expect(await store.changesSince(rest.last, 100)).toEqual({ ids: [], last: rest.last });
  });
});

describe('facts', () => {
  it('streams more than one page, each once', async () => {
    const store = await fresh();
    const facts = Array.from({ length: 450 }, (_, i) => ({
      _id: `drawing:${String(i).padStart(4, '0')}`,
      v: 1,
      kind: 'drawing',
    }));
    await store.putFacts(facts.map((fact) => ({ fact })));
    expect((await factsOf(store)).map(({ _id }) => _id)).toEqual(facts.map(({ _id }) => _id));
  });
});

describe('journal', () => {
  const meta = { ...sampleRecording(0), startedAt: '2026-03-01T10:00:00.000Z' };

  it('gives back what was handed over, marked, and goes with the saved reading', async () => {
    const name = freshName();
    const store = await openStore({ name });
    const id = await store.begin(meta);
    const { timeS, accelerationMps2 } = sampleRecording(120);
    const part = (from: number, to: number) =>
      [timeS.slice(from, to), accelerationMps2.map((axis) => axis.slice(from, to))] as const;
    await store.append(id, 0, ...part(0, 60));
    await store.append(id, 1, ...part(60, 120));
    expect(await store.recoverable()).toEqual([]);
    store.close();

    const next = await openStore({ name });
    const [journal] = await next.recoverable();
    expect(journal).toMatchObject({ journalId: id, sampleCount: 120, startedAt: meta.startedAt });
    expect(journal?.durationS).toBeCloseTo(119 / 60, 9);
    const recording = await next.recover(id);
    expect(recording.timeS).toEqual(timeS);
    expect(recording.accelerationMps2).toEqual(accelerationMps2);
    expect(recording.sensor.interruption).toBe('recovered-after-crash');
    await next.saveReading(readingDraft(), recording, { journalId: id });
    expect(await next.recoverable()).toEqual([]);
    await expect(next.recover(id)).rejects.toMatchObject({ code: 'damaged' });
  });

  it('keeps the reason of an interruption, and can be dropped', async () => {
    const name = freshName();
    const store = await openStore({ name });
    const id = await store.begin(meta);
    await store.flag(id, 'hidden');
    store.close();
    const next = await openStore({ name });
    expect((await next.recover(id)).sensor.interruption).toBe('hidden');
    await next.dropJournal(id);
    expect(await next.recoverable()).toEqual([]);
  });
});

describe('the rest', () => {
  it('keeps settings and its own name over openings', async () => {
    const name = freshName();
    const store = await openStore({ name });
    await store.putSetting('theme', { name: 'sunlight' });
    store.close();
    const next = await openStore({ name });
    expect(await next.getSetting('theme')).toEqual({ name: 'sunlight' });
    expect(next.device).toBe(store.device);
    expect(next.device).toMatch(/^device:\w{26}$/);
  });

  it('keeps the last 200 errors', async () => {
    const store = await fresh();
    for (let i = 0; i < 205; i += 1) store.noteError(`error ${i}`, 'x'.repeat(5000));
    await new Promise((resolve) => setTimeout(resolve, 50));
    const log = await store.errorLog();
    expect(log).toHaveLength(200);
    expect(log[0]?.message).toBe('error 5');
    expect(log[0]?.detail).toHaveLength(2000);
  });

  it('shows photos that are not in the trash', async () => {
    const store = await fresh();
    const spot = await store.newEntity('spot', { name: 'post' });
    const jpeg = Uint8Array.of(0xff, 0xd8, 7);
    const id = await store.savePhoto(spot.id, jpeg, 4, 3);
    expect(await store.photos(spot.id)).toEqual([{ id, jpeg }]);
    await store.edit(id, { trashed: true });
    expect(await store.photos(spot.id)).toEqual([]);
  });

  it('mends text that is half an emoji', async () => {
    const store = await fresh();
    const site = await store.newEntity('site', { name: 'a\ud83d' });
    expect(site.fields['name']).toBe('a\ufffd');
  });
});

describe('what is read back', () => {
  it('is refused or understood, never thrown through, whatever the database holds (fuzz)', async () => {
    await fuzzReadBack(60);
  });
});
