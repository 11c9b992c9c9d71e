/** Scanner over CSV text: finds cells by offset and reads decimals without making a string per cell. */

const QUOTE = 34;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
const SPACE = 32;
const MINUS = 45;
const PLUS = 43;
const POINT = 46;
const COMMA = 44;
const ZERO = 48;
/** Below this many digits a decimal mantissa is exact in a double. */
const EXACT_DIGITS = 15;
/** Powers of ten up to 10^22 are exact in a double, so one division rounds correctly. */
const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));

export interface CsvRow {
  /** Cell i stands at [starts[i], ends[i]) of the text, outer quotes left out. Reused from row to row. */
  readonly starts: Int32Array;
  readonly ends: Int32Array;
  cellCount: number;
  /** Where the next row starts, and how many line ends were passed. */
  next: number;
  lineEndCount: number;
}

/** Room for one row; cells beyond `maxCells` are skipped. */
export function emptyCsvRow(maxCells: number): CsvRow {
  return {
    starts: new Int32Array(maxCells),
    ends: new Int32Array(maxCells),
    cellCount: 0,
    next: 0,
    lineEndCount: 0,
  };
}

/**
 * Reads the row that starts at `from` into `row` (RFC 4180: quoted cells may hold delimiters and line ends).
 * A row without any character has no cells.
 */
export function scanCsvRow(text: string, from: number, delimiter: number, row: CsvRow): void {
  let at = from;
  row.cellCount = 0;
  row.lineEndCount = 0;
  for (;;) {
    at = scanCell(text, at, delimiter, row);
    const stop = text.charCodeAt(at);
    if (stop === delimiter) {
      at++;
      continue;
    }
    if (stop === CARRIAGE_RETURN && text.charCodeAt(at + 1) === LINE_FEED) at++;
    if (at < text.length) row.lineEndCount++;
    row.next = at + 1;
    if (row.cellCount === 1 && row.starts[0] === row.ends[0]) row.cellCount = 0;
    return;
  }
}

/** Puts one cell into the row and returns the offset of the delimiter or line end after it. */
function scanCell(text: string, from: number, delimiter: number, row: CsvRow): number {
  let at = from;
  let code = text.charCodeAt(at);
  let start = at;
  let end = -1;
  if (code === QUOTE) {
    start = at + 1;
    end = closingQuote(text, start, row);
    at = end + 1;
    code = text.charCodeAt(at);
  }
  while (at < text.length && code !== delimiter && code !== LINE_FEED && code !== CARRIAGE_RETURN) {
    code = text.charCodeAt(++at);
  }
  if (end < 0) end = at;
  if (row.cellCount < row.starts.length) {
    row.starts[row.cellCount] = start;
    row.ends[row.cellCount] = Math.min(end, text.length);
    row.cellCount++;
  }
  return Math.min(at, text.length);
}

function closingQuote(text: string, from: number, row: CsvRow): number {
  for (let at = from; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === LINE_FEED) row.lineEndCount++;
    if (code !== QUOTE) continue;
    if (text.charCodeAt(at + 1) !== QUOTE) return at;
    at++;
  }
  return text.length;
}

/** The decimal sign met so far in a file: 0 none yet, else the code of "." or ",". */
export interface DecimalSign {
  code: number;
}

/**
 * Reads a decimal number in text[from, to), blanks around it allowed. The decimal sign may be a point or a comma
 * but the same in the whole file (`sign` remembers it). NaN when it is anything else.
 */
export function scanDecimal(text: string, from: number, to: number, sign: DecimalSign): number {
  let at = from;
  let end = to;
  while (at < end && text.charCodeAt(at) <= SPACE) at++;
  while (end > at && text.charCodeAt(end - 1) <= SPACE) end--;
  const first = text.charCodeAt(at);
  const isNegative = first === MINUS;
  if (isNegative || first === PLUS) at++;
  let mantissa = 0;
  let digitCount = 0;
  let decimalCount = -1;
  for (let i = at; i < end; i++) {
    const code = text.charCodeAt(i);
    const digit = code - ZERO;
    if (digit >= 0 && digit <= 9) {
      mantissa = mantissa * 10 + digit;
      digitCount++;
      if (decimalCount >= 0) decimalCount++;
    } else if (code === sign.code && decimalCount < 0) {
      decimalCount = 0;
    } else if ((code === POINT || code === COMMA) && sign.code === 0) {
      sign.code = code;
      decimalCount = 0;
    } else {
      return scanUnusual(text.slice(from, to), sign);
    }
  }
  if (digitCount === 0) return Number.NaN;
  if (digitCount > EXACT_DIGITS) return scanUnusual(text.slice(from, to), sign);
  const value = decimalCount > 0 ? mantissa / POWERS_OF_TEN[decimalCount]! : mantissa;
  return isNegative ? -value : value;
}

/** Exponents and very long decimals, rare enough for a string. */
function scanUnusual(cell: string, sign: DecimalSign): number {
  const trimmed = cell.trim();
  const match = /^[+-]?(?:\d+([.,])?\d*|([.,])\d+)(?:e[+-]?\d{1,3})?$/i.exec(trimmed);
  const found = match?.[1] ?? match?.[2];
  if (!match || (found !== undefined && sign.code !== 0 && found.charCodeAt(0) !== sign.code))
    return Number.NaN;
  return Number(trimmed.replace(',', '.'));
}
