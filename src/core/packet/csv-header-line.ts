import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import { parseCsvHeader, type CsvHeader, type CsvHeaderFault } from './csv-header.ts';
import { emptyCsvRow, scanCsvRow } from './csv-scan.ts';

/** Lines a file may have before its header (titles, remarks). Our choice. */
const MAX_LINES_BEFORE_HEADER = 40;
export const MAX_COLUMNS = 256;
const MAX_HEADER_CHARS = 20_000;
/** Longest piece of a file that a problem quotes. */
const QUOTED_CHARS = 60;
const DELIMITERS = ['\t', ';', ','] as const;
const BYTE_ORDER_MARK = 0xfeff;

export interface CsvHeaderLine {
  readonly header: CsvHeader;
  readonly columnCount: number;
  readonly delimiter: number;
  /** Offset and row number (1 = first line) of what follows the header. */
  readonly bodyStart: number;
  readonly bodyRow: number;
  /** True when a remark before the header says that the samples are from the practice rig. */
  readonly practice: boolean;
}

interface LineFault {
  readonly row: number;
  readonly line: string;
  readonly why: CsvHeaderFault;
}

/** Finds the first line that names a time and an acceleration, and the delimiter that makes it so. */
export function findCsvHeaderLine(text: string): Outcome<CsvHeaderLine> {
  let fault: LineFault | undefined;
  let practice = false;
  let at = text.charCodeAt(0) === BYTE_ORDER_MARK ? 1 : 0;
  for (let row = 1; row <= MAX_LINES_BEFORE_HEADER && at < text.length; row++) {
    const end = lineEnd(text, at);
    const line = text.slice(at, Math.min(end, at + MAX_HEADER_CHARS));
    if (/^\s*#.*\bpractice\b/i.test(line)) practice = true;
    for (const delimiter of DELIMITERS) {
      const names = headerCells(line.replace(/^\s*[#%]+\s*/, ''), delimiter.charCodeAt(0));
      const header = parseCsvHeader(names);
      if ('axes' in header)
        return success({
          header,
          columnCount: names.length,
          delimiter: delimiter.charCodeAt(0),
          bodyStart: afterLineEnd(text, end),
          bodyRow: row + 1,
          practice,
        });
      fault = weightier(fault, { row, line, why: header });
    }
    at = afterLineEnd(text, end);
  }
  return fault ? headerFailure(fault) : failure('no-samples');
}

/** Text of a faulty cell or line, short enough for a sentence. */
export function quotedPiece(text: string): string {
  const trimmed = text.trim();
  return trimmed.length > QUOTED_CHARS ? `${trimmed.slice(0, QUOTED_CHARS)}…` : trimmed;
}

function headerFailure({ why, row, line }: LineFault): Outcome<never> {
  if ('unit' in why)
    return failure('bad-unit', { row, column: quotedPiece(why.column), unit: quotedPiece(why.unit) });
  return failure('bad-header', { row, missing: why.missing, found: quotedPiece(line) });
}

/** An unknown unit says most about a file; then a line that at least names a time. */
function weightier(old: LineFault | undefined, next: LineFault): LineFault {
  if (!old) return next;
  const weight = ({ why }: LineFault) => ('unit' in why ? 2 : why.missing === 'acceleration' ? 1 : 0);
  return weight(next) > weight(old) ? next : old;
}

function headerCells(line: string, delimiter: number): string[] {
  const row = emptyCsvRow(MAX_COLUMNS);
  scanCsvRow(line, 0, delimiter, row);
  return Array.from({ length: row.cellCount }, (_, i) => line.slice(row.starts[i], row.ends[i]).trim());
}

function lineEnd(text: string, from: number): number {
  let at = from;
  while (at < text.length && text[at] !== '\n' && text[at] !== '\r') at++;
  return at;
}

function afterLineEnd(text: string, end: number): number {
  return text[end] === '\r' && text[end + 1] === '\n' ? end + 2 : end + 1;
}
