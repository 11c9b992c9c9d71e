import { success, type Outcome } from '../core/model/outcome.ts';
import type { Place } from '../core/model/place.ts';
import { parsePlace } from '../core/survey/parse-place.ts';
import { readJsonFile } from './read-json-file.ts';

/** What the spot is, from a JSON file; undefined when none is named. What is not understood is left out, as with a spot of the app. */
export async function readSpotFile(path: string | undefined): Promise<Outcome<Place | undefined>> {
  if (path === undefined) return success(undefined);
  const value = await readJsonFile(path);
  return value.ok ? success(parsePlace(value.value)) : value;
}
