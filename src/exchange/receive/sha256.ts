import { sha256Hex } from '../../core/packet/sha256.ts';

/** SHA-256 in hex, by the browser where the page is secure. */
export async function sha256(bytes: Uint8Array): Promise<string> {
  if (globalThis.crypto?.subtle === undefined) return sha256Hex(bytes);
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>));
  return [...digest].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}
