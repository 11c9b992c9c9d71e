import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import type { EditFact, Fact } from '../../../src/core/model/fact.ts';
import { isErased, planMerge, type KeptFacts } from '../../../src/core/packet/merge-facts.ts';
import { revisionOf } from '../../../src/core/packet/revision.ts';
import { ENTITY, histories } from '../../support/random-history.ts';

/** A device's store as the plan sees it, with bodies beside. */
class Shelf {
  readonly facts = new Map<string, Fact>();
  readonly erased = new Set<string>();

  get kept(): KeptFacts {
    return {
      revisions: new Map([...this.facts].map(([id, fact]) => [id, revisionOf(fact)])),
      erased: this.erased,
    };
  }

  take(incoming: readonly Fact[]) {
    const plan = planMerge(this.kept, incoming);
    for (const { fact } of plan.add) this.facts.set(fact._id, fact);
    for (const target of plan.drop) this.erased.add(target);
    for (const [id, fact] of this.facts) if (isErased(fact, this.erased)) this.facts.delete(id);
    return plan;
  }

  get content() {
    return [...this.facts.keys()].sort();
  }
}

const erase = (target: string, device = 'device:A'): Fact => ({
  _id: `erase:${target}`,
  v: 1,
  kind: 'erase',
  target,
  device,
  at: '2026-03-01T10:00:00.000Z',
});

const withErasures = fc
  .tuple(histories, fc.array(fc.nat(30), { maxLength: 3 }), fc.boolean())
  .map(([edits, picks, isEntityErased]) => [
    ...edits,
    ...picks.map((pick) => erase(edits[pick % edits.length]!._id)),
    ...(isEntityErased ? [erase(ENTITY)] : []),
  ]);

describe('planMerge', () => {
  it('comes to the same whatever the order and the batches (property)', () => {
    fc.assert(
      fc.property(
        withErasures,
        fc.infiniteStream(fc.nat(1000)),
        fc.integer({ min: 1, max: 7 }),
        (facts, chance, size) => {
          const straight = new Shelf();
          straight.take(facts);
          const mixed = facts
            .map((fact) => ({ fact, key: chance.next().value as number }))
            .sort((a, b) => a.key - b.key)
            .map(({ fact }) => fact);
          const pieces = new Shelf();
          for (let at = 0; at < mixed.length; at += size) pieces.take(mixed.slice(at, at + size));
          expect(pieces.content).toEqual(straight.content);
        },
      ),
      { numRuns: 300 },
    );
  });

  it('adds nothing the second time (property)', () => {
    fc.assert(
      fc.property(withErasures, (facts) => {
        const shelf = new Shelf();
        shelf.take(facts);
        const again = shelf.take(facts);
        expect(again.add).toEqual([]);
        expect(again.damaged).toEqual([]);
        expect(again.drop).toEqual([]);
      }),
      { numRuns: 200 },
    );
  });

  it('keeps the first and reports the second of one id with two contents', () => {
    fc.assert(
      fc.property(histories, (edits) => {
        const shelf = new Shelf();
        shelf.take(edits);
        const forged: EditFact = { ...edits[0]!, set: { name: 'forged' } };
        expect(shelf.take([forged]).damaged).toEqual([forged._id]);
        expect(shelf.facts.get(forged._id)).toEqual(edits[0]);
      }),
      { numRuns: 50 },
    );
  });

  it('does not take two erasures of one thing for damage', () => {
    const shelf = new Shelf();
    shelf.take([erase(ENTITY)]);
    expect(shelf.take([erase(ENTITY, 'device:B')])).toMatchObject({ add: [], damaged: [] });
  });

  it('refuses what was erased, and what hangs on it, from then on', () => {
    const reading = 'reading:01J00000000000000000000000';
    const shelf = new Shelf();
    shelf.take([erase(reading)]);
    const result = { _id: 'result:1', v: 9, kind: 'result', reading };
    expect(shelf.take([{ _id: reading, v: 1, kind: 'reading' }, result]).add).toEqual([]);
  });
});
