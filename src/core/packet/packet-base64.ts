const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
const CODES = Uint8Array.from(LETTERS, (letter) => letter.charCodeAt(0));
const VALUES = new Uint8Array(256).fill(255);
CODES.forEach((code, value) => (VALUES[code] = value));
const PAD = 0x3d;
/** Characters a line: short enough for any editor, a multiple of 4. */
const LINE = 120;

/** Base64 (RFC 4648) in lines, as the bytes of ASCII text. */
export function base64Lines(bytes: Uint8Array): Uint8Array {
  const letterCount = Math.ceil(bytes.length / 3) * 4;
  const text = new Uint8Array(letterCount + Math.ceil(letterCount / LINE));
  let to = 0;
  for (let from = 0, inLine = 0; from < bytes.length; from += 3) {
    const [a, b = 0, c = 0] = [bytes[from]!, bytes[from + 1], bytes[from + 2]];
    text[to] = CODES[a >> 2]!;
    text[to + 1] = CODES[((a & 3) << 4) | (b >> 4)]!;
    text[to + 2] = from + 1 < bytes.length ? CODES[((b & 15) << 2) | (c >> 6)]! : PAD;
    text[to + 3] = from + 2 < bytes.length ? CODES[c & 63]! : PAD;
    to += 4;
    inLine += 4;
    if (inLine === LINE || from + 3 >= bytes.length) {
      text[to++] = 0x0a;
      inLine = 0;
    }
  }
  return text.subarray(0, to);
}

/** Bytes of Base64 text, white space ignored; what is cut or strange ends it there. */
export function base64Bytes(text: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(Math.floor((text.length * 3) / 4) + 3);
  let [held, bits, to] = [0, 0, 0];
  for (let i = 0; i < text.length; i += 1) {
    const code = text[i]!;
    if (code === 0x0a || code === 0x0d || code === 0x20 || code === 0x09) continue;
    const value = VALUES[code]!;
    if (value === 255) break;
    held = ((held << 6) | value) & 0xffffff;
    bits += 6;
    if (bits >= 8) {
      bits -= 8;
      bytes[to++] = (held >> bits) & 0xff;
    }
  }
  return bytes.subarray(0, to);
}
