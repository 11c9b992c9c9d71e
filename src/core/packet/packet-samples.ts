import type { Recording } from '../model/recording.ts';
import { utf8Bytes } from './sha256.ts';

/** Shortest decimal that reads back as the same 32-bit number. */
function float32Text(value: number): string {
  for (let digits = 6; digits < 9; digits += 1) {
    const short = Number(value.toPrecision(digits));
    if (Math.fround(short) === value) return String(short);
  }
  return String(value);
}

/** Lines joined at a time, so that an hour of samples does not become millions of small texts. */
const BLOCK_LINES = 4096;

/**
 * Samples of a recording as CSV: the stamps and values as stored, so that reading it back gives the same recording. Remarks
 * begin with `#`; the word `practice` in one marks a reader's recording as practice, as it does here.
 */
export function* samplesCsv(recording: Recording, remarks: readonly string[]): Generator<string> {
  const { timeS, accelerationMps2, axes } = recording;
  const practice = recording.sensor.practice ? ['practice: made with the practice rig'] : [];
  yield [...practice, ...remarks].map((remark) => `# ${remark.replaceAll(/[\r\n]+/g, ' ')}\r\n`).join('');
  yield `t_s,${axes.map((axis) => `a${axis}_mps2`).join(',')}\r\n`;
  for (let from = 0; from < timeS.length; from += BLOCK_LINES) {
    const lines: string[] = [];
    for (let i = from; i < Math.min(timeS.length, from + BLOCK_LINES); i += 1)
      lines.push([String(timeS[i]!), ...accelerationMps2.map((axis) => float32Text(axis[i]!))].join(','));
    yield `${lines.join('\r\n')}\r\n`;
  }
}

/** Length of the head is a multiple of this (NumPy enhancement proposal 1). */
const NPY_ALIGNMENT = 64;

/**
 * Samples in NumPy's NPY format 1.0 (NEP 1): Float64, one row a sample, columns time (s) and the axes (m/s²).
 */
export function samplesNpy(recording: Recording): Uint8Array {
  const { timeS, accelerationMps2 } = recording;
  const columnCount = 1 + accelerationMps2.length;
  const head = `{'descr': '<f8', 'fortran_order': False, 'shape': (${timeS.length}, ${columnCount}), }`;
  const fixedBytes = 10;
  const paddedBytes = Math.ceil((fixedBytes + head.length + 1) / NPY_ALIGNMENT) * NPY_ALIGNMENT;
  const headText = `${head.padEnd(paddedBytes - fixedBytes - 1)}\n`;
  const bytes = new Uint8Array(paddedBytes + timeS.length * columnCount * 8);
  bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0]);
  const view = new DataView(bytes.buffer);
  view.setUint16(8, headText.length, true);
  bytes.set(utf8Bytes(headText), fixedBytes);
  [timeS, ...accelerationMps2].forEach((column, k) => {
    for (let i = 0; i < timeS.length; i += 1)
      view.setFloat64(paddedBytes + (i * columnCount + k) * 8, column[i]!, true);
  });
  return bytes;
}
