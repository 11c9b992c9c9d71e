import 'fake-indexeddb/auto';
import { describe, expect, it } from 'vitest';
import { createPlaces } from '../../src/app/places.ts';
import { createNotices } from '../../src/app/notices.ts';
import { createReadings, currentPlaceIds } from '../../src/app/readings.ts';
import { createRounds, ROUND_PAUSE_MS } from '../../src/app/rounds.ts';
import { openSettings } from '../../src/app/settings.ts';
import { createSources, isValidFor } from '../../src/app/sources.ts';
import { failure } from '../../src/core/model/outcome.ts';
import { parseSource } from '../../src/core/survey/parse-sources.ts';
import { openStore } from '../../src/store/open-store.ts';
import { readingDraft, sampleRecording } from '../support/reading-draft.ts';

let serial = 0;
const words = {
  undo: 'Undo',
  trashed: (n: number) => `${n} trashed`,
  restored: (n: number) => `${n} restored`,
  spotSet: (n: number) => `${n} set`,
};

async function bench() {
  const store = await openStore({ name: `places-${(serial += 1)}` });
  const places = createPlaces(store);
  const notices = createNotices();
  const refused = () => Promise.resolve(failure('no-taps'));
  const analysis = { analyse: refused, checkPhone: refused };
  const readings = createReadings(store, analysis, places, notices, words, () => ({}));
  const parse = (given: unknown) => {
    const parsed = parseSource(given);
    return parsed.ok ? parsed.value : undefined;
  };
  const sources = createSources(store, () => Promise.resolve(parse));
  return { store, places, readings, notices, sources };
}

/** Runs the undo of the last notice and waits for its edits. */
async function undo(notices: ReturnType<typeof createNotices>): Promise<void> {
  notices.list.get().at(-1)?.action?.run();
  await new Promise((resolve) => setTimeout(resolve, 20));
}

describe('places', () => {
  it('put spots under assets under sites, and what is nowhere beside them', async () => {
    const { places } = await bench();
    const site = await places.addSite('Mill yard');
    const asset = await places.addAsset('Gallery rail', site);
    await places.addSpot('Post 10', 'handrail', asset);
    await places.addSpot('Post 2', 'handrail', asset, 'across');
    await places.addAsset('Pump skid');
    await places.addSpot('Somewhere', 'other');
    const tree = await places.tree();
    expect(tree.sites[0]?.assets[0]?.spots.map((spot) => spot.name)).toEqual(['Post 2', 'Post 10']);
    expect(tree.sites[0]?.assets[0]?.spots[0]?.direction).toBe('across');
    expect(tree.looseAssets.map((entry) => entry.name)).toEqual(['Pump skid']);
    expect(tree.looseSpots.map((entry) => entry.name)).toEqual(['Somewhere']);
  });

  it('know where a spot is from the spot alone', async () => {
    const { places } = await bench();
    const site = await places.addSite('Mill yard');
    const asset = await places.addAsset('Gallery rail', site);
    const spot = await places.addSpot('Post 1', 'handrail', asset);
    expect(await places.whereabouts({ spot })).toEqual({
      spot,
      asset,
      site,
      place: { kind: 'handrail' },
      names: { spot: 'Post 1', asset: 'Gallery rail', site: 'Mill yard' },
    });
  });
});

describe('readings', () => {
  it('go to the trash and come back by the undo', async () => {
    const { store, readings, notices } = await bench();
    const first = await store.saveReading(readingDraft(), sampleRecording(60));
    const second = await store.saveReading(readingDraft(), sampleRecording(90));
    await readings.trash([first._id, second._id]);
    expect(notices.list.get().at(-1)?.text).toBe('2 trashed');
    expect(await readings.list()).toEqual([]);
    await undo(notices);
    expect(await readings.list()).toHaveLength(2);
  });

  it('get a spot afterwards, and lose it again by the undo', async () => {
    const { store, places, readings, notices } = await bench();
    const spot = await places.addSpot('Post 1', 'handrail');
    const { _id } = await store.saveReading(readingDraft(), sampleRecording(60));
    await readings.setSpot([_id], { spot });
    expect(await places.visits(spot)).toHaveLength(1);
    await undo(notices);
    expect(await places.visits(spot)).toEqual([]);
  });

  it('belong where the last edit says, not where they were taken', async () => {
    const { store, readings } = await bench();
    const { _id } = await store.saveReading(
      readingDraft({ spot: 'spot:01HV0000000000000000000000' }),
      sampleRecording(60),
    );
    await readings.edit(_id, { spot: null });
    const opened = await readings.open(_id);
    expect(opened && currentPlaceIds(opened)).toEqual({});
  });
});

describe('rounds', () => {
  it('begin with the first reading, go on with the next, and end after a long pause', async () => {
    const { store } = await bench();
    const settings = await openSettings(store, () => {});
    const rounds = createRounds(store, settings);
    const nine = new Date('2026-03-01T09:00:00Z');
    const round = await rounds.forNewReading(nine);
    await store.saveReading(readingDraft({ round, recordedAt: nine.toISOString() }), sampleRecording(60));
    const soon = new Date(nine.getTime() + 60_000);
    expect(await rounds.forNewReading(soon)).toBe(round);
    expect((await rounds.current(soon)).readings).toHaveLength(1);
    const later = new Date(nine.getTime() + ROUND_PAUSE_MS + 60_000);
    expect((await rounds.current(later)).id).toBeUndefined();
    expect(await rounds.forNewReading(later)).not.toBe(round);
  });

  it('end when the person says so', async () => {
    const { store } = await bench();
    const settings = await openSettings(store, () => {});
    const rounds = createRounds(store, settings);
    await rounds.forNewReading(new Date());
    rounds.end();
    expect((await rounds.current(new Date())).id).toBeUndefined();
  });
});

describe('sources', () => {
  it('are kept field by field, and a field that was cleared is gone', async () => {
    const { sources } = await bench();
    const id = await sources.save({ kind: 'machine', name: 'Pump', speedRpm: 1480, bladeCount: 5 }, {});
    await sources.save({ kind: 'machine', name: 'Pump', speedRpm: [900, 1500] }, {}, id);
    expect((await sources.open(id))?.source).toEqual({
      kind: 'machine',
      name: 'Pump',
      speedRpm: [900, 1500],
    });
  });

  it('count for their asset, for all of their site, or everywhere', async () => {
    const { sources } = await bench();
    const walking = { kind: 'footfall', activity: 'walking' } as const;
    await sources.save({ ...walking, name: 'here' }, { asset: 'asset:A' });
    await sources.save({ ...walking, name: 'site' }, { site: 'site:S' });
    await sources.save({ ...walking, name: 'all' }, {});
    const names = async (place: { asset?: string; site?: string }) =>
      (await sources.validFor(place)).map((entry) => entry.source.name);
    expect(await names({ asset: 'asset:A', site: 'site:S' })).toEqual(['all', 'here', 'site']);
    expect(await names({ asset: 'asset:B', site: 'site:S' })).toEqual(['all', 'site']);
    expect(await names({})).toEqual(['all']);
    expect(isValidFor({ asset: 'asset:A', site: 'site:S' }, { site: 'site:S' })).toBe(false);
  });
});
