import { canonicalJson } from './canonical-json.ts';
import { sha256HexOfText } from './sha256.ts';

/**
 * The one revision a fact can have: "1-" and 32 hex digits of the SHA-256 of its canonical JSON, without `_rev` and
 * `_attachments`. Same content, same revision on every phone and server.
 * @throws TypeError when the fact is not JSON.
 */
export function revisionOf(fact: Readonly<Record<string, unknown>> | object): string {
  const { _rev, _attachments, ...content } = fact as Record<string, unknown>;
  return `1-${sha256HexOfText(canonicalJson(content)).slice(0, 32)}`;
}
