import type { Separation } from '../../../core/model/judgement.ts';
import { formatInterval } from '../../../text/number.ts';
import { readingText } from '../../../text/reading-screen.ts';

/** Off the scale of any phone reading: said as "over". */
const LARGEST_SAID = 999;

export const timesText = ([low, high]: readonly [number, number]): string =>
  readingText.pair.times(formatInterval([low, Math.min(high, LARGEST_SAID)]));

/** "The mode amplifies a steady force 3.1 to 16 times." */
export function AmplificationText({ separation }: { readonly separation: Separation }) {
  const { kind, interval } = separation.amplification;
  return (
    <>
      {readingText.pair.amplifies(kind, timesText(interval))}
      {separation.buildUpLimited ? `, ${readingText.pair.limited}` : ''}.
    </>
  );
}
