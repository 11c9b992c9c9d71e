import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import type { SessionOptions } from '../../src/app/ports.ts';
import { nextSession, type Session, type SessionEvent } from '../../src/capture/session-machine.ts';
import { isSameState, sessionState } from '../../src/capture/session-state.ts';
import { INTERRUPTION_CODES } from '../../src/core/model/recording.ts';
import { sampleRecording } from '../support/reading-draft.ts';

const options: fc.Arbitrary<SessionOptions> = fc.record({
  durationS: fc.integer({ min: 1, max: 60 }),
  startBy: fc.constantFrom('hand' as const, 'timer' as const, 'first-tap' as const),
  timerS: fc.integer({ min: 0, max: 10 }),
});
const code = fc.constantFrom(...INTERRUPTION_CODES);
const timeS = fc.double({ min: 0, max: 120, noNaN: true });
const event: fc.Arbitrary<SessionEvent> = fc.oneof(
  fc.record({
    type: fc.constant('asked' as const),
    purpose: fc.oneof(
      fc.record({ kind: fc.constant('reading' as const), options }),
      fc.constant({ kind: 'check' as const }),
    ),
  }),
  fc.record({
    type: fc.constant('refused' as const),
    problem: fc.constantFrom('no-sensor' as const, 'not-allowed' as const),
  }),
  fc.record({ type: fc.constant('running' as const), atS: timeS }),
  fc.record({
    type: fc.constant('advanced' as const),
    nowS: timeS,
    isSettled: fc.boolean(),
    tapCount: fc.nat(5),
    tapAtS: fc.option(timeS, { nil: undefined }),
  }),
  fc.constant({ type: 'start-wanted' as const }),
  fc.constant({ type: 'finish-wanted' as const }),
  fc.record({ type: fc.constant('interrupted' as const), reason: code }),
  fc.record({ type: fc.constant('flagged' as const), code }),
  fc.record({
    type: fc.constant('kept' as const),
    recording: fc.option(fc.constant(sampleRecording(3)), { nil: undefined }),
    journalId: fc.constantFrom('', 'J'),
  }),
  fc.constant({ type: 'cancelled' as const }),
);

const run = (events: readonly SessionEvent[]): Session[] => {
  let session: Session = { phase: 'idle' };
  return events.map((one) => (session = nextSession(session, one)));
};

/** Phases that may follow each other; anything else is an impossible session. */
const FOLLOWERS: Record<Session['phase'], readonly Session['phase'][]> = {
  idle: ['asking'],
  asking: ['refused', 'checking', 'settling', 'ending'],
  refused: ['asking'],
  checking: ['ending'],
  settling: ['recording', 'refused', 'ending'],
  recording: ['ending'],
  ending: ['done', 'cut'],
  done: ['asking'],
  cut: ['asking'],
};

describe('nextSession', () => {
  it('knows no impossible step, whatever comes in whatever order (property)', () => {
    fc.assert(
      fc.property(fc.array(event, { maxLength: 60 }), (events) => {
        let before: Session = { phase: 'idle' };
        for (const after of run(events)) {
          if (after.phase !== before.phase && after.phase !== 'idle') {
            expect(FOLLOWERS[before.phase]).toContain(after.phase);
          }
          checkInvariants(before, after);
          before = after;
        }
      }),
      { numRuns: 1000 },
    );
  });

  it('comes to rest from anywhere on cancel (property)', () => {
    fc.assert(
      fc.property(fc.array(event, { maxLength: 30 }), (events) => {
        expect(run([...events, { type: 'cancelled' }]).at(-1)).toEqual({ phase: 'idle' });
      }),
    );
  });

  it('tells the app of each phase but the hand-over, which looks like what was before (property)', () => {
    fc.assert(
      fc.property(fc.array(event, { maxLength: 30 }), (events) => {
        let state = sessionState({ phase: 'idle' }, { phase: 'idle' });
        for (const session of run(events)) {
          const next = sessionState(session, state);
          if (session.phase === 'ending') expect(isSameState(next, state)).toBe(true);
          else expect(next.phase).toBe(session.phase);
          if ('secondsLeftS' in next) expect(next.secondsLeftS).toBeGreaterThanOrEqual(0);
          state = next;
        }
      }),
      { numRuns: 300 },
    );
  });
});

function checkInvariants(before: Session, after: Session): void {
  if (after.phase === 'done') expect(after.recording.timeS.length).toBeGreaterThan(0);
  if (after.phase === 'recording') {
    expect(after.nowS).toBeGreaterThanOrEqual(after.fromS);
    expect(after.nowS - after.fromS).toBeLessThan(Math.max(after.options.durationS, 1.000001) + 120);
    expect(new Set(after.flags).size).toBe(after.flags.length);
  }
  if (before.phase === 'recording' && after.phase === 'recording') {
    expect(after.flags.slice(0, before.flags.length)).toEqual(before.flags);
    expect(after.tapCount).toBeGreaterThanOrEqual(before.tapCount);
    expect(after.nowS).toBeGreaterThanOrEqual(before.nowS);
  }
}
