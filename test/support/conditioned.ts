import type { AnalysisSettings } from '../../src/core/model/analysis.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import { conditionRecording, type ConditionedSignal } from '../../src/core/signal/condition-recording.ts';

/** Conditioned signal of a recording that must be answerable. */
export function conditioned(
  recording: Recording,
  timing: AnalysisSettings['timing'] = 'auto',
): ConditionedSignal {
  const outcome = conditionRecording(recording, timing);
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value;
}

export const RUNNING: AnalysisSettings = { procedure: 'running', timing: 'auto' };
