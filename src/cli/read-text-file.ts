import { readFile } from 'node:fs/promises';
import type { Outcome } from '../core/model/outcome.ts';
import { failure } from '../core/model/outcome.ts';
import { textOfBytes, type DecodeText } from '../core/packet/text-of-bytes.ts';

const decode: DecodeText = (bytes, encoding) => {
  try {
    return new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch {
    return undefined;
  }
};

/** Reasons of `unreadable-file` by what the system says. */
export const FILE_FAILURES: Readonly<Record<string, string>> = {
  ENOENT: 'no-such-file',
  EISDIR: 'is-a-folder',
  EACCES: 'not-allowed',
};

/** Text of a file; `unreadable-file` with its reason where there is none. */
export async function readTextFile(path: string): Promise<Outcome<string>> {
  try {
    return textOfBytes(await readFile(path), decode);
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? String(error.code) : 'unknown';
    return failure('unreadable-file', { reason: FILE_FAILURES[code] ?? code });
  }
}
