/** What the person set on this phone, kept in the store as one value; unknown or broken parts fall back to defaults. */
import { PROCEDURES, type Procedure } from '../core/model/analysis.ts';
import type { Circumstances, FieldValue } from '../core/model/fact.ts';
import { SPOT_KINDS, type SpotKind } from '../core/model/place.ts';
import type { AccelerationUnit, DisplacementUnit, FrequencyUnit, VelocityUnit } from '../text/quantity.ts';
import { live, type Live } from './live-state.ts';
import type { StorePort } from './ports.ts';

export const THEMES = ['auto', 'light', 'dark', 'sunlight'] as const;
export type Theme = (typeof THEMES)[number];

export interface Settings {
  readonly theme: Theme;
  readonly frequencyUnit: FrequencyUnit;
  readonly accelerationUnit: AccelerationUnit;
  readonly velocityUnit: VelocityUnit;
  readonly displacementUnit: DisplacementUnit;
  readonly lastProcedure: Procedure;
  readonly mounting: Circumstances['mounting'];
  readonly phoneMassKg: number | null;
  readonly round: string | null;
  /** Null until the first kind was chosen: then Take begins with the pictures. */
  readonly lastSpotKind: SpotKind | null;
  /** Cautions the person has confirmed, with the day. */
  readonly cautionsSeen: readonly string[];
  readonly offline: 'on' | 'off';
  /** Thresholds of the verdicts that the person set; what is senseless is left out where they are used. */
  readonly thresholds: Readonly<Record<string, number>>;
}

export const DEFAULT_SETTINGS: Settings = {
  theme: 'auto',
  frequencyUnit: 'Hz',
  accelerationUnit: 'm/s²',
  velocityUnit: 'mm/s',
  displacementUnit: 'µm',
  lastProcedure: 'tap',
  mounting: 'laid',
  phoneMassKg: null,
  round: null,
  lastSpotKind: null,
  cautionsSeen: [],
  offline: 'on',
  thresholds: {},
};

export interface SettingsHolder extends Live<Settings> {
  change(part: Partial<Settings>): void;
}

const KEY = 'settings';

/** Loads the kept settings; later changes are written as they are made. */
export async function openSettings(
  store: Pick<StorePort, 'getSetting' | 'putSetting'>,
  onFailure: (error: unknown) => void,
): Promise<SettingsHolder> {
  const state = live(parseSettings(await store.getSetting(KEY)));
  return {
    ...state,
    change(part) {
      state.set({ ...state.get(), ...part });
      store.putSetting(KEY, { ...state.get() } as unknown as FieldValue).catch(onFailure);
    },
  };
}

/** Unknown data to settings: each field by itself, so that one broken field costs only itself. */
export function parseSettings(kept: unknown): Settings {
  const given = typeof kept === 'object' && kept !== null ? (kept as Record<string, unknown>) : {};
  const word = <K extends keyof Settings>(key: K, words: readonly Settings[K][]): Settings[K] =>
    words.find((item) => item === given[key]) ?? DEFAULT_SETTINGS[key];
  const mass = given.phoneMassKg;
  return {
    theme: word('theme', THEMES),
    frequencyUnit: word('frequencyUnit', ['Hz', 'r/min']),
    accelerationUnit: word('accelerationUnit', ['m/s²', 'g', 'mg']),
    velocityUnit: word('velocityUnit', ['mm/s', 'm/s', 'in/s']),
    displacementUnit: word('displacementUnit', ['µm', 'mm', 'mil']),
    lastProcedure: word('lastProcedure', PROCEDURES),
    mounting: word('mounting', ['laid', 'strapped', 'putty', 'clamp', 'magnet', 'unknown']),
    phoneMassKg: typeof mass === 'number' && mass > 0 && mass < 2 ? mass : null,
    lastSpotKind: SPOT_KINDS.find((kind) => kind === given.lastSpotKind) ?? null,
    round: typeof given.round === 'string' ? given.round : null,
    cautionsSeen: Array.isArray(given.cautionsSeen)
      ? given.cautionsSeen.filter((code): code is string => typeof code === 'string')
      : [],
    offline: word('offline', ['on', 'off']),
    thresholds: numbersOf(given.thresholds),
  };
}

const numbersOf = (kept: unknown): Readonly<Record<string, number>> =>
  Object.fromEntries(
    Object.entries(typeof kept === 'object' && kept !== null ? kept : {}).filter(
      (entry): entry is [string, number] => Number.isFinite(entry[1]),
    ),
  );
