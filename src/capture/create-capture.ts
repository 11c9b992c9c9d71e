import type {
  AnalysisPort,
  CapturePort,
  CaptureProblem,
  JournalPort,
  LiveWindow,
  SessionOptions,
  SessionState,
} from '../app/ports.ts';
import type { PhoneCheck } from '../core/model/fact.ts';
import { failure, type Outcome } from '../core/model/outcome.ts';
import type { InterruptionCode } from '../core/model/recording.ts';
import { browserCaptureEnvironment, type CaptureEnvironment } from './capture-environment.ts';
import { JOURNAL_PERIOD_MS, JournalWriter } from './journal-writer.ts';
import type { SampleSource } from './sensor-source.ts';
import { SensorRun } from './sensor-run.ts';
import { nextSession, type Purpose, type Session, type SessionEvent } from './session-machine.ts';
import { isSameState, sessionState } from './session-state.ts';
import { judgeStart } from './start-judge.ts';

/*
 * Runs a session: the machine decides what follows what, this carries it out. The sensor's handler fills the buffer and
 * nothing else; ten times a second a tick looks at what came. Times of a session are the sensor's, so that the practice
 * rig can run faster than the clock on the wall.
 */

export interface CaptureOptions {
  readonly journal: JournalPort;
  readonly checkPhone: AnalysisPort['checkPhone'];
  readonly environment?: CaptureEnvironment;
}

export function createCapture({
  journal,
  checkPhone,
  environment = browserCaptureEnvironment(),
}: CaptureOptions): CapturePort {
  return new CaptureSession(journal, checkPhone, environment);
}

const TICK_MS = 100;
/** A tick this much late: the page was busy and the readings of that time are lost, ms. */
const STALL_MS = 500;
/** No running sensor after this long: there is none, ms. */
const START_PATIENCE_MS = 3000;
/** The simulated person taps again when nothing started for so long, s. */
const ACT_AGAIN_S = 30;

class CaptureSession implements CapturePort {
  readonly #journal: JournalPort;
  readonly #checkPhone: AnalysisPort['checkPhone'];
  readonly #environment: CaptureEnvironment;
  readonly #listeners = new Set<(state: SessionState) => void>();
  #session: Session = { phase: 'idle' };
  #state: SessionState = { phase: 'idle' };
  #run: SensorRun | undefined;
  #releaseRecorder: (() => void) | undefined;
  /** Raised with every opening and cancelling, so that what was awaited for an older one is dropped. */
  #openingIndex = 0;
  #answerCheck: ((outcome: Outcome<PhoneCheck> | Promise<Outcome<PhoneCheck>>) => void) | undefined;
  #lastTickMs = 0;
  #lastWriteMs = 0;
  /** Sensor time from which the simulated person may act: tap, or switch off. */
  #actAgainS = 0;

  constructor(journal: JournalPort, checkPhone: AnalysisPort['checkPhone'], environment: CaptureEnvironment) {
    this.#journal = journal;
    this.#checkPhone = checkPhone;
    this.#environment = environment;
  }

  get support(): CapturePort['support'] {
    return this.#environment.support;
  }

  get keepsScreenOn(): boolean {
    return this.#environment.keepsScreenOn;
  }

  get state(): SessionState {
    return this.#state;
  }

  subscribe(listener: (state: SessionState) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  open(options: SessionOptions): Promise<void> {
    return this.#open({ kind: 'reading', options }, options.practice);
  }

  check(practice?: string): Promise<Outcome<PhoneCheck>> {
    const outcome = new Promise<Outcome<PhoneCheck>>((resolve) => {
      this.#answer(failure('cancelled'));
      this.#answerCheck = resolve;
    });
    void this.#open({ kind: 'check' }, practice).then(() => {
      const isBusy = this.#session.phase === 'recording' || this.#session.phase === 'settling';
      if (isBusy) this.#answer(failure('cancelled', { reason: 'busy' }));
    });
    return outcome;
  }

  start(): void {
    this.#dispatch({ type: 'start-wanted' });
  }

  finish(): void {
    this.#dispatch({ type: 'finish-wanted' });
  }

  cancel(): void {
    this.#openingIndex += 1;
    this.#dispatch({ type: 'cancelled' });
  }

  live(): LiveWindow | undefined {
    const run = this.#run;
    const { phase } = this.#session;
    if (run === undefined || run.buffer.count === 0 || phase === 'asking') return undefined;
    const fromS = this.#session.phase === 'recording' ? this.#session.fromS : run.buffer.timeAt(0);
    return run.view(phase === 'ending' ? 'recording' : phase, fromS);
  }

  #dispatch(event: SessionEvent): void {
    const before = this.#session;
    this.#session = nextSession(before, event);
    if (this.#session === before) return;
    this.#carryOut(before, this.#session);
    const next = sessionState(this.#session, this.#state);
    if (isSameState(this.#state, next)) return;
    this.#state = next;
    this.#listeners.forEach((listener) => listener(next));
  }

  #carryOut(before: Session, after: Session): void {
    if (before.phase === 'recording' && after.phase === 'recording') {
      const added = after.flags.filter((code) => !before.flags.includes(code));
      added.forEach((code) => this.#run?.writer?.flag(code));
    }
    if (before.phase === after.phase) return;
    if (after.phase === 'settling') this.#actAgainS = 0;
    if (after.phase === 'recording') this.#beginRecording(after);
    if (after.phase === 'ending') void this.#handOut(before, after.reason);
    if (after.phase === 'refused') {
      this.#close();
      this.#answer(failure('no-samples', { reason: after.problem }));
    }
    if (after.phase === 'idle') {
      this.#dropJournal();
      this.#close();
      this.#answer(failure('cancelled'));
    }
  }

  async #open(purpose: Purpose, practice: string | undefined): Promise<void> {
    const before = this.#session;
    this.#dispatch({ type: 'asked', purpose });
    if (this.#session === before) return;
    this.#openingIndex += 1;
    const openingIndex = this.#openingIndex;
    const { support } = this.#environment;
    if (practice === undefined && support !== 'likely') {
      this.#refuse(support === 'none' ? 'no-sensor' : 'insecure-page');
      return;
    }
    const sources = this.#environment.sources(practice);
    // Synchronously, still inside the person's tap.
    const asked = sources[0]?.ask() ?? Promise.resolve('no-sensor' as const);
    const [release, allowed] = await Promise.all([this.#environment.takeRecorder(), asked]);
    if (openingIndex !== this.#openingIndex) {
      release?.();
      return;
    }
    this.#releaseRecorder = release;
    if (release === undefined) this.#refuse('busy-elsewhere');
    else if (allowed !== 'granted') this.#refuse(allowed);
    else this.#startSource(sources, 0);
  }

  #refuse(problem: CaptureProblem): void {
    this.#dispatch({ type: 'refused', problem });
  }

  /** Starts one source; when there turns out to be none behind it, the next. */
  #startSource(sources: readonly SampleSource[], index: number): void {
    const source = sources[index]!;
    const run = new SensorRun(source, this.#environment);
    this.#run = run;
    const onProblem = (problem: CaptureProblem): void => {
      if (this.#run !== run) return;
      if (this.#session.phase !== 'asking') {
        this.#dispatch({ type: 'interrupted', reason: reasonOf(problem) });
        return;
      }
      run.stop();
      if (problem === 'no-sensor' && sources[index + 1] !== undefined) this.#startSource(sources, index + 1);
      else this.#refuse(problem);
    };
    this.#watch(run, onProblem);
    const { buffer } = run;
    source.start({
      onSample: (stampMs, x, y, z) => buffer.push(stampMs / 1000, x, y, z),
      onProblem,
    });
  }

  #watch(run: SensorRun, onProblem: (problem: CaptureProblem) => void): void {
    const environment = this.#environment;
    this.#lastTickMs = environment.nowMs();
    run.stops.push(
      () => run.source.stop(),
      environment.every(TICK_MS, () => this.#tick(run, onProblem)),
      environment.watchPage((reason) => this.#dispatch({ type: 'interrupted', reason })),
      environment.watchPermission(() => onProblem('not-allowed')),
      environment.holdScreen(() => this.#dispatch({ type: 'flagged', code: 'wake-lock-lost' })),
    );
  }

  #tick(run: SensorRun, onProblem: (problem: CaptureProblem) => void): void {
    const nowMs = this.#environment.nowMs();
    const isStalled = nowMs - this.#lastTickMs > TICK_MS + STALL_MS;
    this.#lastTickMs = nowMs;
    if (this.#session.phase === 'asking') {
      this.#tickAsking(run, nowMs, onProblem);
      return;
    }
    const { hasLongGap, isSilent } = run.lookForLosses(nowMs, isStalled);
    if (isStalled) this.#dispatch({ type: 'flagged', code: 'main-thread-stall' });
    if (hasLongGap) this.#dispatch({ type: 'flagged', code: 'long-gap' });
    if (isSilent) {
      const isRecording = this.#session.phase === 'recording';
      this.#dispatch({ type: 'interrupted', reason: isRecording ? 'long-gap' : 'sensor-error' });
      return;
    }
    this.#advance(run);
    this.#writeJournal(run, nowMs);
  }

  #tickAsking(run: SensorRun, nowMs: number, onProblem: (problem: CaptureProblem) => void): void {
    const verdict = judgeStart(run.buffer);
    if (verdict === 'running') {
      run.lookForLosses(nowMs, true);
      this.#dispatch({ type: 'running', atS: run.newestS });
    } else if (verdict !== undefined) onProblem(verdict);
    else if (nowMs - run.startedMs > START_PATIENCE_MS) onProblem('no-sensor');
  }

  #advance(run: SensorRun): void {
    do {
      run.observed = run.observer.advance();
      const { isSettled, tapCount, tapAtS } = run.observed;
      const session = this.#session;
      const nowS = run.observer.seenS;
      const isNewTap = session.phase === 'settling' && tapAtS !== undefined && tapAtS > session.nowS;
      const newTapAtS = isNewTap ? tapAtS : undefined;
      this.#dispatch({ type: 'advanced', nowS, isSettled, tapCount, tapAtS: newTapAtS });
      this.#actIfDue(run, nowS, isSettled);
    } while (run.observer.isBehind && this.#run === run && this.#session.phase !== 'ending');
    if (this.#session.phase === 'settling') run.trim();
  }

  /** With a start by tap the simulated person taps at rest, and again when that did not start anything. */
  #actIfDue(run: SensorRun, nowS: number, isSettled: boolean): void {
    const session = this.#session;
    if (session.phase !== 'settling' || session.options.startBy !== 'first-tap') return;
    if (isSettled && nowS >= this.#actAgainS) this.#act(run, nowS);
  }

  #act(run: SensorRun, nowS: number): void {
    this.#actAgainS = nowS + ACT_AGAIN_S;
    run.source.act?.();
  }

  #writeJournal(run: SensorRun, nowMs: number): void {
    if (run.writer === undefined || nowMs - this.#lastWriteMs < JOURNAL_PERIOD_MS) return;
    this.#lastWriteMs = nowMs;
    run.writer.write();
  }

  #beginRecording({ fromS, tapCount, options }: Extract<Session, { phase: 'recording' }>): void {
    const run = this.#run;
    if (run === undefined) return;
    const first = run.beginRecording(fromS, this.#environment.wallMs(), tapCount);
    this.#lastWriteMs = this.#environment.nowMs();
    run.writer = new JournalWriter(this.#journal, run.buffer, first, run.meta(), () =>
      this.#dispatch({ type: 'flagged', code: 'storage-failed' }),
    );
    if (options.startBy !== 'first-tap' || this.#actAgainS === 0) this.#act(run, run.newestS);
  }

  async #handOut(before: Session, reason: InterruptionCode | undefined): Promise<void> {
    const run = this.#run;
    if (run === undefined) return;
    run.stop();
    if (before.phase === 'checking') {
      await this.#handOutCheck(run, reason);
      return;
    }
    const isRecorded = before.phase === 'recording';
    const untilS = isRecorded ? before.fromS + before.options.durationS : 0;
    const recording = isRecorded ? run.recording(untilS, reason ?? before.flags[0]) : undefined;
    run.writer?.write();
    if (reason !== undefined) run.writer?.flag(reason);
    const journalId = (await run.writer?.ended()) ?? '';
    if (this.#run !== run) return;
    this.#close();
    this.#dispatch({ type: 'kept', recording, journalId });
  }

  async #handOutCheck(run: SensorRun, reason: InterruptionCode | undefined): Promise<void> {
    const recording = run.recording(Infinity, reason);
    const checkedAt = new Date(this.#environment.wallMs()).toISOString();
    const outcome: Promise<Outcome<PhoneCheck>> =
      reason === undefined && recording !== undefined
        ? this.#checkPhone(recording, checkedAt)
        : Promise.resolve(failure('cancelled', { reason: reason ?? 'no-samples' }));
    this.#answer(outcome);
    await outcome.catch(() => {
      // Whoever asked for the check hears of it.
    });
    if (this.#run === run) this.#dispatch({ type: 'cancelled' });
  }

  #answer(outcome: Outcome<PhoneCheck> | Promise<Outcome<PhoneCheck>>): void {
    this.#answerCheck?.(outcome);
    this.#answerCheck = undefined;
  }

  /** The person does not want what was recorded. */
  #dropJournal(): void {
    const ended = this.#run?.writer?.ended();
    void ended
      ?.then((id) => (id === '' ? undefined : this.#journal.dropJournal(id)))
      .catch(() => {
        // It stays, and the next start offers it.
      });
  }

  #close(): void {
    this.#run?.stop();
    this.#run = undefined;
    this.#releaseRecorder?.();
    this.#releaseRecorder = undefined;
  }
}

function reasonOf(problem: CaptureProblem): InterruptionCode {
  return problem === 'not-allowed' || problem === 'blocked-by-policy'
    ? 'permission-withdrawn'
    : 'sensor-error';
}
