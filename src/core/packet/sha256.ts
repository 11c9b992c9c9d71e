/**
 * SHA-256 (FIPS 180-4, NIST 2015) in plain code: revisions are made inside pure functions, and a page without TLS has no
 * crypto.subtle. About 100 MB/s; the store hands large raw samples to the browser's own.
 */
export function sha256Hex(bytes: Uint8Array): string {
  const { start, round } = constants();
  const state = Uint32Array.from(start);
  const schedule = new Uint32Array(64);
  const whole = bytes.length - (bytes.length % 64);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let offset = 0; offset < whole; offset += 64) compress(state, schedule, round, view, offset);
  const tail = paddedTail(bytes, whole);
  const tailView = new DataView(tail.buffer);
  for (let offset = 0; offset < tail.length; offset += 64) compress(state, schedule, round, tailView, offset);
  return [...state].map((word) => word.toString(16).padStart(8, '0')).join('');
}

/** SHA-256 of a text in UTF-8, lower-case hex. */
export function sha256HexOfText(text: string): string {
  return sha256Hex(utf8Bytes(text));
}

/** UTF-8 of a text without lone surrogates (the core has no TextEncoder). */
export function utf8Bytes(text: string): Uint8Array {
  const bytes = new Uint8Array(text.length * 3);
  let length = 0;
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    if (code < 0x80) bytes[length++] = code;
    else if (code < 0x800) {
      bytes[length++] = 0xc0 | (code >> 6);
      bytes[length++] = 0x80 | (code & 0x3f);
    } else if (code < 0x10000) {
      bytes[length++] = 0xe0 | (code >> 12);
      bytes[length++] = 0x80 | ((code >> 6) & 0x3f);
      bytes[length++] = 0x80 | (code & 0x3f);
    } else {
      bytes[length++] = 0xf0 | (code >> 18);
      bytes[length++] = 0x80 | ((code >> 12) & 0x3f);
      bytes[length++] = 0x80 | ((code >> 6) & 0x3f);
      bytes[length++] = 0x80 | (code & 0x3f);
    }
  }
  return bytes.slice(0, length);
}

function paddedTail(bytes: Uint8Array, from: number): Uint8Array {
  const rest = bytes.length - from;
  const tail = new Uint8Array(rest < 56 ? 64 : 128);
  tail.set(bytes.subarray(from));
  tail[rest] = 0x80;
  const view = new DataView(tail.buffer);
  view.setUint32(tail.length - 8, Math.floor(bytes.length / 0x20000000));
  view.setUint32(tail.length - 4, (bytes.length << 3) >>> 0);
  return tail;
}

const rotated = (word: number, by: number): number => (word >>> by) | (word << (32 - by));

function compress(
  state: Uint32Array,
  w: Uint32Array,
  round: Uint32Array,
  view: DataView,
  offset: number,
): void {
  for (let i = 0; i < 16; i += 1) w[i] = view.getUint32(offset + 4 * i);
  for (let i = 16; i < 64; i += 1) {
    const a = w[i - 15]!;
    const b = w[i - 2]!;
    const s0 = rotated(a, 7) ^ rotated(a, 18) ^ (a >>> 3);
    const s1 = rotated(b, 17) ^ rotated(b, 19) ^ (b >>> 10);
    w[i] = w[i - 16]! + s0 + w[i - 7]! + s1;
  }
  let [a, b, c, d, e, f, g, h] = state as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  for (let i = 0; i < 64; i += 1) {
    const s1 = rotated(e, 6) ^ rotated(e, 11) ^ rotated(e, 25);
    const t1 = (h + s1 + ((e & f) ^ (~e & g)) + round[i]! + w[i]!) | 0;
    const s0 = rotated(a, 2) ^ rotated(a, 13) ^ rotated(a, 22);
    const t2 = (s0 + ((a & b) ^ (a & c) ^ (b & c))) | 0;
    h = g;
    g = f;
    f = e;
    e = (d + t1) | 0;
    d = c;
    c = b;
    b = a;
    a = (t1 + t2) | 0;
  }
  [a, b, c, d, e, f, g, h].forEach((word, i) => {
    state[i] = state[i]! + word;
  });
}

/** First 64 primes: the constants of the standard are the fractions of their roots. */
function firstPrimes(count: number): number[] {
  const primes: number[] = [];
  for (let n = 2; primes.length < count; n += 1) if (primes.every((p) => n % p !== 0)) primes.push(n);
  return primes;
}

/**
 * First 32 bits of the fraction of a root of a prime, exact by integer search (a float root would round).
 * floor(prime^(1/degree) * 2^32) mod 2^32.
 */
function rootFraction(prime: number, degree: 2n | 3n): number {
  const target = BigInt(prime) << (32n * degree);
  let low = 0n;
  let high = BigInt(prime) << 32n;
  while (low < high) {
    const middle = (low + high + 1n) >> 1n;
    if (middle ** degree <= target) low = middle;
    else high = middle - 1n;
  }
  return Number(low & 0xffffffffn);
}

interface Constants {
  readonly start: Uint32Array;
  readonly round: Uint32Array;
}

let known: Constants | undefined;

/** Worked out at first use, not when the app starts. */
function constants(): Constants {
  known ??= {
    start: Uint32Array.from(firstPrimes(8), (prime) => rootFraction(prime, 2n)),
    round: Uint32Array.from(firstPrimes(64), (prime) => rootFraction(prime, 3n)),
  };
  return known;
}
