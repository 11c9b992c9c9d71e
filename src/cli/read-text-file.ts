import { readFile } from 'node:fs/promises';
import type { Outcome } from '../core/model/outcome.ts';
import { failure, success } from '../core/model/outcome.ts';

const NUL = '\0';

/** Text of a file in UTF-8 or, where it says so by a byte order mark, UTF-16. Anything else is `unreadable-file`. */
export async function readTextFile(path: string): Promise<Outcome<string>> {
  let bytes: Uint8Array;
  try {
    bytes = await readFile(path);
  } catch (error) {
    return failure('unreadable-file', { reason: readFailure(error) });
  }
  try {
    const text = new TextDecoder(encodingOf(bytes), { fatal: true }).decode(bytes);
    return text.includes(NUL) ? failure('unreadable-file', { reason: 'not-text' }) : success(text);
  } catch {
    return failure('unreadable-file', { reason: 'not-text' });
  }
}

function encodingOf(bytes: Uint8Array): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le';
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return 'utf-16be';
  // A plain byte above 127 outside UTF-8 is most often "m/s²" or "µs" in the old Western encoding.
  return isUtf8(bytes) ? 'utf-8' : 'windows-1252';
}

function isUtf8(bytes: Uint8Array): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return true;
  } catch {
    return false;
  }
}

function readFailure(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : 'unknown';
  const reasons: Readonly<Record<string, string>> = {
    ENOENT: 'no-such-file',
    EISDIR: 'is-a-folder',
    EACCES: 'not-allowed',
  };
  return reasons[code] ?? code;
}
