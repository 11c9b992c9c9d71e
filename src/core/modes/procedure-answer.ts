import type { BroadPeak, CoastdownFacts, Mode, Tone } from '../model/analysis.ts';
import type { Doubt } from '../model/doubt.ts';
import type { AnalysisPictures, RingDown } from '../model/pictures.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';

/** What one procedure finds; `analyse` adds recording facts, levels, spectrum, trace and trust. */
export interface ProcedureAnswer {
  /** Sorted by strength. */
  readonly modes: readonly Mode[];
  /** Sorted by strength. */
  readonly tones: readonly Tone[];
  readonly broadPeaks: readonly BroadPeak[];
  readonly tapTimesS: readonly number[];
  readonly doubts: readonly Doubt[];
  readonly ringDowns: readonly RingDown[];
  readonly pass?: NonNullable<AnalysisPictures['pass']>;
  readonly coastdown?: CoastdownFacts;
  /** The signal on another time base, where what was found decides it better than the record as a whole. */
  readonly retimed?: ConditionedSignal;
}
