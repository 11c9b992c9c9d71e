import 'fake-indexeddb/auto';
import { describe, it, expect } from 'vitest';
import { openStore } from '../../src/store/open-store.ts';
import { readingDraft, sampleRecording } from '../support/reading-draft.ts';

let serial = 0;
const fresh = () => openStore({ name: `store-${(serial += 1)}` });

describe('openStore', () => {
  it('gives back what it kept, sample for sample', async () => {
    const store = await fresh();
    const recording = sampleRecording(600);
    const saved = await store.saveReading(readingDraft(), recording, { label: 'north rail' });
    const opened = await store.openReading(saved._id);
    expect(opened?.reading).toEqual(saved);
    expect(opened?.recording).toEqual(recording);
    expect(opened?.entity.fields).toEqual({ label: 'north rail' });
    expect((await store.listReadings())[0]).toMatchObject({ id: saved._id, label: 'north rail' });
  });
});
