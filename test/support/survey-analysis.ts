/** Invented analyses for judging: only what the survey reads is worth setting. */
import type {
  Analysis,
  Levels,
  Mode,
  Procedure,
  RecordingFacts,
  Tone,
} from '../../src/core/model/analysis.ts';
import { ANALYSIS_VERSION } from '../../src/core/model/analysis.ts';

export function modeAt(frequencyHz: number, dampingRatio: number, part: Partial<Mode> = {}): Mode {
  return {
    frequencyHz,
    frequencySdHz: 0.001 * frequencyHz,
    dampingRatio,
    dampingRatioSd: 0.05 * dampingRatio,
    amplitudeMps2: 1,
    direction: [0, 0, 1],
    method: 'ring-down-fit',
    eventCount: 5,
    halfPower: { refusal: 'below-resolution' },
    fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
    doubts: [],
    ...part,
  };
}

export function toneAt(frequencyHz: number, amplitudeMps2: number, part: Partial<Tone> = {}): Tone {
  return {
    frequencyHz,
    frequencySdHz: 0.001,
    amplitudeMps2,
    amplitudeSdMps2: 0.01 * amplitudeMps2,
    direction: [0, 0, 1],
    nature: 'forced',
    fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
    ...part,
  };
}

export function levelsOf(part: Partial<Levels> = {}): Levels {
  return { peakMps2: 0.1, rmsMps2: 0.03, bandHz: [0.5, 28], leftOutTones: false, ...part };
}

export interface AnalysisPart extends Partial<Omit<Analysis, 'recording'>> {
  readonly recording?: Partial<RecordingFacts>;
}

/** A reading of 60 s at 60 Hz that sees 0.5 to 28 Hz. */
export function analysisOf(procedure: Procedure, part: AnalysisPart = {}): Analysis {
  const { recording, ...rest } = part;
  return {
    version: ANALYSIS_VERSION,
    procedure,
    procedureFrom: 'person',
    settings: { procedure, timing: 'auto' },
    recording: {
      sampleCount: 3600,
      durationS: 60,
      rateHz: 60,
      timing: { model: 'stamps', trueShare: 0.9, scatterSdS: 0.0007, gapCount: 0, repeatCount: 0 },
      stepMps2: [0, 0, 0],
      noiseMps2PerRootHz: [0.002, 0.002, 0.002],
      clippedCount: 0,
      usableBandHz: [0.5, 28],
      ...recording,
    },
    modes: [],
    tones: [],
    broadPeaks: [],
    tapTimesS: [],
    doubts: [],
    trust: 'good',
    ...rest,
  };
}

/** Value of an outcome that must be one. */
export function valueOf<T>(outcome: { ok: true; value: T } | { ok: false; problem: unknown }): T {
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problem));
  return outcome.value;
}
