/** Limits of the verdicts, for the screen that sets them; apart, so that only that screen loads them. */
export {
  DEFAULT_THRESHOLDS,
  sensibleThresholds,
  THRESHOLD_BOUNDS,
  THRESHOLD_KEYS,
} from '../core/survey/thresholds.ts';
