import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import type { EditFact } from '../../../src/core/model/fact.ts';
import { currentEdits, foldEdits } from '../../../src/core/packet/fold-edits.ts';
import { ENTITY, histories } from '../../support/random-history.ts';

const edit = (over: Partial<EditFact> & Pick<EditFact, '_id' | 'set'>): EditFact => ({
  v: 1,
  kind: 'edit',
  entity: ENTITY,
  over: {},
  device: 'device:A',
  at: '2026-03-01T10:00:00.000Z',
  ...over,
});

describe('foldEdits', () => {
  it('takes the edit that no other replaces, however wrong its clock', () => {
    const first = edit({ _id: 'edit:1', set: { name: 'rail' }, at: '2026-03-01T12:00:00.000Z' });
    const later = edit({ _id: 'edit:2', set: { name: 'north rail' }, over: { name: ['edit:1'] } });
    expect(foldEdits(ENTITY, [first, later])).toEqual({
      id: ENTITY,
      kind: 'spot',
      fields: { name: 'north rail' },
      conflicts: {},
      trashed: false,
    });
  });

  it('shows the later of two written unknown to each other, and lists both', () => {
    const a = edit({ _id: 'edit:1', set: { name: 'a', hint: 'left' } });
    const b = edit({
      _id: 'edit:2',
      set: { name: 'b' },
      device: 'device:B',
      at: '2026-03-01T11:30:00.000+02:00',
    });
    const folded = foldEdits(ENTITY, [a, b]);
    // 11:30 at +02:00 is before 10:00 in UTC.
    expect(folded.fields).toEqual({ name: 'a', hint: 'left' });
    expect(folded.conflicts['name']?.map(({ value }) => value)).toEqual(['b', 'a']);
    expect(folded.conflicts['hint']).toBeUndefined();
  });

  it('is no conflict when both wrote the same', () => {
    const a = edit({ _id: 'edit:1', set: { name: 'rail' } });
    const b = edit({ _id: 'edit:2', set: { name: 'rail' }, device: 'device:B' });
    expect(foldEdits(ENTITY, [a, b]).conflicts).toEqual({});
  });

  it('ends a conflict by an edit that replaces all', () => {
    const a = edit({ _id: 'edit:1', set: { name: 'a' } });
    const b = edit({ _id: 'edit:2', set: { name: 'b' } });
    const choice = edit({
      _id: 'edit:3',
      set: { name: 'a' },
      over: { name: currentEdits(ENTITY, 'name', [a, b]) },
    });
    expect(foldEdits(ENTITY, [a, b, choice])).toMatchObject({ fields: { name: 'a' }, conflicts: {} });
  });

  it('trashes and restores, and does not lose a field to edits that replace each other', () => {
    const bin = edit({ _id: 'edit:1', set: { trashed: true } });
    expect(foldEdits(ENTITY, [bin]).trashed).toBe(true);
    const back = edit({ _id: 'edit:2', set: { trashed: false }, over: { trashed: ['edit:1'] } });
    expect(foldEdits(ENTITY, [bin, back]).trashed).toBe(false);
    const ring = [
      edit({ _id: 'edit:3', set: { name: 'a' }, over: { name: ['edit:4', 'edit:3'] } }),
      edit({ _id: 'edit:4', set: { name: 'b' }, over: { name: ['edit:3'] } }),
    ];
    expect(foldEdits(ENTITY, ring).conflicts['name']).toHaveLength(2);
  });

  it('is free of order and of repeats over random histories on three devices (property)', () => {
    fc.assert(
      fc.property(histories, fc.infiniteStream(fc.nat(1000)), (edits, chance) => {
        const expected = foldEdits(ENTITY, edits);
        const mixed = [...edits, ...edits]
          .map((one) => ({ one, key: chance.next().value as number }))
          .sort((a, b) => a.key - b.key)
          .map(({ one }) => one);
        expect(foldEdits(ENTITY, mixed)).toEqual(expected);
      }),
      { numRuns: 300 },
    );
  });

  it('keeps every edit current or replaced by one that knew it: nothing disappears (property)', () => {
    fc.assert(
      fc.property(histories, (edits) => {
        const folded = foldEdits(ENTITY, edits);
        for (const one of edits) {
          const [field] = Object.keys(one.set) as [string];
          const isCurrent = currentEdits(ENTITY, field, edits).includes(one._id);
          const isReplaced = edits.some((other) => other.over[field]?.includes(one._id) ?? false);
          expect(isCurrent).toBe(!isReplaced);
          const shown = folded.conflicts[field]?.some(({ edit: id }) => id === one._id) ?? false;
          if (isCurrent) expect(shown || folded.fields[field] === one.set[field]).toBe(true);
        }
      }),
      { numRuns: 300 },
    );
  });

  it('ignores edits of other entities', () => {
    const other = edit({ _id: 'edit:1', set: { name: 'x' }, entity: 'site:01J00000000000000000000000' });
    expect(foldEdits(ENTITY, [other]).fields).toEqual({});
  });
});
