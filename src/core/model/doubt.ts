/** Closed list of reasons not to trust a reading fully. Meaning and remedy: src/text/doubts.ts. */
export const DOUBT_CODES = [
  'few-taps',
  'tap-scatter',
  'amplitude-dependent',
  'near-resolution',
  'methods-disagree',
  'fold-undecided',
  'folded',
  'coarse-step',
  'clipped',
  'gaps',
  'repeats',
  'late-stamps',
  'polled',
  'phone-moved',
  'tilt-leak',
  'contact-loss',
  'mounting-unknown',
  'loose-and-strong',
  'rocking',
  'short',
  'low-signal',
  'band-edge',
  'beating',
  'poor-fit',
  'phone-mass',
  'sweep-fast',
  'gravity-scale',
  'interrupted',
  'stalled',
  'half-power-refused',
  'one-decay-close-modes',
  'running-resonance',
  'other-procedure',
  'practice',
] as const;
export type DoubtCode = (typeof DOUBT_CODES)[number];

export interface Doubt {
  readonly code: DoubtCode;
  readonly facts?: Readonly<Record<string, number | string>>;
}

export type Trust = 'good' | 'fair' | 'poor';

/** Closed list of reasons why a cross-check gives no number. Sentences: src/text/refusals.ts. */
export const REFUSAL_CODES = [
  'below-resolution',
  'too-few-averages',
  'window-dominates',
  'no-half-power-points',
  'too-noisy',
] as const;
export type RefusalCode = (typeof REFUSAL_CODES)[number];
