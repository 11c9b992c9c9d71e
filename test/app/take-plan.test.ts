import { describe, expect, it } from 'vitest';
import { planTake, replan, sessionOptions } from '../../src/app/take-plan.ts';

const nowhere = { names: {} };

describe('the plan of a reading', () => {
  it('needs nothing filled in', () => {
    const plan = planTake('tap', nowhere, 'laid');
    expect(plan.circumstances).toEqual({
      mounting: 'laid',
      surface: 'unknown',
      excitation: 'knuckle',
      machineState: 'none',
      peopleOnIt: 'unknown',
    });
    expect(sessionOptions(plan)).toEqual({ durationS: 30, startBy: 'first-tap' });
  });

  it('takes the kind from a known spot', () => {
    const plan = planTake('tap', { names: {}, place: { kind: 'machine-base' } }, 'magnet');
    expect(plan.circumstances).toMatchObject({ surface: 'plate', machineState: 'off', mounting: 'magnet' });
  });

  it('changes what follows from another procedure, and keeps what the person chose', () => {
    const first = planTake('tap', nowhere, 'strapped', '?rig=pump');
    const chosen = { ...first, circumstances: { ...first.circumstances, peopleOnIt: 'people' as const } };
    const plan = replan(chosen, { procedure: 'running', spotKind: 'pipe' });
    expect(plan.circumstances).toMatchObject({
      mounting: 'strapped',
      peopleOnIt: 'people',
      excitation: 'machine',
      machineState: 'running',
      surface: 'tube',
    });
    expect(sessionOptions(plan)).toEqual({
      durationS: 45,
      startBy: 'timer',
      timerS: 3,
      practice: '?rig=pump',
    });
  });

  it('keeps a chosen time while the procedure stays', () => {
    const plan = { ...planTake('ambient', nowhere, 'laid'), durationS: 600 };
    expect(replan(plan, { spotKind: 'floor' }).durationS).toBe(600);
    expect(replan(plan, { procedure: 'tap' }).durationS).toBe(30);
  });
});
