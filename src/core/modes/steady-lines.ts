import { complexTransform, nextPowerOfTwo } from '../signal/fft.ts';
import { envelopeDirection } from './narrow-band.ts';
import type { Envelope } from './narrow-band.ts';

/** Passes of the cyclic refinement; each line is re-estimated with the others taken out. */
const PASSES = 8;
/** Parabolic steps per refinement; each gains about two digits. */
const STEPS = 4;

export interface SteadyLines {
  /** Frequencies against the band's centre, Hz. */
  readonly offsetsHz: readonly number[];
  /** Summed squared amplitude over axes of each line, and its direction (unit vector). */
  readonly powers: readonly number[];
  readonly directions: readonly (readonly number[])[];
  /** Mean squared envelope left over, and of the whole, summed over axes. */
  readonly leftPower: number;
  readonly totalPower: number;
}

/**
 * Fits `count` steady lines to a band's complex envelope, all axes together (RELAX: Li & Stoica 1996).
 * Lines closer than about one over the record are not separable.
 */
export function fitSteadyLines(envelope: Envelope, count: number): SteadyLines {
  const n = envelope.re[0]!.length;
  const left = {
    re: envelope.re.map((r) => Float64Array.from(r)),
    im: envelope.im.map((r) => Float64Array.from(r)),
  };
  const lines: Line[] = [];
  const totalPower = meanPower(left.re, left.im);
  for (let m = 0; m < count; m++) {
    lines.push(
      takeOut(
        left,
        refine(left, coarsePeak(left, envelope.stepS), 1 / (n * envelope.stepS), envelope.stepS),
        envelope.stepS,
      ),
    );
    if (m === 0) continue;
    for (let pass = 0; pass < PASSES; pass++)
      for (let j = 0; j < lines.length; j++) {
        putBack(left, lines[j]!, envelope.stepS);
        lines[j] = takeOut(
          left,
          refine(left, lines[j]!.offsetHz, 0.3 / (n * envelope.stepS), envelope.stepS),
          envelope.stepS,
        );
      }
  }
  lines.sort((a, b) => power(b) - power(a));
  return {
    offsetsHz: lines.map((l) => l.offsetHz),
    powers: lines.map(power),
    directions: lines.map((line) =>
      envelopeDirection({
        re: line.re.map((v) => Float64Array.of(v)),
        im: line.im.map((v) => Float64Array.of(v)),
      }),
    ),
    leftPower: meanPower(left.re, left.im),
    totalPower,
  };
}

interface Pair {
  readonly re: readonly Float64Array[];
  readonly im: readonly Float64Array[];
}
interface Line {
  readonly offsetHz: number;
  readonly re: readonly number[];
  readonly im: readonly number[];
}

const power = (line: Line): number => line.re.reduce((sum, r, a) => sum + r * r + line.im[a]! ** 2, 0);

function meanPower(re: readonly Float64Array[], im: readonly Float64Array[]): number {
  let sum = 0;
  re.forEach((axis, a) => {
    for (let i = 0; i < axis.length; i++) sum += axis[i]! ** 2 + im[a]![i]! ** 2;
  });
  return sum / re[0]!.length;
}

/** Mean of z·exp(-2πi·offset·t) per axis. */
function correlate(z: Pair, offsetHz: number, stepS: number): Line {
  const n = z.re[0]!.length;
  const turn = -2 * Math.PI * offsetHz * stepS;
  const [tc, ts] = [Math.cos(turn), Math.sin(turn)];
  const re = z.re.map(() => 0);
  const im = z.re.map(() => 0);
  let c = 1;
  let s = 0;
  for (let i = 0; i < n; i++) {
    for (let a = 0; a < re.length; a++) {
      const x = z.re[a]![i]!;
      const y = z.im[a]![i]!;
      re[a]! += (x * c - y * s) / n;
      im[a]! += (x * s + y * c) / n;
    }
    const next = c * tc - s * ts;
    s = s * tc + c * ts;
    c = next;
  }
  return { offsetHz, re, im };
}

function addLine(z: Pair, line: Line, sign: number, stepS: number): void {
  const n = z.re[0]!.length;
  const turn = 2 * Math.PI * line.offsetHz * stepS;
  const [tc, ts] = [Math.cos(turn), Math.sin(turn)];
  let c = sign;
  let s = 0;
  for (let i = 0; i < n; i++) {
    for (let a = 0; a < z.re.length; a++) {
      z.re[a]![i]! += line.re[a]! * c - line.im[a]! * s;
      z.im[a]![i]! += line.re[a]! * s + line.im[a]! * c;
    }
    const next = c * tc - s * ts;
    s = s * tc + c * ts;
    c = next;
  }
}

function takeOut(z: Pair, offsetHz: number, stepS: number): Line {
  const line = correlate(z, offsetHz, stepS);
  addLine(z, line, -1, stepS);
  return line;
}

const putBack = (z: Pair, line: Line, stepS: number): void => addLine(z, line, 1, stepS);

function coarsePeak(z: Pair, stepS: number): number {
  const n = z.re[0]!.length;
  const size = nextPowerOfTwo(2 * n);
  const sum = new Float64Array(size);
  z.re.forEach((re, a) => {
    const data = new Float64Array(2 * size);
    for (let i = 0; i < n; i++) {
      data[2 * i] = re[i]!;
      data[2 * i + 1] = z.im[a]![i]!;
    }
    const out = complexTransform(data);
    for (let k = 0; k < size; k++) sum[k]! += out[2 * k]! ** 2 + out[2 * k + 1]! ** 2;
  });
  const best = sum.indexOf(sum.reduce((top, v) => Math.max(top, v), 0));
  return (best > size / 2 ? best - size : best) / (size * stepS);
}

/** Maximum of the periodogram near a start: parabola through three points, drawn together each step. */
function refine(z: Pair, startHz: number, reachHz: number, stepS: number): number {
  let middle = startHz;
  let reach = reachHz / 2;
  for (let step = 0; step < STEPS; step++) {
    const low = power(correlate(z, middle - reach, stepS));
    const top = power(correlate(z, middle, stepS));
    const high = power(correlate(z, middle + reach, stepS));
    const bend = low - 2 * top + high;
    const shift = bend < 0 ? (0.5 * (low - high)) / bend : Math.sign(high - low);
    middle += reach * Math.max(-1, Math.min(1, shift));
    reach *= Math.abs(shift) < 1 ? 0.2 : 1;
  }
  return middle;
}
