import { success, type Outcome } from '../core/model/outcome.ts';
import type { Source } from '../core/model/source.ts';
import { forcingsOf } from '../core/survey/forcings.ts';
import { parseSources } from '../core/survey/parse-sources.ts';
import { readJsonFile } from './read-json-file.ts';

/** Sources of a JSON file, checked one by one; none when no file is named. */
export async function readSourcesFile(path: string | undefined): Promise<Outcome<readonly Source[]>> {
  if (path === undefined) return success([]);
  const value = await readJsonFile(path);
  if (!value.ok) return value;
  const sources = parseSources(value.value);
  if (!sources.ok) return sources;
  const forcings = forcingsOf(sources.value);
  return forcings.ok ? sources : forcings;
}
