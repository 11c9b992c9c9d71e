import type { Thresholds } from '../core/model/thresholds.ts';

export interface ThresholdText {
  readonly name: string;
  /** Where the default comes from; shown beside the field that sets it. */
  readonly origin: string;
}

const PRACTICE = 'Common practice, no source.';

const THRESHOLDS: Readonly<Record<keyof Thresholds, ThresholdText>> = {
  coincidentRatio: {
    name: 'Coincident within this share of the natural frequency, or within half power where that is wider',
    origin: `${PRACTICE} Speed, load and season move things by as much.`,
  },
  apartBelowRatio: {
    name: 'Apart at or below this ratio',
    origin:
      'DIN 4024-1, machine foundations (check against the standard): a steady force is amplified 2.8 times at most.',
  },
  apartAboveRatio: {
    name: 'Apart at or above this ratio',
    origin:
      'DIN 4024-1, machine foundations (check against the standard); ISO 20816-3 calls a support rigid from 1.25 on.',
  },
  stoppedRunningRatio: {
    name: 'How far a mode found at rest may lie from the same mode of the running machine',
    origin: `${PRACTICE} Bearings, preload, temperature and fill move it by a few per cent.`,
  },
  specialistAmplificationRatio: {
    name: 'Amplification, for people times their load factor, from which a coincidence calls for a specialist',
    origin: PRACTICE,
  },
  wantedAmplificationRatio: { name: 'Amplification to damp down to', origin: PRACTICE },
  wantedTransmissibilityRatio: {
    name: 'Share that isolation may let through',
    origin: 'Mounts at a third of the forcing frequency, without damping: an eighth (derived).',
  },
};
/** Name and origin of what the person may set. */
export const thresholdText = (key: keyof Thresholds): ThresholdText => THRESHOLDS[key];
