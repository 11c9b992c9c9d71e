import type { Thresholds } from '../core/model/thresholds.ts';

export interface ThresholdText {
  readonly name: string;
  /** Ratios of two things are plain numbers or times; shares are told in per cent. */
  readonly unit: '' | '%' | '×';
  /** Where the default comes from; shown beside the field that sets it. */
  readonly origin: string;
}

const PRACTICE = 'Common practice, no source.';

const THRESHOLDS: Readonly<Record<keyof Thresholds, ThresholdText>> = {
  coincidentRatio: {
    name: 'Coincident within',
    unit: '%',
    origin: `Of the natural frequency, or within half power where that is wider. ${PRACTICE} Speed, load and season move things by as much.`,
  },
  apartBelowRatio: {
    name: 'Apart up to a ratio of',
    unit: '',
    origin:
      'Forcing over natural frequency. DIN 4024-1, machine foundations (check against the standard): a steady force is amplified 2.8 times at most.',
  },
  apartAboveRatio: {
    name: 'Apart from a ratio of',
    unit: '',
    origin:
      'Forcing over natural frequency. DIN 4024-1, machine foundations (check against the standard); ISO 20816-3 calls a support rigid from 1.25 on.',
  },
  stoppedRunningRatio: {
    name: 'Found at rest, when running it may lie off by',
    unit: '%',
    origin: `${PRACTICE} Bearings, preload, temperature and fill move it by a few per cent.`,
  },
  specialistAmplificationRatio: {
    name: 'Call a specialist when a coincidence amplifies more than',
    unit: '×',
    origin: `For people this is amplification times load factor. ${PRACTICE}`,
  },
  wantedAmplificationRatio: { name: 'Damp down to an amplification of', unit: '×', origin: PRACTICE },
  wantedTransmissibilityRatio: {
    name: 'Isolation may let through',
    unit: '%',
    origin: 'Mounts at a third of the forcing frequency, without damping: an eighth (derived).',
  },
};
/** Name, unit and origin of what the person may set. */
export const thresholdText = (key: keyof Thresholds): ThresholdText => THRESHOLDS[key];
