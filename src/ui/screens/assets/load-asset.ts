import type { App } from '../../../app/app.ts';
import { currentAnalysis, currentPlaceIds } from '../../../app/readings.ts';
import type { Asset } from '../../../app/places.ts';
import type { OpenedReading } from '../../../app/ports.ts';
import type { KnownSource } from '../../../app/sources.ts';
import { assetVerdict, type AssetReading } from '../../../app/survey-desk.ts';
import type { AssetVerdict } from '../../../core/model/asset-verdict.ts';

export interface LoadedAsset {
  readonly verdict: AssetVerdict;
  readonly sources: readonly KnownSource[];
  readonly readings: readonly AssetReading[];
  readonly hasPractice: boolean;
}

/** Opens the readings of an asset and pools them. */
export async function loadAsset(app: App, asset: Asset): Promise<LoadedAsset> {
  const sources = await app.sources.validFor({
    asset: asset.id,
    ...(asset.site ? { site: asset.site } : {}),
  });
  const summaries = await app.readings.list({ asset: asset.id });
  const opened = await Promise.all(summaries.map((summary) => app.readings.open(summary.id)));
  const found = opened.filter((reading): reading is OpenedReading => reading !== undefined);
  const readings = await Promise.all(found.map((reading) => toAssetReading(app, reading)));
  return {
    verdict: assetVerdict(
      readings,
      sources.map((entry) => entry.source),
      asset.spots.map(({ id, name }) => ({ id, name })),
    ),
    sources,
    readings,
    hasPractice: found.some((reading) => reading.reading.practice),
  };
}

async function toAssetReading(app: App, opened: OpenedReading): Promise<AssetReading> {
  const { spot } = currentPlaceIds(opened);
  return {
    id: opened.reading._id,
    recordedAt: opened.reading.recordedAt,
    ...(spot ? { spot } : {}),
    analysis: currentAnalysis(opened),
    circumstances: opened.reading.circumstances,
    settings: await app.readings.judgeSettings(opened),
  };
}
