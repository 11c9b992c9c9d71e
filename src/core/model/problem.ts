/** Closed list of reasons why a recording or file cannot be answered. Sentences: src/text/problems.ts. */
export const PROBLEM_CODES = [
  'unreadable-file',
  'no-samples',
  'too-short',
  'irregular-sampling',
  'no-motion',
  'no-taps',
  'no-decay',
  'no-mode',
  'no-tone',
  'no-pass',
  'pass-incomplete',
  'clipped-throughout',
  'no-resolution',
  'folded-sweep',
  'bad-header',
  'bad-row',
  'bad-unit',
  'time-not-increasing',
  'too-large',
  'newer-version',
  'damaged',
  'cancelled',
  'bad-source',
  'mass-shift-unclear',
  'too-few-readings',
] as const;
export type ProblemCode = (typeof PROBLEM_CODES)[number];

export interface Problem {
  readonly code: ProblemCode;
  /** Numbers and short names that the sentence mentions, e.g. row, column, durationS. */
  readonly facts: Readonly<Record<string, number | string>>;
}
