/** Which rows of a recording are samples of the motion: leading dummy rows and repeated readings are not. */
import type { Recording } from '../model/recording.ts';
import { median } from './sample-counter.ts';

/** An equal neighbour after less than this share of the median interval is one reading delivered twice (measured: 2.4 of 4.9 ms). */
export const SHORT_INTERVAL_SHARE = 0.7;
/** Up to this share of equal readings two rows apart, equal neighbours are told from chance. Our choice. */
const CHANCE_LIMIT_SHARE = 0.05;
/**
 * Equal neighbours beyond this share and this many times chance: the sensor is polled (18 % measured in browsers).
 * Smooth rounded motion makes neighbours equal up to 2³ times as often as samples two apart.
 */
const POLLED_SHARE = 0.05;
const POLLED_EXCESS = 12;
/** Of the equal neighbours of a polled sensor, at least this share lies on a passing slope: a true maximum or minimum is no hold. */
const PASSING_SHARE = 0.1;
/** Equal neighbours must be this much commoner after a short interval than after an ordinary one to be repeats, not chance. */
const SHORT_EXCESS = 6;
/** ... and beyond this share of the short intervals. */
const LEAST_SHORT_SHARE = 0.01;

export interface Screening {
  /** Indexes of the rows kept, increasing. */
  readonly kept: Int32Array;
  readonly repeatCount: number;
  readonly leadingZeroCount: number;
  /** True when equal neighbours come at any interval: a poll of a sensor that runs on its own clock (sample and hold). */
  readonly isPolled: boolean;
}

/** Keeps finite rows whose stamps do not run backwards; drops leading zero rows and repeats. */
export function screenSamples(recording: Pick<Recording, 'timeS' | 'accelerationMps2'>): Screening {
  const { timeS, accelerationMps2 } = recording;
  const leadingZeroCount = leadingZeros(accelerationMps2, timeS.length);
  const rows: number[] = [];
  let latest = -Infinity;
  for (let i = leadingZeroCount; i < timeS.length; i++) {
    const t = timeS[i] as number;
    if (!(t >= latest) || !accelerationMps2.every((axis) => Number.isFinite(axis[i]))) continue;
    latest = t;
    rows.push(i);
  }
  const equal = (a: number, b: number): boolean => accelerationMps2.every((axis) => axis[a] === axis[b]);
  const chance = equalShare(rows, 2, equal);
  const isPolled =
    chance < CHANCE_LIMIT_SHARE &&
    equalShare(rows, 1, equal) > POLLED_SHARE + POLLED_EXCESS * chance &&
    passingShare(rows, accelerationMps2, equal) > PASSING_SHARE;
  const limitS = SHORT_INTERVAL_SHARE * medianInterval(rows, timeS);
  const isShort = (r: number): boolean =>
    (timeS[rows[r] as number] as number) - (timeS[rows[r - 1] as number] as number) < limitS;
  const shortShare = equalShare(rows, 1, equal, isShort);
  const ordinaryShare = equalShare(rows, 1, equal, (r) => !isShort(r));
  const dropsShort = shortShare > LEAST_SHORT_SHARE && shortShare > SHORT_EXCESS * ordinaryShare;
  const kept: number[] = [];
  for (let r = 0; r < rows.length; r++) {
    const i = rows[r] as number;
    const before = rows[r - 1];
    const isRepeat = before !== undefined && equal(i, before) && (isPolled || (dropsShort && isShort(r)));
    if (!isRepeat) kept.push(i);
  }
  return { kept: Int32Array.from(kept), repeatCount: rows.length - kept.length, leadingZeroCount, isPolled };
}

/** Rows at the start in which every axis is exactly zero: placeholders some loggers write before the first reading. */
function leadingZeros(accelerationMps2: readonly Float32Array[], n: number): number {
  let i = 0;
  while (i < n && accelerationMps2.every((axis) => axis[i] === 0)) i++;
  return i < n ? i : 0;
}

function equalShare(
  rows: readonly number[],
  lag: number,
  equal: (a: number, b: number) => boolean,
  among: (r: number) => boolean = () => true,
): number {
  let same = 0;
  let seen = 0;
  for (let r = lag; r < rows.length; r++) {
    if (!among(r)) continue;
    seen++;
    if (equal(rows[r] as number, rows[r - lag] as number)) same++;
  }
  return seen ? same / seen : 0;
}

/**
 * Share of the equal neighbours that lie on a slope of some axis (lower before, higher after, or the reverse). A smooth motion
 * has equal neighbours only about its turning points: a 10 Hz sine at 60 Hz makes a third of them. A hold falls anywhere.
 */
function passingShare(
  rows: readonly number[],
  axes: readonly Float32Array[],
  equal: (a: number, b: number) => boolean,
): number {
  let same = 0;
  let passing = 0;
  for (let r = 2; r < rows.length - 1; r++) {
    if (!equal(rows[r]!, rows[r - 1]!)) continue;
    same++;
    const passes = (axis: Float32Array): boolean =>
      (axis[rows[r]!]! - axis[rows[r - 2]!]!) * (axis[rows[r + 1]!]! - axis[rows[r]!]!) > 0;
    if (axes.some(passes)) passing++;
  }
  return same ? passing / same : 0;
}

function medianInterval(rows: readonly number[], timeS: Float64Array): number {
  if (rows.length < 2) return 0;
  const intervals: number[] = [];
  const stride = Math.max(1, Math.floor(rows.length / 4000));
  for (let r = 1; r < rows.length; r += stride)
    intervals.push((timeS[rows[r] as number] as number) - (timeS[rows[r - 1] as number] as number));
  return median(intervals);
}
