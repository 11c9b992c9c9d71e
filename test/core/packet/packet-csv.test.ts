import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { csvLine, csvText } from '../../../src/core/packet/packet-csv.ts';

/** Reads one line as RFC 4180 says: an independent reader for the test. */
function cellsOf(line: string): string[] {
  const cells: string[] = [];
  let rest = line.replace(/\r\n$/, '');
  for (;;) {
    const quoted = /^"((?:[^"]|"")*)"(?:,|$)/.exec(rest);
    const plain = quoted ? undefined : /^([^,"]*)(?:,|$)/.exec(rest);
    const match = quoted ?? plain!;
    cells.push(quoted ? match[1]!.replaceAll('""', '"') : match[1]!);
    if (match[0].length === rest.length && !match[0].endsWith(',')) return cells;
    rest = rest.slice(match[0].length);
  }
}

describe('csvText', () => {
  it('puts an apostrophe before what a spreadsheet would run (OWASP, CSV injection)', () => {
    for (const text of [
      '=1+1',
      '+1',
      '-1+cmd|x',
      '@SUM(A1)',
      '\t=1',
      '\r=1',
      '\n=1',
      ' =1',
      '＝1',
      '＋1',
      '－1',
      '＠x',
    ])
      expect(cellsOf(csvText(text))).toEqual([`'${text}`]);
  });

  it('leaves other text as it is, quotes, separators and line ends included', () => {
    for (const text of ['Mill yard', 'a "b", c;\td', 'two\r\nlines', '3-way', 'ü'])
      expect(cellsOf(csvText(text))).toEqual([text]);
  });
});

describe('csvLine', () => {
  it('gives every text back, with at most the apostrophe in front, and numbers bare', () => {
    const property = fc.property(
      fc.string(),
      fc.double({ noNaN: true, noDefaultInfinity: true }),
      fc.string(),
      (first, number, last) => {
        const [a, n, b] = cellsOf(csvLine([{ text: first }, { number }, { text: last }]));
        expect([first, `'${first}`]).toContain(a);
        expect([last, `'${last}`]).toContain(b);
        expect(Number(n)).toBe(number === 0 ? 0 : number);
        for (const cell of [a!, b!]) expect(cell).not.toMatch(/^[=+\-@\t\r\n]/);
      },
    );
    fc.assert(property, { numRuns: 300 });
  });

  it('never touches a negative number', () => {
    expect(csvLine([{ number: -0.25 }, { number: undefined }])).toBe('-0.25,\r\n');
  });
});
