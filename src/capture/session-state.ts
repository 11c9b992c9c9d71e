import type { SessionState } from '../app/ports.ts';
import type { Session } from './session-machine.ts';

/** What the app is told of a session. `before` stands while the samples are handed out. */
export function sessionState(session: Session, before: SessionState): SessionState {
  switch (session.phase) {
    case 'asking':
      return { phase: 'asking' };
    case 'checking':
      return { phase: 'checking', secondsLeftS: Math.ceil(session.untilS - session.nowS) };
    case 'settling':
      return { phase: 'settling', settled: session.isSettled, startBy: session.options.startBy };
    case 'recording': {
      const { options, fromS, nowS, tapCount, flags } = session;
      const secondsLeftS = Math.ceil(options.durationS - (nowS - fromS));
      return { phase: 'recording', durationS: options.durationS, secondsLeftS, tapCount, flags };
    }
    case 'ending':
      return before;
    default:
      return session;
  }
}

/** Whether two states look the same to the person: then nobody is told. */
export function isSameState(a: SessionState, b: SessionState): boolean {
  if (a === b) return true;
  if (a.phase !== b.phase || a.phase === 'done' || a.phase === 'cut') return false;
  const keys = Object.keys(a) as (keyof typeof a)[];
  return keys.every((key) => a[key] === (b as typeof a)[key]);
}
