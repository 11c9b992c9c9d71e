import { amplitudeIntegral, linearColumnCount, softenedCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';

/** Products of columns with each other (q by q, lower triangle), with the samples, and of the samples. */
export interface Moments {
  readonly gram: Float64Array;
  readonly cross: Float64Array;
  readonly square: Float64Array;
}

/** Column products of one segment: columns c, s per component, constant, slope, then t*c, t*s per component. */
export function segmentMoments(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  axes: readonly number[],
  weight: Float64Array | undefined,
): Moments {
  const m = components.length;
  const p = linearColumnCount(m);
  const q = p + 2 * m + 2 * softenedCount(components);
  const rows = q + axes.length;
  const products = new Float64Array(rows * q);
  const square = new Float64Array(axes.length);
  const block = new Float64Array(rows * BLOCK_SAMPLES);
  for (let first = segment.start; first < segment.end; first += BLOCK_SAMPLES) {
    const count = Math.min(BLOCK_SAMPLES, segment.end - first);
    fillBlock(signal, segment, components, first, count, p, block);
    axes.forEach((axis, a) => {
      block.set(signal.y[axis]!.subarray(first, first + count), (q + a) * BLOCK_SAMPLES);
    });
    if (weight !== undefined) weighBlock(block, rows, weight, first, count);
    addProducts(block, rows, q, count, products);
    for (let a = 0; a < axes.length; a++) square[a]! += dot(block, q + a, q + a, count);
  }
  return { gram: products.slice(0, q * q), cross: products.slice(q * q), square };
}

/** Samples whose columns are held at once: some kilobytes, so that they stay in the nearest cache. */
const BLOCK_SAMPLES = 256;

/** Columns of `count` samples, one row of the block per column. */
function fillBlock(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  first: number,
  count: number,
  p: number,
  block: Float64Array,
): void {
  const { timeS, phaseTimeS = timeS } = signal;
  const origin = timeS[segment.start]!;
  const span = Math.max(timeS[segment.end - 1]! - origin, 1e-9);
  const m = components.length;
  let soft = p + 2 * m;
  for (let k = 0; k < m; k++) {
    const component = components[k]!;
    const { angularRadPerS, decayPerS, softening } = component;
    const [onC, onS] = [2 * k * BLOCK_SAMPLES, (2 * k + 1) * BLOCK_SAMPLES];
    const [onTc, onTs] = [(p + 2 * k) * BLOCK_SAMPLES, (p + 2 * k + 1) * BLOCK_SAMPLES];
    for (let i = 0; i < count; i++) {
      const tau = timeS[first + i]! - origin;
      let phase = angularRadPerS * (phaseTimeS[first + i]! - origin);
      let fall = -decayPerS * tau;
      if (softening !== undefined) {
        const integral = (segment.amplitudeMps2 ?? 0) * amplitudeIntegral(component, tau);
        phase += angularRadPerS * softening.frequencySlopePerMps2 * integral;
        fall -= softening.decaySlopePerMps2 * integral;
        const envelope = Math.exp(fall);
        block[soft * BLOCK_SAMPLES + i] = integral * envelope * Math.cos(phase);
        block[(soft + 1) * BLOCK_SAMPLES + i] = integral * envelope * Math.sin(phase);
      }
      const envelope = fall === 0 ? 1 : Math.exp(fall);
      const c = envelope * Math.cos(phase);
      const s = envelope * Math.sin(phase);
      block[onC + i] = c;
      block[onS + i] = s;
      block[onTc + i] = tau * c;
      block[onTs + i] = tau * s;
    }
    if (softening !== undefined) soft += 2;
  }
  const [constant, slope] = [2 * m * BLOCK_SAMPLES, (2 * m + 1) * BLOCK_SAMPLES];
  for (let i = 0; i < count; i++) {
    block[constant + i] = 1;
    block[slope + i] = (timeS[first + i]! - origin) / span - 0.5;
  }
}

function weighBlock(
  block: Float64Array,
  rows: number,
  weight: Float64Array,
  first: number,
  count: number,
): void {
  for (let i = 0; i < count; i++) {
    const root = Math.sqrt(weight[first + i]!);
    for (let r = 0; r < rows; r++) block[r * BLOCK_SAMPLES + i]! *= root;
  }
}

/** Adds the products of every row with every column at or below it; four sums at a time keep the processor busy. */
function addProducts(
  block: Float64Array,
  rows: number,
  q: number,
  count: number,
  products: Float64Array,
): void {
  for (let r = 0; r < rows; r++) {
    const end = Math.min(r + 1, q);
    const x = r * BLOCK_SAMPLES;
    let k = 0;
    for (; k + 3 < end; k += 4) {
      const a = k * BLOCK_SAMPLES;
      const b = a + BLOCK_SAMPLES;
      const c = b + BLOCK_SAMPLES;
      const d = c + BLOCK_SAMPLES;
      let [sa, sb, sc, sd] = [0, 0, 0, 0];
      for (let i = 0; i < count; i++) {
        const v = block[x + i]!;
        sa += v * block[a + i]!;
        sb += v * block[b + i]!;
        sc += v * block[c + i]!;
        sd += v * block[d + i]!;
      }
      products[r * q + k]! += sa;
      products[r * q + k + 1]! += sb;
      products[r * q + k + 2]! += sc;
      products[r * q + k + 3]! += sd;
    }
    for (; k < end; k++) products[r * q + k]! += dot(block, r, k, count);
  }
}

function dot(block: Float64Array, row: number, other: number, count: number): number {
  const x = row * BLOCK_SAMPLES;
  const y = other * BLOCK_SAMPLES;
  let sum = 0;
  for (let i = 0; i < count; i++) sum += block[x + i]! * block[y + i]!;
  return sum;
}
