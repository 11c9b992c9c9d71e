import type { CaptureProblem, SessionOptions } from '../app/ports.ts';
import type { InterruptionCode, Recording } from '../core/model/recording.ts';

/*
 * What a session can be, and what follows what. Pure and total: an event that makes no sense in a phase changes
 * nothing. Each phase holds only what exists in it, so an impossible session cannot be written down.
 * Times are the sensor's, s since its first sample.
 */

export type Session =
  | { readonly phase: 'idle' }
  | { readonly phase: 'asking'; readonly purpose: Purpose }
  | { readonly phase: 'refused'; readonly problem: CaptureProblem }
  | { readonly phase: 'checking'; readonly untilS: number; readonly nowS: number }
  | {
      readonly phase: 'settling';
      readonly options: SessionOptions;
      readonly sinceS: number;
      readonly nowS: number;
      readonly isSettled: boolean;
    }
  | {
      readonly phase: 'recording';
      readonly options: SessionOptions;
      readonly fromS: number;
      readonly nowS: number;
      readonly tapCount: number;
      readonly flags: readonly InterruptionCode[];
    }
  /** Over; the samples are about to be handed out. */
  | { readonly phase: 'ending'; readonly reason: InterruptionCode | undefined }
  | { readonly phase: 'done'; readonly recording: Recording; readonly journalId: string }
  | {
      readonly phase: 'cut';
      readonly reason: InterruptionCode;
      readonly recording: Recording | undefined;
      readonly journalId: string;
    };

export type Purpose =
  { readonly kind: 'reading'; readonly options: SessionOptions } | { readonly kind: 'check' };

export type SessionEvent =
  | { readonly type: 'asked'; readonly purpose: Purpose }
  | { readonly type: 'refused'; readonly problem: CaptureProblem }
  | { readonly type: 'running'; readonly atS: number }
  | {
      readonly type: 'advanced';
      readonly nowS: number;
      readonly isSettled: boolean;
      readonly tapCount: number;
      /** Time of the newest tap seen, if any. */
      readonly tapAtS: number | undefined;
    }
  | { readonly type: 'start-wanted' }
  | { readonly type: 'finish-wanted' }
  | { readonly type: 'interrupted'; readonly reason: InterruptionCode }
  | { readonly type: 'flagged'; readonly code: InterruptionCode }
  | { readonly type: 'kept'; readonly recording: Recording | undefined; readonly journalId: string }
  | { readonly type: 'cancelled' };

/** Rest before the first tap that goes into the recording, s: the fit wants some of the quiet. */
export const PRE_TAP_S = 1;
/** Length of a check of the phone, s. */
export const CHECK_S = 10;
/** Wait of a start by timer when none is given, s. */
export const TIMER_S = 5;

export function nextSession(session: Session, event: SessionEvent): Session {
  if (event.type === 'cancelled') return { phase: 'idle' };
  switch (session.phase) {
    case 'idle':
    case 'refused':
    case 'done':
    case 'cut':
      return event.type === 'asked' ? { phase: 'asking', purpose: event.purpose } : session;
    case 'asking':
      return fromAsking(session, event);
    case 'checking':
      return fromChecking(session, event);
    case 'settling':
      return fromSettling(session, event);
    case 'recording':
      return fromRecording(session, event);
    case 'ending':
      return event.type === 'kept' ? handedOut(session.reason, event) : session;
  }
}

type In<P extends Session['phase']> = Extract<Session, { phase: P }>;

function fromAsking(session: In<'asking'>, event: SessionEvent): Session {
  if (event.type === 'refused') return { phase: 'refused', problem: event.problem };
  if (event.type === 'interrupted') return ending(event.reason);
  if (event.type !== 'running') return session;
  const { purpose } = session;
  if (purpose.kind === 'check') {
    return { phase: 'checking', untilS: event.atS + CHECK_S, nowS: event.atS };
  }
  const { options } = purpose;
  return { phase: 'settling', options, sinceS: event.atS, nowS: event.atS, isSettled: false };
}

function fromChecking(session: In<'checking'>, event: SessionEvent): Session {
  if (event.type === 'interrupted') return ending(event.reason);
  if (event.type !== 'advanced') return session;
  const nowS = Math.max(session.nowS, event.nowS);
  return nowS >= session.untilS ? ending(undefined) : { ...session, nowS };
}

function fromSettling(session: In<'settling'>, event: SessionEvent): Session {
  switch (event.type) {
    case 'interrupted':
      return beforeRecording(event.reason);
    case 'start-wanted':
      return recordingFrom(session, session.nowS, 0);
    case 'advanced': {
      const nowS = Math.max(session.nowS, event.nowS);
      const next = { ...session, nowS, isSettled: event.isSettled };
      return startedBy(session, next, event) ?? next;
    }
    default:
      return session;
  }
}

/** Nothing has been recorded yet: the sensor is refused, or the session is cut without samples. */
function beforeRecording(reason: InterruptionCode): Session {
  if (reason === 'sensor-error') return { phase: 'refused', problem: 'sensor-error' };
  if (reason === 'permission-withdrawn') return { phase: 'refused', problem: 'not-allowed' };
  return ending(reason);
}

/** The recording that an advance starts by itself: the timer ran out at rest, or the first tap came after rest. */
function startedBy(
  before: In<'settling'>,
  now: In<'settling'>,
  event: Extract<SessionEvent, { type: 'advanced' }>,
): Session | undefined {
  const { startBy, timerS = TIMER_S } = now.options;
  if (startBy === 'timer' && now.isSettled && now.nowS - now.sinceS >= timerS) {
    return recordingFrom(now, now.nowS, 0);
  }
  if (startBy === 'first-tap' && before.isSettled && event.tapAtS !== undefined) {
    return recordingFrom(now, Math.max(now.sinceS, event.tapAtS - PRE_TAP_S), 1);
  }
  return undefined;
}

function recordingFrom(session: In<'settling'>, fromS: number, tapCount: number): Session {
  return {
    phase: 'recording',
    options: session.options,
    fromS,
    nowS: Math.max(fromS, session.nowS),
    tapCount,
    flags: [],
  };
}

function fromRecording(session: In<'recording'>, event: SessionEvent): Session {
  switch (event.type) {
    case 'advanced': {
      const nowS = Math.max(session.nowS, event.nowS);
      if (nowS - session.fromS >= session.options.durationS) return ending(undefined);
      return { ...session, nowS, tapCount: Math.max(session.tapCount, event.tapCount) };
    }
    case 'flagged':
      return session.flags.includes(event.code)
        ? session
        : { ...session, flags: [...session.flags, event.code] };
    case 'finish-wanted':
      return ending(undefined);
    case 'interrupted':
      return ending(event.reason);
    default:
      return session;
  }
}

const ending = (reason: InterruptionCode | undefined): Session => ({ phase: 'ending', reason });

function handedOut(
  reason: InterruptionCode | undefined,
  { recording, journalId }: Extract<SessionEvent, { type: 'kept' }>,
): Session {
  if (reason === undefined && recording !== undefined) return { phase: 'done', recording, journalId };
  return { phase: 'cut', reason: reason ?? 'sensor-error', recording, journalId };
}
