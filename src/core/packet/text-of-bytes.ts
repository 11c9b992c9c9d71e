import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';

export type TextEncoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';

/** The host's decoder (core has none): the text, or undefined when the bytes are not in that encoding. */
export type DecodeText = (bytes: Uint8Array, encoding: TextEncoding) => string | undefined;

const NUL = '\0';

/**
 * Text of a file: UTF-16 where its byte order mark says so, UTF-8, or the old Western encoding, in which a bare byte
 * above 127 is most often the ² of m/s² or the µ of µs. `unreadable-file` for anything that is no text.
 */
export function textOfBytes(bytes: Uint8Array, decode: DecodeText): Outcome<string> {
  for (const encoding of likelyEncodings(bytes)) {
    const text = decode(bytes, encoding);
    if (text !== undefined && !text.includes(NUL)) return success(text);
  }
  return failure('unreadable-file', { reason: 'not-text' });
}

/** Encodings to try, in order. */
function likelyEncodings(bytes: Uint8Array): readonly TextEncoding[] {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return ['utf-16le'];
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return ['utf-16be'];
  return ['utf-8', 'windows-1252'];
}
