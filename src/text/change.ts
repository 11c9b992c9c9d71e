import type { Interval } from '../core/model/interval.ts';
import { formatNumber } from './number.ts';

interface TextChange {
  /** Later over earlier. */
  readonly ratio: number;
  readonly interval: Interval;
  readonly changed: boolean;
}

const percent = (ratio: number) => formatNumber(Math.abs(100 * (ratio - 1)), 2);

/** "Frequency: 4.2 % lower (2.9 to 5.5 %)." What is not seen is never called the same. */
export function changeSentence(what: string, change: TextChange | undefined): string {
  if (!change) return `${what}: not found in both.`;
  const { ratio, interval, changed } = change;
  const hidden = Math.max(Math.abs(interval[0] - 1), Math.abs(interval[1] - 1)) + 1;
  if (!changed)
    return `${what}: no change seen beyond what visits differ by; up to ${percent(hidden)} % could hide.`;
  const [near, far] = ratio < 1 ? [interval[1], interval[0]] : interval;
  const direction = ratio < 1 ? 'lower' : 'higher';
  return `${what}: ${percent(ratio)} % ${direction} (${percent(near)} to ${percent(far)} %), more than visits differ by.`;
}
