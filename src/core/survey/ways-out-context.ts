import type { Separation } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import type { SeparationContext } from './separation.ts';

/** Aim a hair beyond the boundary, so that the way out is apart and not on the line. Our own margin. */
export const AIM_MARGIN_RATIO = 0.002;
export interface WaysOutContext extends SeparationContext {
  readonly forcings: readonly Forcing[];
  readonly separations: readonly Separation[];
}
