import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createTeamStore } from '../../../src/exchange/team-store/create-team-store.ts';
import type { Store } from '../../../src/store/open-store.ts';
import { memoryCouch, type MemoryCouch } from '../../support/memory-couch.ts';
import { readingDraft, sampleRecording } from '../../support/reading-draft.ts';
import { nodeEnvironment } from '../../support/team-environment.ts';
import { newPhone } from '../../support/team-phone.ts';

const account = { url: 'https://store.example/team', user: 'works', password: 'secret' };
const PHONE_COUNT = 10;

/** What becomes of one call: it arrives and is answered, or is lost on its way there or back, or its answer breaks off. */
type Fate = 'arrives' | 'lost' | 'answer-lost' | 'answer-torn' | 'failing';

const fates: fc.Arbitrary<readonly Fate[]> = fc.array(
  fc.oneof(
    { weight: 5, arbitrary: fc.constant<Fate>('arrives') },
    { weight: 1, arbitrary: fc.constantFrom<Fate>('lost', 'answer-lost', 'answer-torn', 'failing') },
  ),
  { minLength: 40, maxLength: 200 },
);

/** One thing that someone does: take a reading, rename the shared spot, erase a reading of one's own, or replicate. */
const doings = fc.array(
  fc.record({
    who: fc.nat(PHONE_COUNT),
    what: fc.constantFrom('reading', 'reading', 'name', 'photo', 'replicate', 'replicate', 'interrupted'),
  }),
  { minLength: 20, maxLength: 60 },
);

function cuttingFetch(couch: MemoryCouch, plan: readonly Fate[]): MemoryCouch['fetch'] {
  let callCount = 0;
  return async (url, init) => {
    const fate = plan[callCount % plan.length]!;
    callCount += 1;
    if (fate === 'lost') throw new TypeError('failed to fetch');
    if (fate === 'failing') return new Response('{"error":"timeout"}', { status: 503 });
    const response = await couch.fetch(url, init);
    if (fate === 'answer-lost') throw new TypeError('failed to fetch');
    if (fate !== 'answer-torn') return response;
    const bytes = new Uint8Array(await response.arrayBuffer());
    return new Response(
      new ReadableStream({
        start(controller) {
          controller.enqueue(bytes.slice(0, bytes.length >> 1));
          controller.error(new TypeError('network error'));
        },
      }),
    );
  };
}

async function contents(store: Store): Promise<readonly string[]> {
  const found: string[] = [];
  for await (const fact of store.facts()) {
    const raw = await store.storedRawOf(fact._id);
    found.push(`${fact._id} ${(await store.fact(fact._id))!.revision} ${raw?.length ?? '-'}`);
  }
  return found.sort();
}

describe('ten phones, a laptop and one team store', () => {
  it('everything arrives once everywhere, whatever is cut', async () => {
    await fc.assert(
      fc.asyncProperty(fates, doings, async (plan, steps) => {
        const couch = memoryCouch();
        const stores = await Promise.all(Array.from({ length: PHONE_COUNT + 1 }, () => newPhone()));
        const spot = 'spot:01J00000000000000000000000';
        const replicate = (store: Store, fetch: MemoryCouch['fetch'], signal?: AbortSignal) =>
          createTeamStore(store, nodeEnvironment({ fetch })).replicate(account, {
            signal: signal ?? new AbortController().signal,
            onProgress: () => {},
          });
        let made = 0;
        for (const { who, what } of steps) {
          const store = stores[who]!;
          const cutting = cuttingFetch(couch, plan.slice(made % 7));
          if (what === 'replicate') await replicate(store, cutting);
          else if (what === 'interrupted') {
            const control = new AbortController();
            setTimeout(() => control.abort(), made % 4);
            await replicate(store, cutting, control.signal);
          } else {
            if (what === 'reading') await store.saveReading(readingDraft(), sampleRecording(20 + who));
            if (what === 'name') await store.edit(spot, { name: `name ${made}` });
            if (what === 'photo') await store.savePhoto(spot, Uint8Array.of(0xff, 0xd8, made, who), 2, 2);
            made += 1;
          }
        }
        // The link is good again: twice round, so that each learns what the last brought.
        for (const store of [...stores, ...stores]) {
          expect((await replicate(store, couch.fetch)).end).toBe('done');
        }
        const first = await contents(stores[0]!);
        expect(first).toHaveLength(made);
        for (const store of stores) {
          expect(await contents(store)).toEqual(first);
          const { waitingCount, refused } = await createTeamStore(
            store,
            nodeEnvironment({ fetch: couch.fetch }),
          ).standing(account.url);
          expect({ waitingCount, refused }).toEqual({ waitingCount: 0, refused: [] });
          store.close();
        }
        expect(couch.documents.size).toBe(made);
        expect(couch.conflictCount).toBe(0);
      }),
      { numRuns: 8, seed: 20261201 },
    );
  });
});
