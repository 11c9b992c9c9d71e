import type { Interval } from '../model/interval.ts';
import type { Resonance } from './resonance-profile.ts';

/** The verdict's default bounds (design: ISO 10816-3 and DIN 4024-1 give the 0.8 and 1.25), drawn as zones around a mode. */
export const COINCIDENT_RATIO = 0.05;
export const APART_RATIO: Interval = [0.8, 1.25];

export interface SeparationZones {
  /** A forcing reaching in here is coincident. */
  readonly coincidentHz: Interval;
  /** A forcing outside of this is apart; between the two it is close. */
  readonly closeHz: Interval;
}

export const separationZones = ({ frequencyHz, dampingRatio }: Resonance): SeparationZones => {
  const half = Math.min(0.9, Math.max(COINCIDENT_RATIO, dampingRatio));
  return {
    coincidentHz: [frequencyHz * (1 - half), frequencyHz * (1 + half)],
    closeHz: [
      frequencyHz * Math.min(APART_RATIO[0], 1 - half),
      frequencyHz * Math.max(APART_RATIO[1], 1 + half),
    ],
  };
};
