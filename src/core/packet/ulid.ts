/** Crockford's base 32: no I, L, O, U. */
const DIGITS = '0123456789ABCDEFGHJKMNPQRSTVWXYZ';
const TIME_LIMIT_MS = 2 ** 48;
export const ULID_RANDOM_BYTES = 10;
export const ULID_PATTERN = /^[0-7][0-9A-HJKMNP-TV-Z]{25}$/;

/**
 * A sortable identifier: 48 bits of time, 80 bits of chance, 26 characters (ULID, Feerasta 2016).
 * @param timeMs milliseconds since 1970. @param random 10 bytes of crypto randomness.
 * @throws RangeError when the time does not fit or there is too little randomness.
 */
export function ulid(timeMs: number, random: Uint8Array): string {
  if (!(timeMs >= 0 && timeMs < TIME_LIMIT_MS)) {
    throw new RangeError(`timeMs must be in [0, 2^48), got ${timeMs}`);
  }
  if (random.length < ULID_RANDOM_BYTES) {
    throw new RangeError(`random must hold ${ULID_RANDOM_BYTES} bytes, got ${random.length}`);
  }
  return timeDigits(Math.floor(timeMs)) + randomDigits(random);
}

function timeDigits(timeMs: number): string {
  let digits = '';
  for (let rest = timeMs, i = 0; i < 10; i += 1) {
    digits = DIGITS[rest % 32]! + digits;
    rest = Math.floor(rest / 32);
  }
  return digits;
}

function randomDigits(random: Uint8Array): string {
  let digits = '';
  let bits = 0;
  let bitCount = 0;
  for (const byte of random.subarray(0, ULID_RANDOM_BYTES)) {
    bits = (bits << 8) | byte;
    bitCount += 8;
    while (bitCount >= 5) {
      bitCount -= 5;
      digits += DIGITS[(bits >> bitCount) & 31]!;
    }
    bits &= (1 << bitCount) - 1;
  }
  return digits;
}
