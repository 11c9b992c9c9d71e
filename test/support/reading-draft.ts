import type { Analysis } from '../../src/core/model/analysis.ts';
import type { ReadingFact } from '../../src/core/model/fact.ts';
import type { Recording } from '../../src/core/model/recording.ts';

/** A small analysis with one mode, for tests of keeping: its numbers mean nothing. */
export function sampleAnalysis(frequencyHz = 7.4): Analysis {
  return {
    version: 1,
    procedure: 'tap',
    procedureFrom: 'person',
    settings: { procedure: 'tap', timing: 'auto' },
    recording: {
      sampleCount: 600,
      durationS: 10,
      rateHz: 60,
      timing: { model: 'stamps', trueShare: 1, scatterSdS: 0.001, gapCount: 0, repeatCount: 0 },
      stepMps2: [0.1, 0.1, 0.1],
      noiseMps2PerRootHz: [0.01, 0.01, 0.01],
      clippedCount: 0,
      usableBandHz: [0.5, 25],
      gravityMps2: 9.81,
      up: [0, 0, 1],
    },
    modes: [
      {
        frequencyHz,
        frequencySdHz: 0.012345678,
        dampingRatio: 0.012,
        dampingRatioSd: 0.001,
        amplitudeMps2: 1.5,
        direction: [0, 0, 1],
        method: 'ring-down-fit',
        eventCount: 3,
        halfPower: { refusal: 'below-resolution' },
        fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
        doubts: [],
      },
    ],
    tones: [],
    broadPeaks: [],
    tapTimesS: [1, 4, 7],
    doubts: [{ code: 'few-taps', facts: { tapCount: 3 } }],
    trust: 'good',
  };
}

export function sampleRecording(count: number, practice = false): Recording {
  const timeS = Float64Array.from({ length: count }, (_, i) => i / 60);
  const axis = (gain: number) => Float32Array.from(timeS, (t) => gain * Math.sin(46.5 * t));
  return {
    startedAt: '2026-03-01T10:00:00.000Z',
    sensor: { source: practice ? 'practice' : 'accelerometer', practice, name: 'test' },
    axes: ['x', 'y', 'z'],
    timeS,
    accelerationMps2: [axis(0.1), axis(0.2), axis(1).map((value) => value + 9.8)],
  };
}

export function readingDraft(
  over: Partial<ReadingFact> = {},
): Omit<ReadingFact, '_id' | 'rawSha256' | 'rawBytes' | 'v' | 'kind'> {
  return {
    recordedAt: '2026-03-01T10:00:00.000Z',
    timeZone: 'Europe/Berlin',
    procedure: 'tap',
    practice: false,
    circumstances: {
      mounting: 'laid',
      surface: 'tube',
      excitation: 'knuckle',
      machineState: 'none',
      peopleOnIt: 'none',
    },
    phone: { device: 'device:test', userAgent: 'test' },
    sensor: { source: 'accelerometer', practice: false, name: 'test' },
    analysis: sampleAnalysis(),
    app: { version: '0.1.0', commit: 'abc' },
    ...over,
  };
}
