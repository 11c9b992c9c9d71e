/** Stands on every result, export and report. */
export const INDICATIVE_LINE = 'Indicative survey, not a certified measurement.';
