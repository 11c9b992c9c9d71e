import 'fake-indexeddb/auto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { createTeamStore } from '../../../src/exchange/team-store/create-team-store.ts';
import { openStore, type Store } from '../../../src/store/open-store.ts';
import { readingDraft, sampleRecording } from '../../support/reading-draft.ts';
import { nodeEnvironment } from '../../support/team-environment.ts';
import { startTeamServer, type TeamServer } from '../../support/team-server.ts';

let server: TeamServer;
beforeAll(async () => {
  server = await startTeamServer();
});
afterAll(() => server.stop());
beforeEach(() => server.empty());

let phoneCount = 0;
async function phone(): Promise<Store> {
  phoneCount += 1;
  return openStore({ name: `phone-${phoneCount}` });
}

const run = (store: Store, options: { again?: boolean; signal?: AbortSignal } = {}) =>
  createTeamStore(store, nodeEnvironment()).replicate(server.account, {
    signal: new AbortController().signal,
    onProgress: () => {},
    ...options,
  });

describe('replicate', () => {
  it('carries readings with their samples, photos and edits from one phone to another', async () => {
    const [one, other] = [await phone(), await phone()];
    const reading = await one.saveReading(readingDraft(), sampleRecording(600), { label: 'top rail' });
    const photo = await one.savePhoto(reading._id, Uint8Array.of(0xff, 0xd8, 1, 2, 3), 2, 2);
    expect(await run(one)).toEqual({ sentCount: 3, fetchedCount: 0, end: 'done' });
    expect(await run(other)).toEqual({ sentCount: 0, fetchedCount: 3, end: 'done' });
    expect(await other.storedRawOf(reading._id)).toEqual(await one.storedRawOf(reading._id));
    expect((await other.photos(reading._id)).map(({ id }) => id)).toEqual([photo]);
    const opened = await other.openReading(reading._id);
    expect(opened?.reading).toEqual(reading);
    expect(opened?.entity.fields['label']).toBe('top rail');
  });
});
