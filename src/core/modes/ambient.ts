/** Ambient procedure: what the chain and the running procedure take from `ambient/`. */
export { ambientProcedure } from './ambient/ambient-procedure.ts';
export { findRandomModes } from './ambient/find-random-modes.ts';
export type { RandomMode } from './ambient/find-random-modes.ts';
export { recordSpectra } from './ambient/record-spectra.ts';
export { sortPeaks } from './ambient/sort-peaks.ts';
