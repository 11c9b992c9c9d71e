import { base64Bytes, base64Lines } from './packet-base64.ts';
import { utf8Bytes } from './sha256.ts';

/*
 * A report carries its packet as Base64 inside a <template>: browsers keep that inert, show nothing of it and run nothing, and
 * share sheets that refuse archives take the page.
 */
const OPEN = '<template id="thrumbook-packet">\n';
const CLOSE = '</template>';

/** The block of the page that carries a packet, as bytes of ASCII text. */
export function packetBlock(packet: Uint8Array): readonly Uint8Array[] {
  return [utf8Bytes(OPEN), base64Lines(packet), utf8Bytes(CLOSE)];
}

/** The packet that a report carries, or undefined where it carries none; a cut page gives the packet as far as it goes. */
export function packetInReport(page: Uint8Array): Uint8Array | undefined {
  const from = lastPlaceOf(page, utf8Bytes(OPEN));
  return from < 0 ? undefined : base64Bytes(page.subarray(from + OPEN.length));
}

/** The last one: text of a person's notes is escaped and cannot hold a real one, a page pasted before it could. */
function lastPlaceOf(page: Uint8Array, mark: Uint8Array): number {
  for (let at = page.lastIndexOf(mark[0]!); at >= 0; at = page.lastIndexOf(mark[0]!, at - 1)) {
    if (mark.every((byte, i) => page[at + i] === byte)) return at;
    if (at === 0) break;
  }
  return -1;
}
