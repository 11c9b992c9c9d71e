/** The app without a screen: ports in, use cases out. Screens call these and nothing else; main.tsx plugs in the edges, tests plug in fakes. */
import type { Procedure } from '../core/model/analysis.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { Problem } from '../core/model/problem.ts';
import type { Recording } from '../core/model/recording.ts';
import { screenText } from '../text/screens.ts';
import { createHandOver, type HandOver } from './hand-over.ts';
import { live, type Live } from './live-state.ts';
import type { Navigation } from './navigation.ts';
import { createNotices, type Notices } from './notices.ts';
import { createPhone, type Phone } from './phone.ts';
import { createPlaces, type PlaceIds, type Places } from './places.ts';
import type { AnalysisPort, CapturePort, ExchangePort, StorePort, TeamStorePort } from './ports.ts';
import { createReadings, type Readings } from './readings.ts';
import { createRounds, type Rounds } from './rounds.ts';
import { openSettings, type SettingsHolder } from './settings.ts';
import { createSources, type Sources } from './sources.ts';
import { createTakeFlow, type TakeFlow } from './take-flow.ts';
import { planTake, replan } from './take-plan.ts';
import type { TeamStore } from './team-store.ts';
import type { UpdatePort } from './update-port.ts';

export interface About {
  readonly version: string;
  readonly commit: string;
  readonly analysisVersion: number;
}

export interface App {
  readonly about: About;
  readonly settings: SettingsHolder;
  readonly notices: Notices;
  readonly navigation: Navigation;
  readonly readings: Readings;
  readonly places: Places;
  readonly sources: Sources;
  readonly rounds: Rounds;
  readonly phone: Phone;
  readonly take: Take;
  readonly handOver: HandOver;
  /** Loaded when its section is first seen; asks no server by itself. */
  readonly teamStore: () => Promise<TeamStore>;
  /** Readings picked in a list to be handed over; empty means all. */
  readonly selection: Live<readonly string[]>;
  /** Where the last spot was named: what the next one most likely lies on. */
  readonly lastPlace: Live<PlaceIds>;
  /** Kept on this phone, shown under This phone; nothing leaves it. */
  noteError(error: unknown): void;
  today(): string;
  readonly update: UpdatePort;
  readonly store: StorePort;
  readonly capture: CapturePort;
}

export interface Take extends TakeFlow {
  /** Opens the Take screen for a spot, or for none. */
  prepare(where: PlaceIds, procedure?: Procedure): Promise<void>;
  /** Names the spot of what is about to be recorded; its kind comes along. */
  placeAt(where: PlaceIds): Promise<void>;
  /** Same spot, same procedure. */
  again(reading: PlaceIds & { readonly procedure: Procedure }): void;
  /** Another spot, the same procedure. */
  next(reading: { readonly procedure: Procedure }): void;
  openFile(file: File): Promise<void>;
  /** From now on the simulated phone; its readings are marked for good. */
  usePractice(): void;
  /** Back to the real sensor. */
  leavePractice(): void;
}

export interface AppParts {
  readonly about: About;
  readonly navigation: Navigation;
  readonly capture: CapturePort;
  readonly analysis: AnalysisPort;
  readonly store: StorePort;
  readonly update: UpdatePort;
  readonly readRecording: (file: File) => Promise<Outcome<Recording>>;
  /** Loaded when something is first handed over or taken in. */
  readonly exchange: () => Promise<ExchangePort>;
  readonly teamStore: () => Promise<TeamStorePort>;
  readonly problemSentence: (problem: Problem) => string;
  readonly environment: {
    now(): Date;
    readonly timeZone: string;
    readonly userAgent: string;
    /** Query of the practice rig when the address asks for it. */
    readonly practice?: string;
  };
}

/** The rig when the address does not describe another. */
const DEFAULT_RIG = '?rig=handrail';

const localDay = (now: Date) =>
  [now.getFullYear(), now.getMonth() + 1, now.getDate()]
    .map((part) => String(part).padStart(2, '0'))
    .join('-');

export async function createApp(parts: AppParts): Promise<App> {
  const { store, navigation, environment, about } = parts;
  const noteError = (error: unknown) =>
    store.noteError(
      error instanceof Error ? error.message : String(error),
      error instanceof Error ? error.stack : undefined,
    );
  const settings = await openSettings(store, noteError);
  const notices = createNotices();
  const places = createPlaces(store);
  const rounds = createRounds(store, settings);
  const sources = createSources(store, async () => {
    const { parseSource } = await import('../core/survey/parse-sources.ts');
    return (given) => {
      const parsed = parseSource(given);
      return parsed.ok ? parsed.value : undefined;
    };
  });
  const ownThresholds = () => settings.get().thresholds;
  const readings = createReadings(store, parts.analysis, places, notices, screenText.readings, ownThresholds);
  const { lastProcedure, mounting } = settings.get();
  const flow = createTakeFlow({
    ...parts,
    rounds,
    about: { version: about.version, commit: about.commit },
    plan: planTake(lastProcedure, { names: {} }, mounting, environment.practice),
    onKept: (reading) => {
      if (reading.sensor.source !== 'file')
        settings.change({ lastProcedure: reading.procedure, mounting: reading.circumstances.mounting });
      void store.askPersistence();
      const opened = { screen: 'reading', id: reading._id } as const;
      if (navigation.route.get().screen === 'take') navigation.replace(opened);
      else
        notices.show(screenText.take.kept, {
          action: { label: screenText.common.open, run: () => navigation.go(opened) },
        });
    },
  });
  const handOver = createHandOver({
    store,
    readings,
    places,
    sources,
    settings,
    exchange: parts.exchange,
    now: environment.now,
    noteError,
  });
  let teamStore: Promise<TeamStore> | undefined;
  let { practice } = environment;
  const take: Take = {
    ...flow,
    async prepare(where, procedure) {
      const now = settings.get();
      flow.reset();
      const known = await places.whereabouts(where);
      const plan = planTake(procedure ?? now.lastProcedure, known, now.mounting, practice);
      const kind = known.place ? {} : { spotKind: now.lastSpotKind ?? 'other' };
      flow.plan.set(replan(plan, kind));
    },
    async placeAt(where) {
      const known = await places.whereabouts(where);
      const plan = { ...flow.plan.get(), where: known };
      flow.plan.set(known.place ? replan(plan, { spotKind: known.place.kind }) : plan);
    },
    again: ({ spot, procedure }) => navigation.go({ screen: 'take', procedure, ...(spot ? { spot } : {}) }),
    next: ({ procedure }) => navigation.go({ screen: 'take', procedure }),
    usePractice() {
      practice = environment.practice ?? DEFAULT_RIG;
      flow.plan.set({ ...flow.plan.get(), practice });
    },
    leavePractice() {
      practice = undefined;
      const { practice: _, ...plan } = flow.plan.get();
      flow.plan.set(plan);
    },
    openFile: (file) => openFile(parts, flow, handOver, notices, file),
  };
  return {
    about,
    settings,
    notices,
    navigation,
    readings,
    places,
    sources,
    rounds,
    phone: createPhone(parts.capture, store),
    take,
    handOver,
    teamStore: () =>
      (teamStore ??= import('./team-store.ts').then((part) =>
        part.createTeamStoreUse(store, parts.teamStore),
      )),
    selection: live<readonly string[]>([]),
    lastPlace: live<PlaceIds>({}),
    noteError,
    today: () => localDay(environment.now()),
    update: parts.update,
    store,
    capture: parts.capture,
  };
}

/** A recording becomes a reading; a packet goes to its screen; anything else is refused with row and reason. */
async function openFile(
  parts: AppParts,
  flow: TakeFlow,
  handOver: HandOver,
  notices: Notices,
  file: File,
): Promise<void> {
  if (/\.(?:zip|html?)$/i.test(file.name)) {
    parts.navigation.go({ screen: 'hand-over' });
    return handOver.look(file);
  }
  const recording = await parts.readRecording(file);
  if (!recording.ok) {
    notices.show(`${file.name}: ${parts.problemSentence(recording.problem)}`, { tone: 'failure' });
    return;
  }
  parts.navigation.go({ screen: 'take' });
  await flow.takeFile(recording.value, file.name);
}
