import { describe, expect, it } from 'vitest';
import { unseenCautions, withSeen } from '../../src/app/cautions.ts';
import { planTake } from '../../src/app/take-plan.ts';

const atPump = planTake('tap', { names: {}, place: { kind: 'machine-base' } }, 'laid');

describe('cautions before a recording', () => {
  it('stand once a day', () => {
    const first = unseenCautions(atPump, [], '2026-05-04');
    expect(first).toContain('isolate-and-lock-out');
    const seen = withSeen([], first, '2026-05-04');
    expect(unseenCautions(atPump, seen, '2026-05-04')).toEqual([]);
    expect(unseenCautions(atPump, seen, '2026-05-05')).toEqual(first);
  });

  it('forget the marks of other days', () => {
    expect(withSeen(['heights@2026-05-03'], ['live-parts'], '2026-05-04')).toEqual(['live-parts@2026-05-04']);
  });
});
