import { failure, success, type Outcome } from '../core/model/outcome.ts';
import { readTextFile } from './read-text-file.ts';

/** What a JSON file holds; `unreadable-file` with its reason where it cannot be read. */
export async function readJsonFile(path: string): Promise<Outcome<unknown>> {
  const text = await readTextFile(path);
  if (!text.ok) return text;
  try {
    return success(JSON.parse(text.value) as unknown);
  } catch {
    return failure('unreadable-file', { reason: 'not-json' });
  }
}
