/** Any text against the CSV reader, a hundred thousand times over: understood or refused, never thrown through. */
import { checkReadCsvOnAnyText } from '../support/any-csv-text.ts';

const RUNS = 100_000;
checkReadCsvOnAnyText(RUNS);
console.log(`${RUNS} texts understood in full or refused with a known code`);
