/** What the reading screen asks of the survey directly; apart from the survey desk, so that each is loaded with its own screens. */
export { moreToHalve, type MoreRecording } from '../core/survey/more-recording.ts';
export { changedAnalysis } from '../core/survey/structural-change.ts';
export { toneOrigins } from '../core/survey/tone-matches.ts';
export { belongsToMode } from '../core/survey/parse-modal-values.ts';
