/** Sensor open: settle, tap, record. Phases are announced; everything that moves is drawn without layout. */
import { useEffect, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { LiveWindow, SessionState } from '../../../app/ports.ts';
import { formatAcceleration } from '../../../text/quantity.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { Page } from '../../components/page.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { Tally } from '../../components/tally.tsx';
import { useLive } from '../../use-live.ts';
import { LiveTrace } from './live-trace.tsx';
import { SettleMark } from './settle-mark.tsx';

const text = screenText.take;

/** Below this many taps the finish button does not yet say "enough"; estimators want at least three. */
const ENOUGH_TAPS = 3;

/** Phones dim their screen after about this long without a touch, s. */
const SHORT_S = 30;

type Session = Exclude<SessionState, { phase: 'idle' | 'done' | 'cut' | 'refused' }>;

export function CaptureStep(props: {
  readonly app: App;
  readonly session: Session;
  readonly onLeave: () => void;
}) {
  const { app, session } = props;
  const plan = useLive(app.take.plan);
  const live = useSlowLive(() => app.capture.live());
  const isTap = plan.procedure === 'tap';
  const [isLeaving, setIsLeaving] = useState(false);
  const leave = () => (session.phase === 'recording' ? setIsLeaving(true) : props.onLeave());
  const title = phaseTitle(session, plan.procedure);
  return (
    <Page title={<span aria-live="polite">{title}</span>} back={{ label: text.leave, onClick: leave }}>
      {session.phase === 'asking' && <p class="quiet">{text.askingNote}</p>}
      {session.phase !== 'asking' && (
        <LiveTrace live={() => app.capture.live()} label={traceSentence(live)} />
      )}
      {session.phase === 'settling' && (
        <>
          <SettleMark settled={session.settled} />
          <p class="quiet">{session.settled ? text.settledNote[plan.procedure] : text.settlingNote}</p>
        </>
      )}
      {session.phase === 'recording' && (
        <>
          {isTap && (
            <div class="row">
              <span class="figure" aria-hidden="true">
                {session.tapCount}
              </span>
              <Tally count={session.tapCount} label={text.taps(session.tapCount)} />
            </div>
          )}
          {isTap && <p aria-live="polite">{text.tapsOf(session.tapCount)}</p>}
          <TimeLeft session={session} />
          {!app.capture.keepsScreenOn && plan.durationS > SHORT_S && <p class="note">{text.screenMayDim}</p>}
        </>
      )}
      <p role="status" aria-live="polite">
        {live?.hint ? text.hints[live.hint] : ''}
      </p>
      {isLeaving && (
        <Dialog
          title={text.leaveTitle}
          onClose={() => setIsLeaving(false)}
          actions={
            <>
              <Button kind="grave" onClick={props.onLeave}>
                {text.leaveDrop}
              </Button>
              <Button kind="main" onClick={() => setIsLeaving(false)}>
                {text.leaveStay}
              </Button>
            </>
          }
        >
          <p>{text.leaveNote}</p>
        </Dialog>
      )}
      <BottomBar>
        {session.phase === 'settling' && <Button onClick={() => app.take.start()}>{text.startNow}</Button>}
        {session.phase === 'recording' ? (
          <Button
            kind={!isTap || session.tapCount >= ENOUGH_TAPS ? 'main' : 'plain'}
            onClick={() => app.take.finish()}
          >
            {isTap && session.tapCount >= ENOUGH_TAPS ? text.finishEnough : text.finish}
          </Button>
        ) : (
          <Button onClick={props.onLeave}>{screenText.common.cancel}</Button>
        )}
      </BottomBar>
    </Page>
  );
}

function TimeLeft({ session }: { readonly session: Session & { phase: 'recording' } }) {
  const secondsLeft = Math.ceil(session.secondsLeftS);
  return (
    <div class="stack stack-tight">
      <ProgressLine label={text.duration} share={1 - session.secondsLeftS / session.durationS} />
      <p class="note">{text.left(secondsLeft)}</p>
    </div>
  );
}

function phaseTitle(session: Session, procedure: keyof typeof text.recording): string {
  switch (session.phase) {
    case 'asking':
      return text.asking;
    case 'checking':
      return text.settling;
    case 'settling':
      if (!session.settled) return text.settling;
      return procedure === 'tap' ? text.settled : text.settledOther;
    case 'recording':
      return text.recording[procedure];
  }
}

function traceSentence(live: LiveFigures | undefined): string {
  if (!live) return text.trace;
  return `${text.trace}. ${text.traceSentence(formatAcceleration(live.levelMps2), live.tapCount)}`;
}

interface LiveFigures {
  readonly levelMps2: number;
  readonly tapCount: number;
  readonly hint?: LiveWindow['hint'];
}

/** Figures for words, twice a second: the picture has its own beat. */
function useSlowLive(read: () => LiveWindow | undefined): LiveFigures | undefined {
  const [figures, setFigures] = useState<LiveFigures>();
  useEffect(() => {
    const timer = setInterval(() => {
      const now = read();
      if (now) setFigures({ levelMps2: now.levelMps2, tapCount: now.tapCount, hint: now.hint });
    }, 500);
    return () => clearInterval(timer);
  }, []);
  return figures;
}
