/** What screens may ask of the survey directly: pure answers about sources, assets and visits. Loaded with the screens that need it. */
export { addedMassTest, massShiftRatio } from '../core/survey/added-mass.ts';
export { assetVerdict } from '../core/survey/asset.ts';
export type { AssetReading } from '../core/survey/asset-reading.ts';
export { forcingsOf } from '../core/survey/forcings.ts';
export { parseSource } from '../core/survey/parse-sources.ts';
export { speedSeries } from '../core/survey/speed-series.ts';
export { modePairs } from '../core/survey/mode-pairs.ts';
export { visitChange, levelRatio, type Visit } from '../core/survey/visits.ts';
