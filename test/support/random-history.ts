import fc from 'fast-check';
import type { EditFact } from '../../src/core/model/fact.ts';
import { currentEdits } from '../../src/core/packet/fold-edits.ts';
import { ulid } from '../../src/core/packet/ulid.ts';

const DEVICES = ['device:A', 'device:B', 'device:C'] as const;
export const ENTITY = 'spot:01J00000000000000000000000';

/** One thing that happens on a device: it edits a field, or gets what another device knows. */
type Happening =
  | {
      readonly type: 'edit';
      readonly device: number;
      readonly field: string;
      readonly value: number;
      readonly clock: number;
    }
  | { readonly type: 'sync'; readonly device: number; readonly from: number };

const device = fc.nat(DEVICES.length - 1);
const happening: fc.Arbitrary<Happening> = fc.oneof(
  fc.record({
    type: fc.constant('edit' as const),
    device,
    field: fc.constantFrom('name', 'notes', 'trashed'),
    value: fc.nat(3),
    // Clocks of phones are wrong by hours.
    clock: fc.integer({ min: 0, max: 1_000_000 }),
  }),
  fc.record({ type: fc.constant('sync' as const), device, from: device }),
);

/** Edits of one entity by three devices that write and exchange in any order, with wrong clocks. */
export const histories: fc.Arbitrary<readonly EditFact[]> = fc
  .array(happening, { minLength: 1, maxLength: 25 })
  .map((happenings) => {
    const known = DEVICES.map(() => new Map<string, EditFact>());
    happenings.forEach((one, index) => {
      const here = known[one.device]!;
      if (one.type === 'sync') {
        for (const edit of known[one.from]!.values()) here.set(edit._id, edit);
        return;
      }
      const edit: EditFact = {
        _id: `edit:${ulid(index, new Uint8Array(10).fill(index))}`,
        v: 1,
        kind: 'edit',
        entity: ENTITY,
        set: { [one.field]: one.value },
        over: { [one.field]: currentEdits(ENTITY, one.field, here.values()) },
        device: DEVICES[one.device]!,
        at: new Date(Date.UTC(2026, 0, 1) + one.clock * 1000).toISOString(),
      };
      here.set(edit._id, edit);
    });
    return [...new Map(known.flatMap((edits) => [...edits])).values()];
  })
  .filter((edits) => edits.length > 0);
