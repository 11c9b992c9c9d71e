const SECONDS_PER_DAY = 86_400;
const STAMP =
  /^(?:(\d{4})-(\d{2})-(\d{2})[T ])?(\d{2}):(\d{2}):(\d{2})(?:[.,](\d{1,12}))?\s*(Z|[+-]\d{2}:?\d{2})?$/i;

export interface IsoStamp {
  /** Whole seconds since 1970-01-01T00:00:00Z, or since midnight when the stamp has no date. */
  readonly wholeS: number;
  /** Rest of the second, 0 <= fractionS < 1: kept apart so that microseconds survive. */
  readonly fractionS: number;
  /** True when date and zone are given, so that the instant is known. */
  readonly isInstant: boolean;
}

/** Reads "2026-03-01T10:00:00.125Z" (ISO 8601), with a space for the T, an offset, or only the time of day. */
export function parseIsoStamp(text: string): IsoStamp | undefined {
  const match = STAMP.exec(text.trim());
  if (!match) return undefined;
  const [hour, minute, second] = [Number(match[4]), Number(match[5]), Number(match[6])];
  if (hour > 23 || minute > 59 || second > 60) return undefined;
  const days = match[1] ? daysFromCivil(Number(match[1]), Number(match[2]), Number(match[3])) : 0;
  if (days === undefined) return undefined;
  const zone = match[8];
  return {
    wholeS: days * SECONDS_PER_DAY + hour * 3600 + minute * 60 + second - offsetSeconds(zone),
    fractionS: match[7] ? Number(`0.${match[7]}`) : 0,
    isInstant: match[1] !== undefined && zone !== undefined,
  };
}

/** ISO 8601 date-time in UTC, to the millisecond, of seconds since 1970. */
export function secondsToIso(epochS: number): string {
  if (!Number.isFinite(epochS)) throw new RangeError(`epochS must be finite, got ${epochS}`);
  const epochMs = Math.round(epochS * 1000);
  const day = Math.floor(epochMs / (SECONDS_PER_DAY * 1000));
  const ms = epochMs - day * SECONDS_PER_DAY * 1000;
  const clock = [ms / 3_600_000, (ms / 60_000) % 60, (ms / 1000) % 60].map((v) => pad(Math.floor(v), 2));
  return `${civilFromDays(day)}T${clock.join(':')}.${pad(ms % 1000, 3)}Z`;
}

const pad = (value: number, width: number): string => String(value).padStart(width, '0');

function offsetSeconds(zone: string | undefined): number {
  if (!zone || /z/i.test(zone)) return 0;
  const digits = zone.replace(/[^\d]/g, '');
  const seconds = Number(digits.slice(0, 2)) * 3600 + Number(digits.slice(2)) * 60;
  return zone.startsWith('-') ? -seconds : seconds;
}

/** Days since 1970-01-01 of a Gregorian date (years counted from March, so that the leap day is last). */
function daysFromCivil(year: number, month: number, day: number): number | undefined {
  if (month < 1 || month > 12 || day < 1 || day > 31) return undefined;
  const y = month <= 2 ? year - 1 : year;
  const monthFromMarch = (month + 9) % 12;
  const dayOfYear = Math.floor((153 * monthFromMarch + 2) / 5) + day - 1;
  return 365 * y + Math.floor(y / 4) - Math.floor(y / 100) + Math.floor(y / 400) + dayOfYear - 719_468;
}

function civilFromDays(days: number): string {
  const shifted = days + 719_468;
  const era = Math.floor(shifted / 146_097);
  const dayOfEra = shifted - era * 146_097;
  const yearOfEra = Math.floor(
    (dayOfEra -
      Math.floor(dayOfEra / 1460) +
      Math.floor(dayOfEra / 36_524) -
      Math.floor(dayOfEra / 146_096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const monthFromMarch = Math.floor((5 * dayOfYear + 2) / 153);
  const month = monthFromMarch < 10 ? monthFromMarch + 3 : monthFromMarch - 9;
  const year = yearOfEra + era * 400 + (month <= 2 ? 1 : 0);
  const day = dayOfYear - Math.floor((153 * monthFromMarch + 2) / 5) + 1;
  return `${pad(year, 4)}-${pad(month, 2)}-${pad(day, 2)}`;
}
