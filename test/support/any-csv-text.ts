import fc from 'fast-check';
import { PROBLEM_CODES } from '../../src/core/model/problem.ts';
import { readCsv } from '../../src/core/packet/read-csv.ts';

const PIECES = [
  't',
  'x',
  'time',
  'ay',
  ',',
  ';',
  '\t',
  '\n',
  '\r',
  '"',
  '0',
  '1.5',
  '-',
  'e',
  '.',
  ' ',
  '(g)',
  'Z',
  ':',
];
const pieces = fc.array(fc.constantFrom(...PIECES), { maxLength: 60 }).map((list) => list.join(''));
const anyText = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 200 }),
  pieces,
  pieces.map((text) => `t,x\n0,1\n${text}`),
);

/** Throws a counterexample when a text is neither understood in full nor refused with a known code. */
export function checkReadCsvOnAnyText(runCount: number): void {
  fc.assert(
    fc.property(anyText, (text) => {
      const outcome = readCsv(text, { name: 'any' });
      if (!outcome.ok) return PROBLEM_CODES.includes(outcome.problem.code);
      const { timeS, accelerationMps2 } = outcome.value;
      const isOrdered = timeS.every((time, i) => Number.isFinite(time) && time >= (timeS[i - 1] ?? 0));
      const isWhole = accelerationMps2.every(
        (axis) => axis.length === timeS.length && axis.every(Number.isFinite),
      );
      return timeS.length > 0 && isOrdered && isWhole;
    }),
    { numRuns: runCount },
  );
}
