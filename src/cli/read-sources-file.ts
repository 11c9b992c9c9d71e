import type { Outcome } from '../core/model/outcome.ts';
import { failure, success } from '../core/model/outcome.ts';
import type { Source } from '../core/model/source.ts';
import { forcingsOf } from '../core/survey/forcings.ts';
import { parseSources } from '../core/survey/parse-sources.ts';
import { readTextFile } from './read-text-file.ts';

/** Sources of a JSON file, checked one by one; none when no file is named. */
export async function readSourcesFile(path: string | undefined): Promise<Outcome<readonly Source[]>> {
  if (path === undefined) return success([]);
  const text = await readTextFile(path);
  if (!text.ok) return text;
  let value: unknown;
  try {
    value = JSON.parse(text.value);
  } catch {
    return failure('unreadable-file', { reason: 'not-json' });
  }
  const sources = parseSources(value);
  if (!sources.ok) return sources;
  const forcings = forcingsOf(sources.value);
  return forcings.ok ? sources : forcings;
}
