import type { App } from '../../../app/app.ts';
import type { ReadingSummary } from '../../../app/ports.ts';
import { screenText } from '../../../text/screens.ts';
import { useLoaded } from '../../use-loaded.ts';

/** Names of places by id: loaded once for a list, not once for a row. */
export type PlaceNames = ReadonlyMap<string, string>;

const NONE: PlaceNames = new Map();

export const usePlaceNames = (app: App): PlaceNames =>
  useLoaded(app.store, () => app.places.names(), []) ?? NONE;

/** What a reading is called: its label, else asset and spot, else the site. */
export function readingName(reading: ReadingSummary, names: PlaceNames): string {
  const nameOf = (id: string | undefined) => (id ? names.get(id) : undefined);
  const place = [nameOf(reading.asset), nameOf(reading.spot)].filter(Boolean).join(' · ');
  return reading.label ?? (place || nameOf(reading.site) || screenText.common.unnamed);
}
