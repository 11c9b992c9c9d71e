import * as v from 'valibot';
import { DOUBT_CODES, REFUSAL_CODES } from '../model/doubt.ts';
import { PROCEDURES } from '../model/analysis.ts';

/*
 * Shape of an analysis that comes from outside. Extra members are let through (they belong to the hash of the fact);
 * what the screens read must be there and finite.
 */
const finite = v.pipe(v.number(), v.finite());
const count = v.pipe(v.number(), v.integer(), v.minValue(0));
const positive = v.pipe(finite, v.minValue(0));
const numbers = v.pipe(v.array(finite), v.maxLength(3));
const interval = v.tuple([finite, finite]);
const maybe = v.exactOptional;

const fold = v.looseObject({
  verdict: v.picklist(['direct', 'folded', 'undecided']),
  candidatesHz: v.pipe(v.array(finite), v.maxLength(200)),
});

const dampingCheck = v.union([
  v.looseObject({ dampingRatio: finite }),
  v.looseObject({ refusal: v.picklist(REFUSAL_CODES) }),
]);

const doubt = v.looseObject({
  code: v.picklist(DOUBT_CODES),
  facts: maybe(v.record(v.string(), v.union([finite, v.string()]))),
});

const mode = v.looseObject({
  frequencyHz: positive,
  frequencySdHz: positive,
  dampingRatio: finite,
  dampingRatioSd: positive,
  amplitudeMps2: finite,
  direction: numbers,
  verticalShare: maybe(finite),
  method: v.pipe(v.string(), v.maxLength(60)),
  eventCount: count,
  halfPower: dampingCheck,
  logDecrement: maybe(dampingCheck),
  softening: maybe(v.looseObject({ frequencySlopePerMps2: finite, dampingSlopePerMps2: finite })),
  fold,
  doubts: v.array(v.picklist(DOUBT_CODES)),
});

const tone = v.looseObject({
  frequencyHz: positive,
  frequencySdHz: positive,
  amplitudeMps2: finite,
  amplitudeSdMps2: finite,
  direction: numbers,
  nature: v.picklist(['forced', 'mixed']),
  fold,
  familyHz: maybe(finite),
  familyOrder: maybe(finite),
});

const recordingFacts = v.looseObject({
  sampleCount: count,
  durationS: finite,
  rateHz: finite,
  timing: v.looseObject({
    model: v.picklist(['stamps', 'clock', 'mixed']),
    trueShare: finite,
    scatterSdS: finite,
    gapCount: count,
    repeatCount: count,
  }),
  stepMps2: numbers,
  noiseMps2PerRootHz: numbers,
  clippedCount: count,
  usableBandHz: interval,
  gravityMps2: maybe(finite),
  up: maybe(numbers),
});

const levels = v.looseObject({
  peakMps2: finite,
  rmsMps2: finite,
  bandHz: interval,
  leftOutTones: v.boolean(),
});

export const analysisSettings = v.looseObject({
  procedure: v.picklist([...PROCEDURES, 'auto']),
  timing: v.picklist(['auto', 'stamps', 'clock']),
});

/** An `Analysis` as kept in a reading or result fact. */
export const analysisSchema = v.looseObject({
  version: v.pipe(v.number(), v.integer(), v.minValue(1)),
  procedure: v.picklist(PROCEDURES),
  procedureFrom: v.picklist(['person', 'data']),
  settings: analysisSettings,
  recording: recordingFacts,
  modes: v.pipe(v.array(mode), v.maxLength(200)),
  tones: v.pipe(v.array(tone), v.maxLength(1000)),
  broadPeaks: v.pipe(
    v.array(v.looseObject({ frequencyHz: finite, widthHz: finite, rmsMps2: finite })),
    v.maxLength(200),
  ),
  levels: maybe(levels),
  coastdown: maybe(
    v.looseObject({ startHz: finite, endHz: finite, sweepRateHzPerS: finite, sweepSeverityRatio: finite }),
  ),
  tapTimesS: v.pipe(v.array(finite), v.maxLength(10_000)),
  doubts: v.array(doubt),
  trust: v.picklist(['good', 'fair', 'poor']),
});
