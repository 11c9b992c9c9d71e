import type { Separation } from '../../../core/model/judgement.ts';
import { formatInterval } from '../../../text/number.ts';
import { readingText } from '../../../text/reading-screen.ts';

/** Off the scale of any phone reading: said as "over". */
const LARGEST_SAID = 999;

export const timesText = ([low, high]: readonly [number, number]): string =>
  readingText.pair.times(formatInterval([low, Math.min(high, LARGEST_SAID)]));

/** "A steady force amplified 3.1 to 16 times." */
export function AmplificationText({ separation }: { readonly separation: Separation }) {
  const { kind, interval } = separation.amplification;
  const what = readingText.pair.amplified(kind);
  return (
    <>
      {what.charAt(0).toUpperCase() + what.slice(1)} {timesText(interval)}
      {separation.buildUpLimited ? `, ${readingText.pair.limited}` : ''}.
    </>
  );
}
