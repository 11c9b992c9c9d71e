/**
 * From a laid phone to a kept reading. Phases are a tagged union, so that impossible screens cannot be written;
 * nothing is ever lost silently: a recording stays in the journal until its reading is kept or the person drops it.
 */
import type { AnalysisSettings, Procedure } from '../core/model/analysis.ts';
import type { ReadingFact } from '../core/model/fact.ts';
import type { Problem } from '../core/model/problem.ts';
import type { InterruptionCode, Recording } from '../core/model/recording.ts';
import { live, type Live } from './live-state.ts';
import { lastCheck } from './phone.ts';
import type { AnalysisPort, CapturePort, RecoveredJournal, SessionState, StorePort } from './ports.ts';
import type { Rounds } from './rounds.ts';
import { sessionOptions, type TakePlan } from './take-plan.ts';

type CaptureState = Exclude<SessionState, { phase: 'idle' | 'done' | 'cut' }>;

export type TakeState =
  | { readonly phase: 'prepare' }
  | { readonly phase: 'capture'; readonly session: CaptureState }
  | {
      readonly phase: 'cut';
      readonly reason: InterruptionCode;
      readonly recording: Recording | undefined;
      readonly journalId: string;
    }
  | { readonly phase: 'analysing' }
  | { readonly phase: 'failed'; readonly problem: Problem; readonly journalId: string | undefined }
  | { readonly phase: 'unsaved'; readonly detail: string; readonly retry: () => void }
  | { readonly phase: 'kept'; readonly id: string };

export interface TakeFlow {
  readonly state: Live<TakeState>;
  readonly plan: Live<TakePlan>;
  /** Asks for permission: call it synchronously inside a tap. */
  begin(): void;
  start(): void;
  finish(): void;
  cancel(): void;
  /** Goes on with what a cut recording left. */
  useCut(): void;
  /** Back to the plan; a cut recording that is not wanted is dropped. */
  reset(): void;
  /** A recording that came as a file, with the present plan's procedure left to the data. */
  takeFile(recording: Recording, name: string): Promise<void>;
  recover(journal: RecoveredJournal): Promise<void>;
}

export interface TakeParts {
  readonly capture: CapturePort;
  readonly analysis: AnalysisPort;
  readonly store: StorePort;
  readonly rounds: Rounds;
  readonly plan: TakePlan;
  readonly about: { readonly version: string; readonly commit: string };
  readonly environment: { now(): Date; readonly timeZone: string; readonly userAgent: string };
  onKept(reading: ReadingFact): void;
}

/** Shorter than this a cut recording holds nothing to analyse, s. */
const LEAST_CUT_S = 2;

export function createTakeFlow(parts: TakeParts): TakeFlow {
  const state = live<TakeState>({ phase: 'prepare' });
  const plan = live(parts.plan);
  let abort: AbortController | undefined;
  /** Journal of the recording that is being worked out. */
  let inHand: string | undefined;
  const drop = (journalId: string | undefined) => {
    if (journalId) void parts.store.dropJournal(journalId);
  };

  async function analyseAndKeep(recording: Recording, journalId?: string, label?: string): Promise<void> {
    abort = new AbortController();
    inHand = journalId;
    const { signal } = abort;
    state.set({ phase: 'analysing' });
    const isFile = recording.sensor.source === 'file';
    const settings: AnalysisSettings = { procedure: isFile ? 'auto' : plan.get().procedure, timing: 'auto' };
    const outcome = await parts.analysis.analyse(recording, settings, signal);
    if (signal.aborted) return;
    if (!outcome.ok) return state.set({ phase: 'failed', problem: outcome.problem, journalId });
    const keep = async () => {
      try {
        const draft = await readingDraft(parts, plan.get(), recording, outcome.value.analysis);
        const options = { ...(label ? { label } : {}), ...(journalId ? { journalId } : {}) };
        const reading = await parts.store.saveReading(draft, recording, options);
        state.set({ phase: 'kept', id: reading._id });
        parts.onKept(reading);
      } catch (error) {
        const detail = error instanceof Error ? error.message : String(error);
        state.set({ phase: 'unsaved', detail, retry: () => void keep() });
      }
    };
    await keep();
  }

  parts.capture.subscribe((session) => {
    if (session.phase === 'done') void analyseAndKeep(session.recording, session.journalId);
    else if (session.phase === 'cut') state.set(session);
    else if (session.phase !== 'idle') state.set({ phase: 'capture', session });
  });

  return {
    state,
    plan,
    begin() {
      parts.capture.open(sessionOptions(plan.get())).catch(() => undefined);
    },
    start: () => parts.capture.start(),
    finish: () => parts.capture.finish(),
    cancel() {
      const left = state.get();
      abort?.abort();
      parts.capture.cancel();
      if (left.phase === 'analysing') drop(inHand);
      if (left.phase === 'failed' || left.phase === 'cut') drop(left.journalId);
      state.set({ phase: 'prepare' });
    },
    useCut() {
      const cut = state.get();
      if (cut.phase === 'cut' && cut.recording) void analyseAndKeep(cut.recording, cut.journalId);
    },
    reset() {
      const left = state.get();
      if (left.phase === 'cut' || left.phase === 'failed') drop(left.journalId);
      state.set({ phase: 'prepare' });
    },
    takeFile: (recording, name) => analyseAndKeep(recording, undefined, name),
    async recover(journal) {
      await analyseAndKeep(await parts.store.recover(journal.journalId), journal.journalId);
    },
  };
}

export const isWorthUsing = (recording: Recording | undefined): boolean => {
  const last = recording?.timeS.at(-1);
  const first = recording?.timeS[0];
  return last !== undefined && first !== undefined && last - first >= LEAST_CUT_S;
};

type Draft = Parameters<StorePort['saveReading']>[0];

async function readingDraft(
  parts: TakeParts,
  plan: TakePlan,
  recording: Recording,
  analysis: Draft['analysis'],
): Promise<Draft> {
  const { environment, store } = parts;
  const now = environment.now();
  const isFile = recording.sensor.source === 'file';
  const { spot, asset, site } = plan.where;
  const round = isFile ? undefined : await parts.rounds.forNewReading(now, site);
  const check = await lastCheck(store);
  const procedure: Procedure = analysis.procedure;
  return {
    recordedAt: recording.startedAt ?? now.toISOString(),
    timeZone: environment.timeZone,
    procedure,
    practice: recording.sensor.practice,
    ...(spot ? { spot } : {}),
    ...(asset ? { asset } : {}),
    ...(site ? { site } : {}),
    ...(round ? { round } : {}),
    circumstances: isFile ? UNKNOWN_CIRCUMSTANCES : plan.circumstances,
    phone: {
      device: store.device,
      userAgent: environment.userAgent,
      ...(check && !isFile ? { check } : {}),
    },
    sensor: recording.sensor,
    analysis,
    app: parts.about,
  };
}

const UNKNOWN_CIRCUMSTANCES: Draft['circumstances'] = {
  mounting: 'unknown',
  surface: 'unknown',
  excitation: 'unknown',
  machineState: 'unknown',
  peopleOnIt: 'unknown',
};
