/* Tables for spreadsheets (RFC 4180). Numbers stay bare; only free text is made harmless. */
export type CsvCell =
  { readonly text: string } | { readonly number: number | undefined } | { readonly word: string };

/** What a spreadsheet may take for a formula at the head of a cell, full-width forms included (OWASP, CSV injection). */
const FORMULA_HEAD = /^[\s\p{Cc}]*[=+\-@\uff1d\uff0b\uff0d\uff20\u2212]|^[\t\r\n]/u;

/** Text a person typed, as a cell: an apostrophe in front of what could become a formula, always in quotes. */
export function csvText(text: string): string {
  const harmless = FORMULA_HEAD.test(text) ? `'${text}` : text;
  return `"${harmless.replaceAll('"', '""')}"`;
}

const CARE = /[",;\t\r\n]/;

function cellText(cell: CsvCell): string {
  if ('text' in cell) return cell.text === '' ? '' : csvText(cell.text);
  if ('number' in cell) return cell.number === undefined ? '' : String(cell.number);
  return CARE.test(cell.word) ? `"${cell.word.replaceAll('"', '""')}"` : cell.word;
}

/** One line of a table with its end. */
export const csvLine = (cells: readonly CsvCell[]): string => `${cells.map(cellText).join(',')}\r\n`;
