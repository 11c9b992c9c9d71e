import { nextPowerOfTwo, realTransform } from '../../signal/fft.ts';
import { windowSamples } from '../../signal/window.ts';

/** Lines taken off at most, and the block whose phasors are compared, s. */
const MOST_LINES = 4;
const BLOCK_S = 1;
const LEAST_BLOCKS = 6;
/** Rounds of correcting the frequency by the phase that turns from block to block. */
const ROUNDS = 3;
const LEAST_HZ = 0.5;

/**
 * The samples without their steady lines. The phasor of a line is the median over blocks, so a few taps do not move it and
 * a mode that rings with another phase at each tap is left in.
 * @param axes uniform samples, one array per axis
 */
export function withoutSteadyLines(axes: readonly Float64Array[], periodS: number): Float64Array[] {
  const out = axes.map((axis) => axis.slice());
  const n = out[0]?.length ?? 0;
  const block = Math.round(BLOCK_S / periodS);
  if (n < LEAST_BLOCKS * block) return out;
  for (let line = 0; line < MOST_LINES; line++) {
    let frequencyHz = strongestFrequency(out, periodS);
    for (let round = 0; round < ROUNDS; round++) frequencyHz += turningHz(out, periodS, frequencyHz, block);
    for (const axis of out) {
      const { re, im } = blockPhasors(axis, periodS, frequencyHz, block);
      const a = medianOf(re);
      const b = medianOf(im);
      for (let i = 0; i < n; i++) {
        const angle = 2 * Math.PI * frequencyHz * i * periodS;
        axis[i] = (axis[i] as number) - a * Math.cos(angle) + b * Math.sin(angle);
      }
    }
  }
  return out;
}

function strongestFrequency(axes: readonly Float64Array[], periodS: number): number {
  const n = (axes[0] as Float64Array).length;
  const size = 2 * nextPowerOfTwo(n);
  const weights = windowSamples('hann', n);
  const power = new Float64Array(size / 2 + 1);
  for (const axis of axes) {
    const { re, im } = realTransform(
      axis.map((v, i) => v * (weights[i] as number)),
      size,
    );
    for (let k = 0; k < power.length; k++)
      power[k] = (power[k] as number) + (re[k] as number) ** 2 + (im[k] as number) ** 2;
  }
  let best = Math.ceil(LEAST_HZ * size * periodS);
  for (let k = best; k < power.length - 1; k++) if ((power[k] as number) > (power[best] as number)) best = k;
  return best / (size * periodS);
}

/** Complex amplitude block by block (2/n times the sum with exp(-i·2π·f·t)). */
function blockPhasors(
  axis: Float64Array,
  periodS: number,
  frequencyHz: number,
  block: number,
): { re: Float64Array; im: Float64Array } {
  const count = Math.floor(axis.length / block);
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  for (let b = 0; b < count; b++) {
    let sumRe = 0;
    let sumIm = 0;
    for (let i = b * block; i < (b + 1) * block; i++) {
      const angle = 2 * Math.PI * frequencyHz * i * periodS;
      sumRe += (axis[i] as number) * Math.cos(angle);
      sumIm -= (axis[i] as number) * Math.sin(angle);
    }
    re[b] = (2 * sumRe) / block;
    im[b] = (2 * sumIm) / block;
  }
  return { re, im };
}

/** Median phase turned from block to block, as a frequency error. */
function turningHz(
  axes: readonly Float64Array[],
  periodS: number,
  frequencyHz: number,
  block: number,
): number {
  const phasors = axes.map((axis) => blockPhasors(axis, periodS, frequencyHz, block));
  const count = phasors[0]?.re.length ?? 0;
  const turns = Float64Array.from({ length: count - 1 }, (_, b) => {
    let re = 0;
    let im = 0;
    for (const p of phasors) {
      re += (p.re[b + 1] as number) * (p.re[b] as number) + (p.im[b + 1] as number) * (p.im[b] as number);
      im += (p.im[b + 1] as number) * (p.re[b] as number) - (p.re[b + 1] as number) * (p.im[b] as number);
    }
    return Math.atan2(im, re);
  });
  return medianOf(turns) / (2 * Math.PI * block * periodS);
}

function medianOf(values: Float64Array): number {
  const sorted = values.slice().sort();
  const middle = sorted.length >> 1;
  return sorted.length % 2
    ? (sorted[middle] as number)
    : ((sorted[middle - 1] as number) + (sorted[middle] as number)) / 2;
}
