import 'fake-indexeddb/auto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Fact, ReadingFact } from '../../../src/core/model/fact.ts';
import { revisionOf } from '../../../src/core/packet/revision.ts';
import { createTeamStore } from '../../../src/exchange/team-store/create-team-store.ts';
import type { Store } from '../../../src/store/open-store.ts';
import { readingDraft, sampleRecording } from '../../support/reading-draft.ts';
import { nodeEnvironment } from '../../support/team-environment.ts';
import { newPhone } from '../../support/team-phone.ts';
import { startTeamServer, type TeamServer } from '../../support/team-server.ts';

/* Against a server of another make that speaks CouchDB's protocol, in a process of its own. */

let server: TeamServer;
beforeAll(async () => {
  server = await startTeamServer();
});
afterAll(() => server.stop());
beforeEach(() => server.empty());

const run = (store: Store, options: { again?: boolean; signal?: AbortSignal } = {}) =>
  createTeamStore(store, nodeEnvironment()).replicate(server.account, {
    signal: new AbortController().signal,
    onProgress: () => {},
    ...options,
  });
const standing = (store: Store) => createTeamStore(store, nodeEnvironment()).standing(server.account.url);

async function takeReadings(store: Store, count: number, sampleCount = 200): Promise<ReadingFact[]> {
  const taken: ReadingFact[] = [];
  for (let i = 0; i < count; i += 1)
    taken.push(await store.saveReading(readingDraft(), sampleRecording(sampleCount + i)));
  return taken;
}

const rawFact = (fact: object): object => ({ ...fact, _rev: revisionOf(fact) });

describe('replicate', () => {
  it('carries readings with their samples, photos and edits from one phone to another', async () => {
    const [one, other] = [await newPhone(), await newPhone()];
    const reading = await one.saveReading(readingDraft(), sampleRecording(600), { label: 'top rail' });
    const photo = await one.savePhoto(reading._id, Uint8Array.of(0xff, 0xd8, 1, 2, 3), 2, 2);
    expect(await run(one)).toEqual({ sentCount: 3, fetchedCount: 0, end: 'done' });
    expect(await run(other)).toEqual({ sentCount: 0, fetchedCount: 3, end: 'done' });
    expect(await other.storedRawOf(reading._id)).toEqual(await one.storedRawOf(reading._id));
    expect((await other.photos(reading._id)).map(({ id }) => id)).toEqual([photo]);
    const opened = await other.openReading(reading._id);
    expect(opened?.reading).toEqual(reading);
    expect(opened?.entity.fields['label']).toBe('top rail');
    expect((await standing(other)).waitingCount).toBe(0);
  });

  it('keeps each fact under the one revision of its content', async () => {
    const phone = await newPhone();
    const [reading] = await takeReadings(phone, 1);
    await run(phone);
    expect(await server.documents()).toEqual([
      { id: reading!._id, rev: revisionOf(reading!), conflicts: [] },
    ]);
  });

  it('sends nothing twice: a second run uploads nothing and asks two questions', async () => {
    const phone = await newPhone();
    await takeReadings(phone, 5);
    await run(phone);
    const before = await server.counts();
    expect(await run(phone)).toEqual({ sentCount: 0, fetchedCount: 0, end: 'done' });
    const after = await server.counts();
    expect(after.uploads - before.uploads).toBe(0);
    expect(after.calls - before.calls).toBe(2);
  });

  it('goes on after the link was cut in the middle of an upload, and repeats only what was on its way', async () => {
    const phone = await newPhone();
    const taken = await takeReadings(phone, 12, 2000);
    const uploadsBefore = (await server.counts()).uploads;
    const running = run(phone);
    await server.cutAfter(150_000);
    const arrived = (await server.documents()).length;
    await server.listen();
    expect((await running).end).toBe('done');
    expect(arrived).toBeLessThan(12);
    const ids = (await server.documents()).map(({ id }) => id);
    expect(ids.sort()).toEqual(taken.map(({ _id }) => _id).sort());
    // At most the three on their way went twice.
    expect((await server.counts()).uploads - uploadsBefore).toBeLessThanOrEqual(12 + 3);
    const other = await newPhone();
    expect(await run(other)).toMatchObject({ fetchedCount: 12, end: 'done' });
  });

  it('stops where it is when cancelled, marks nothing as sent that the server has not, and resumes', async () => {
    const phone = await newPhone();
    await takeReadings(phone, 8, 1000);
    const control = new AbortController();
    const stopped = await createTeamStore(phone, nodeEnvironment()).replicate(server.account, {
      signal: control.signal,
      onProgress: ({ doneCount }) => {
        if (doneCount === 3) control.abort();
      },
    });
    expect(stopped.end).toBe('cancelled');
    expect((await standing(phone)).waitingCount).toBe(8);
    expect((await standing(phone)).lastSuccessAt).toBeUndefined();
    expect((await run(phone)).end).toBe('done');
    expect(await standing(phone)).toMatchObject({
      waitingCount: 0,
      lastSuccessAt: '2026-03-01T12:00:00.000Z',
    });
    expect(await server.documents()).toHaveLength(8);
  });

  it('forwards kinds and versions that it does not know, untouched', async () => {
    const [one, other] = [await newPhone(), await newPhone()];
    const unknown = { _id: 'weather:01J00000000000000000000000', v: 3, kind: 'weather', rain: [1.25, 'x'] };
    await one.putFacts([{ fact: unknown as Fact }]);
    await run(one);
    await run(other);
    expect(await other.fact(unknown._id)).toEqual({ fact: unknown, revision: revisionOf(unknown) });
  });

  it('tells of an erasure: the others drop theirs, and it does not come back', async () => {
    const [one, other] = [await newPhone(), await newPhone()];
    const [reading] = await takeReadings(one, 2);
    await run(one);
    await run(other);
    await other.erase(reading!._id);
    await run(other);
    await run(one);
    expect(await one.fact(reading!._id)).toBeUndefined();
    expect(await one.storedRawOf(reading!._id)).toBeUndefined();
    await run(one, { again: true });
    expect(await one.listReadings()).toHaveLength(1);
    // Whoever comes later learns of the reading and of its erasure at once.
    const late = await newPhone();
    await run(late);
    await run(late, { again: true });
    expect(await late.listReadings()).toHaveLength(1);
  });

  it('sends everything again to a server that forgot', async () => {
    const phone = await newPhone();
    await takeReadings(phone, 3);
    await run(phone);
    await server.empty();
    expect(await run(phone)).toMatchObject({ sentCount: 3, end: 'done' });
    expect(await server.documents()).toHaveLength(3);
  });

  it('names what the server holds with another content, and keeps its own', async () => {
    const phone = await newPhone();
    const [reading] = await takeReadings(phone, 1);
    await run(phone);
    await server.put([rawFact({ ...reading!, practice: true, _id: reading!._id })]);
    expect((await run(phone)).end).toBe('done');
    expect((await standing(phone)).refused).toEqual([
      { id: reading!._id, lies: 'there', reason: 'other-content' },
    ]);
    expect((await phone.fact(reading!._id))?.fact).toEqual(reading);
  });

  it('leaves damaged documents, names them, and takes the others', async () => {
    const [one, other] = [await newPhone(), await newPhone()];
    const [reading] = await takeReadings(one, 1);
    await run(one);
    const edit = (id: string, name: string) => ({
      _id: `edit:01J0000000000000000000000${id}`,
      v: 1,
      kind: 'edit',
      entity: 'spot:01J00000000000000000000000',
      set: { name },
      over: {},
      device: 'device:x',
      at: '2026-03-01T10:00:00Z',
    });
    await server.put([
      { ...edit('A', 'rail'), _rev: `1-${'0'.repeat(32)}` },
      rawFact({ ...edit('B', 'rail'), constructor: { prototype: { polluted: true } } }),
      rawFact({ ...edit('C', 'rail'), at: 7 }),
      rawFact({ ...edit('D', 'whole') }),
      rawFact({ ...reading!, _id: 'reading:01J0000000000000000000000E' }),
      { _id: '_design/rules', _rev: `1-${'1'.repeat(32)}`, language: 'javascript' },
    ]);
    expect((await run(other)).end).toBe('done');
    expect((await other.entity('spot:01J00000000000000000000000'))?.fields['name']).toBe('whole');
    expect(await other.listReadings()).toHaveLength(1);
    const refused = (await standing(other)).refused.map(({ id, reason }) => `${id.slice(-1)} ${reason}`);
    expect(refused.sort()).toEqual(['A damaged', 'B damaged', 'C damaged', 'E raw-missing']);
    expect(({} as { polluted?: unknown }).polluted).toBeUndefined();
  });

  it('never puts a reading without its samples in the place of the whole one', async () => {
    const [one, other] = [await newPhone(), await newPhone()];
    const [reading] = await takeReadings(one, 1);
    await other.putFacts([{ fact: reading! }]);
    await run(other);
    expect(await server.documents()).toEqual([]);
    expect((await standing(other)).refused).toEqual([
      { id: reading!._id, lies: 'here', reason: 'raw-missing' },
    ]);
    await run(one);
    expect(await server.documents()).toHaveLength(1);
  });

  it('keeps both texts of two writers whose clocks differ by an hour, and asks a person on both phones', async () => {
    const [slow, right] = [await newPhone({ clockMs: -3_600_000 }), await newPhone()];
    const spot = (await right.newEntity('spot', { name: 'post 3', notes: 'first' })).id;
    await run(right);
    await run(slow);
    // Both offline: the one whose clock is an hour slow writes last in truth.
    await right.edit(spot, { notes: 'loose at the foot' });
    await slow.edit(spot, { notes: 'tightened, take again' });
    for (const phone of [right, slow, right]) expect((await run(phone)).end).toBe('done');
    const [here, there] = [await right.entity(spot), await slow.entity(spot)];
    expect(there).toEqual(here);
    expect(here?.conflicts['notes']?.map(({ value }) => value).sort()).toEqual([
      'loose at the foot',
      'tightened, take again',
    ]);
    // A person chooses on one phone: the question is gone on both, both texts stay in the history.
    await slow.edit(spot, { notes: 'tightened, take again' });
    for (const phone of [slow, right]) await run(phone);
    for (const phone of [slow, right]) {
      const settled = await phone.entity(spot);
      expect(settled?.conflicts).toEqual({});
      expect(settled?.fields['notes']).toBe('tightened, take again');
      const written = (await phone.history(spot)).map(({ set }) => set['notes']);
      expect(written).toEqual(expect.arrayContaining(['loose at the foot', 'tightened, take again']));
    }
  });
});

describe('check', () => {
  const check = (over: Partial<TeamServer['account']>) =>
    createTeamStore({} as Store, nodeEnvironment()).check(
      { ...server.account, ...over },
      new AbortController().signal,
    );

  it('takes the right account and tells what is wrong with another', async () => {
    expect(await check({})).toBeUndefined();
    expect(await check({ password: 'wrong' })).toBe('not-signed-in');
    expect(await check({ url: server.account.url.replace('/team', '/other') })).toBe('no-database');
    expect(await check({ url: 'http://127.0.0.1:9/team' })).toBe('unreachable');
  });
});
