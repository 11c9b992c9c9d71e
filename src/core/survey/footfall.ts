import type { Interval } from '../model/interval.ts';
import type { FootfallActivity } from '../model/source.ts';

/** One harmonic of an activity: its order and the load factor (share of body weight) at a harmonic frequency. */
export interface FootfallHarmonic {
  readonly order: number;
  readonly loadFactor?: (harmonicHz: number) => number;
}
export interface FootfallTable {
  readonly paceHz: Interval;
  readonly harmonics: readonly FootfallHarmonic[];
  /** Source of the pace range, and of the load factors. */
  readonly paceOrigin: string;
  readonly loadOrigin: string;
  readonly paceCertain: boolean;
  readonly loadCertain: boolean;
}

/** Walking load factors, design values of CCIP-016 (2006); argument is the frequency of the harmonic, Hz. */
export const WALKING_LOAD_CCIP: readonly ((harmonicHz: number) => number)[] = [
  (f) => Math.min(0.56, Math.max(0, 0.41 * (f - 0.95))),
  (f) => 0.069 + 0.0056 * f,
  (f) => 0.033 + 0.0064 * f,
  (f) => 0.013 + 0.0065 * f,
];

/** Walking load factors, SCI P354 Table 3.1 (from memory, .85); argument is the frequency of the harmonic, Hz. */
export const WALKING_LOAD_SCI: readonly ((harmonicHz: number) => number)[] = [
  (f) => 0.436 * (f - 0.95),
  (f) => 0.006 * (f + 12.3),
  (f) => 0.007 * (f + 5.2),
  (f) => 0.007 * (f + 2.0),
];

/** Jumping: 1.8/1.3/0.7 at 2 Hz and 1.7/1.1/0.5 at 3 Hz (Bachmann 1995, from memory, .75), linear between, held outside. */
const JUMPING_AT_2_HZ = [1.8, 1.3, 0.7] as const;
const JUMPING_AT_3_HZ = [1.7, 1.1, 0.5] as const;
const jumpingLoad =
  (order: 1 | 2 | 3) =>
  (harmonicHz: number): number => {
    const low = JUMPING_AT_2_HZ[order - 1] as number;
    const high = JUMPING_AT_3_HZ[order - 1] as number;
    const share = Math.min(1, Math.max(0, harmonicHz / order - 2));
    return low + share * (high - low);
  };
const constant = (value: number) => (): number => value;

/** Paces and load factors per activity. Below .9 certainty both are shown with "check against the standard". */
export const FOOTFALL: Readonly<Record<FootfallActivity, FootfallTable>> = {
  walking: {
    paceHz: [1.6, 2.4],
    harmonics: [
      { order: 0.5, loadFactor: constant(0.1) },
      ...WALKING_LOAD_CCIP.map((loadFactor, index) => ({ order: index + 1, loadFactor })),
    ],
    paceOrigin: 'Bachmann 1995, App. G',
    loadOrigin: 'CCIP-016',
    paceCertain: false,
    loadCertain: true,
  },
  running: {
    paceHz: [2.0, 3.5],
    harmonics: [1.6, 0.7, 0.2].map((value, index) => ({ order: index + 1, loadFactor: constant(value) })),
    paceOrigin: 'Bachmann 1995, App. G',
    loadOrigin: 'Bachmann 1995, App. G',
    paceCertain: false,
    loadCertain: false,
  },
  stairs: {
    paceHz: [1.2, 4.5],
    harmonics: [1.1, 0.22].map((value, index) => ({ order: index + 1, loadFactor: constant(value) })),
    paceOrigin: 'SCI P354',
    loadOrigin: 'SCI P354',
    paceCertain: true,
    loadCertain: false,
  },
  jumping: {
    paceHz: [1.8, 3.4],
    harmonics: ([1, 2, 3] as const).map((order) => ({ order, loadFactor: jumpingLoad(order) })),
    paceOrigin: 'Bachmann 1995, App. G',
    loadOrigin: 'Bachmann 1995, App. G',
    paceCertain: false,
    loadCertain: false,
  },
  dancing: {
    paceHz: [1.5, 3.0],
    harmonics: [0.5, 0.15, 0.1].map((value, index) => ({ order: index + 1, loadFactor: constant(value) })),
    paceOrigin: 'Bachmann 1995, App. G',
    loadOrigin: 'Bachmann 1995, App. G',
    paceCertain: false,
    loadCertain: false,
  },
  sway: {
    paceHz: [0.4, 0.7],
    harmonics: [{ order: 1 }],
    paceOrigin: 'Bachmann 1995, App. G',
    loadOrigin: 'none published here',
    paceCertain: false,
    loadCertain: true,
  },
};

/** Range of a load factor over a range of harmonic frequency; every factor used here is monotone. */
export function loadFactorOver(loadFactor: (harmonicHz: number) => number, rangeHz: Interval): Interval {
  const ends = [loadFactor(rangeHz[0]), loadFactor(rangeHz[1])];
  return [Math.min(...ends), Math.max(...ends)];
}
