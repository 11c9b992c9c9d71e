/** A picked or dropped file to a recording, by the same rules as the command. */
import type { Outcome } from '../core/model/outcome.ts';
import type { Recording } from '../core/model/recording.ts';
import { readCsv } from '../core/packet/read-csv.ts';
import { textOfBytes, type TextEncoding } from '../core/packet/text-of-bytes.ts';

export async function readRecordingFile(file: File): Promise<Outcome<Recording>> {
  const text = textOfBytes(new Uint8Array(await file.arrayBuffer()), decode);
  return text.ok ? readCsv(text.value, { name: file.name }) : text;
}

function decode(bytes: Uint8Array, encoding: TextEncoding): string | undefined {
  try {
    return new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch {
    return undefined;
  }
}
