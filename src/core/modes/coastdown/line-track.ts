import { nextPowerOfTwo, realTransform } from '../../signal/fft.ts';
import type { UniformSignal } from '../../signal/uniform-grid.ts';
import { windowSamples } from '../../signal/window.ts';

/** Where a moving line is, at equal steps of time. */
export interface LineTrack {
  readonly timeS: Float64Array;
  readonly frequencyHz: Float64Array;
  /** ln(1 + power over floor) there: how well it is seen. */
  readonly clarity: Float64Array;
  readonly score: number;
}

/** Lengths and hop of the short transforms, s: the short one follows fast sweeps, the long one finds weak slow ones. */
export const TRACK_WINDOWS_S = [1.4, 2.8] as const;
const HOP_S = 0.2;
/** Long records are followed in longer steps, so that time and memory stay bounded. */
const MOST_FRAMES = 3000;
const PADDING = 4;
/** Fastest change followed, Hz/s. */
const FASTEST_HZ_PER_S = 4;
/** Cost of a change of the line's slope by one bin a hop: the smoother of two paths of equal power is taken. */
const SLOPE_COST = 0.12;
const LEAST_HZ = 1;

/**
 * The strongest path of a line that only falls (or, for comparison, only rises): dynamic programming over short-time
 * spectra of all axes together (Viterbi 1967).
 */
export function trackLine(
  grid: UniformSignal,
  highestHz: number,
  sense: 'falling' | 'rising',
  windowS: number = TRACK_WINDOWS_S[0],
): LineTrack | undefined {
  const rateHz = 1 / grid.periodS;
  const length = Math.round(windowS * rateHz);
  const n = grid.present.length;
  const hopS = Math.max(HOP_S, (n * grid.periodS) / MOST_FRAMES);
  const hop = Math.max(1, Math.round(hopS * rateHz));
  const frameCount = Math.floor((n - length) / hop) + 1;
  if (frameCount < 8) return undefined;
  const size = PADDING * nextPowerOfTwo(length);
  const stepHz = rateHz / size;
  const first = Math.ceil(LEAST_HZ / stepHz);
  const binCount = Math.floor(highestHz / stepHz) - first;
  const clarity = clarities(grid, { length, hop, size, first, binCount, frameCount });
  const most = Math.max(1, Math.ceil((FASTEST_HZ_PER_S * HOP_S) / stepHz));
  const path = bestPath(clarity, frameCount, binCount, sense === 'falling' ? -1 : 1, most);
  const timeS = Float64Array.from(
    { length: frameCount },
    (_, k) => grid.startS + (k * hop + length / 2) * grid.periodS,
  );
  return {
    timeS,
    frequencyHz: Float64Array.from(path, (bin) => (bin + first) * stepHz),
    clarity: Float64Array.from(path, (bin, k) => clarity[k * binCount + bin] as number),
    score: path.reduce((sum, bin, k) => sum + (clarity[k * binCount + bin] as number), 0) / frameCount,
  };
}

interface Frames {
  readonly length: number;
  readonly hop: number;
  readonly size: number;
  readonly first: number;
  readonly binCount: number;
  readonly frameCount: number;
}

function clarities(grid: UniformSignal, frames: Frames): Float64Array {
  const { length, hop, size, first, binCount, frameCount } = frames;
  const weights = windowSamples('hann', length);
  const power = new Float64Array(frameCount * binCount);
  const piece = new Float64Array(length);
  for (const axis of grid.accelerationMps2)
    for (let k = 0; k < frameCount; k++) {
      for (let i = 0; i < length; i++) piece[i] = (weights[i] as number) * (axis[k * hop + i] as number);
      const { re, im } = realTransform(piece, size);
      for (let b = 0; b < binCount; b++) {
        const at = k * binCount + b;
        power[at] = (power[at] as number) + (re[first + b] as number) ** 2 + (im[first + b] as number) ** 2;
      }
    }
  const sample = power.filter((_, i) => i % 7 === 0).sort();
  const floor = Math.max(sample[sample.length >> 2] as number, 1e-30) * 2;
  return power.map((p) => Math.log1p(p / floor));
}

/** Path of most clarity; the slope is part of the state only through the step taken last (greedy second order). */
function bestPath(
  clarity: Float64Array,
  frameCount: number,
  binCount: number,
  sign: 1 | -1,
  most: number,
): Int32Array {
  let score = clarity.slice(0, binCount);
  let lastStep = new Float64Array(binCount).fill(-1);
  const back = new Int32Array(frameCount * binCount);
  for (let k = 1; k < frameCount; k++) {
    const next = new Float64Array(binCount).fill(-Infinity);
    const nextStep = new Float64Array(binCount);
    for (let b = 0; b < binCount; b++)
      for (let step = 0; step <= most; step++) {
        const from = b - sign * step;
        if (from < 0 || from >= binCount) continue;
        const before = lastStep[from] as number;
        const bend = before < 0 ? 0 : Math.abs(step - before);
        const value = (score[from] as number) - SLOPE_COST * bend;
        if (value > (next[b] as number)) {
          next[b] = value;
          back[k * binCount + b] = from;
          // Steps are whole bins: their running mean is the slope.
          nextStep[b] = before < 0 ? step : 0.8 * before + 0.2 * step;
        }
      }
    for (let b = 0; b < binCount; b++) next[b] = (next[b] as number) + (clarity[k * binCount + b] as number);
    score = next;
    lastStep = nextStep;
  }
  const path = new Int32Array(frameCount);
  let bin = score.reduce((best, v, b) => (v > (score[best] as number) ? b : best), 0);
  for (let k = frameCount - 1; k >= 0; k--) {
    path[k] = bin;
    bin = back[k * binCount + bin] as number;
  }
  return path;
}
