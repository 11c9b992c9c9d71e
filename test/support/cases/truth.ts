import type { Recording } from '../../../src/core/model/recording.ts';

export const CASE_KINDS = ['A1', 'A1F', 'A2', 'A2c', 'A3', 'B', 'C', 'D', 'ALIAS', 'ALIASL', 'TWIN'] as const;
export type CaseKind = (typeof CASE_KINDS)[number];

/** Field names as in the shared cases, so that one scorer reads both. */
export interface DeviceTruth {
  /** Nominal rate, Hz. */
  fs: number;
  /** True sampling scatter, s. */
  jit: number;
  /** Gaps a second. */
  gap: number;
  /** Scatter of the stamps alone, s. */
  stamp_sd: number;
  /** Relative error of the nominal rate. */
  rate_err: number;
  /** Rounding step, m/s². */
  q: number;
  /** White noise of each axis, m/s². */
  sigma: number;
}

export interface ModeTruth {
  f_hz: number;
  zeta: number;
  crlb_f?: number;
  crlb_zeta?: number;
  peak_mps2?: number;
  rms_mps2?: number;
}

export interface CaseTruth {
  kind: CaseKind;
  index: number;
  seed: number;
  device: DeviceTruth;
  modes?: ModeTruth[];
  taps_s?: number[];
  tone_hz?: number;
  tones_hz?: number[];
  sub?: 'tone' | 'tone_harm' | 'tone_on_res' | 'res';
  drift_rel?: number;
  snr_db?: number;
  apparent_hz?: number;
  speed_hz?: { start: number; rate: number; curve: number };
  t0_s: number;
}

export interface GeneratedCase {
  readonly name: string;
  readonly recording: Recording;
  readonly truth: CaseTruth;
}
