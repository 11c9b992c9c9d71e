import type { Fact } from '../model/fact.ts';
import { factName, MANIFEST_NAME, rawName } from './packet-layout.ts';
import type { PacketManifest } from './packet-manifest.ts';
import { createZipWriter } from './packet-zip-write.ts';
import { utf8Bytes } from './sha256.ts';

export interface PacketContent {
  readonly manifest: PacketManifest;
  readonly facts: AsyncIterable<Fact>;
  /** Attachment as it is kept: gzip for a reading's samples, the file itself for a photo. */
  storedRaw(id: string): Promise<Uint8Array | undefined>;
  /** Written last, for people without the program; made when everything else is out. */
  extras(): Promise<readonly { readonly name: string; readonly bytes: Uint8Array }[]>;
}

/**
 * A packet as pieces of a ZIP file, in order. Nothing but the present entry is held.
 * @param onFact told after each fact with how many are out
 * @throws RangeError above 4 GB
 */
export async function* packetPieces(
  content: PacketContent,
  onFact: (doneCount: number) => void | Promise<void> = () => undefined,
): AsyncGenerator<Uint8Array> {
  const zip = createZipWriter();
  yield* zip.entry(MANIFEST_NAME, jsonBytes(content.manifest));
  let doneCount = 0;
  for await (const fact of content.facts) {
    yield* zip.entry(factName(fact), jsonBytes(fact));
    const name = rawName(fact);
    const raw = name === undefined ? undefined : await content.storedRaw(fact._id);
    if (name !== undefined && raw !== undefined)
      yield* fact.kind === 'photo' ? zip.entry(name, raw, 'store') : zip.gzipEntry(name, raw);
    doneCount += 1;
    await onFact(doneCount);
  }
  for (const { name, bytes } of await content.extras()) yield* zip.entry(name, bytes);
  yield zip.end();
}

const jsonBytes = (value: unknown): Uint8Array => utf8Bytes(`${JSON.stringify(value)}\n`);
