import { weightedPolynomial } from './polynomial-fit.ts';
import { speedAt, sweepColumns } from './sweep-response.ts';
import type { Sweep } from './sweep-response.ts';

/** Lengths of the blocks whose phases are compared, round by round, s: short ones catch large errors, long ones small. */
const BLOCKS_S = [0.35, 0.35, 0.35, 0.35, 0.7, 0.7, 1.4, 1.4, 2.8, 2.8];

/**
 * Brings a rough sweep within reach of the fit: the response expected from it is compared block by block with what was
 * measured, and the phase that turns between blocks corrects the speed.
 * @param samples along the direction of the mode, length n
 */
export function refineSweep(
  timeS: Float64Array,
  samples: Float64Array,
  start: Sweep,
  frequencyHz: number,
  dampingRatio: number,
): Sweep {
  let sweep = start;
  BLOCKS_S.forEach((blockS, round) => {
    const blocks = comparedBlocks(timeS, samples, sweep, frequencyHz, dampingRatio, blockS);
    if (blocks.length <= 2 * sweep.speedHz.length) return;
    const u: number[] = [];
    const speed: number[] = [];
    const weights: number[] = [];
    for (let b = 1; b < blocks.length; b++) {
      const p = blocks[b - 1] as Block;
      const q = blocks[b] as Block;
      const re = q.re * p.re + q.im * p.im;
      const im = q.im * p.re - q.re * p.im;
      const apart = q.centreS - p.centreS;
      const middle = (p.centreS + q.centreS) / 2;
      u.push((middle - sweep.centreS) / sweep.halfS);
      speed.push(Math.atan2(im, re) / (2 * Math.PI * apart));
      weights.push(Math.min(p.weight, q.weight));
    }
    const order = sweep.speedHz.length - 1;
    const correction = weightedPolynomial(u, speed, weights, round < 3 ? Math.min(order, round) : order);
    sweep = { ...sweep, speedHz: sweep.speedHz.map((c, j) => c + (correction[j] ?? 0)) };
  });
  return sweep;
}

interface Block {
  readonly centreS: number;
  readonly re: number;
  readonly im: number;
  readonly weight: number;
}

/** Measured times conjugate of expected, summed over each block. */
function comparedBlocks(
  timeS: Float64Array,
  samples: Float64Array,
  sweep: Sweep,
  frequencyHz: number,
  dampingRatio: number,
  blockS: number,
): Block[] {
  const { re, im } = sweepColumns(timeS, sweep, frequencyHz, dampingRatio);
  const blocks: Block[] = [];
  let i = 0;
  while (i < timeS.length) {
    const startS = timeS[i] as number;
    const lengthS = Math.max(blockS, 1.5 / Math.max(0.5, speedAt(sweep, startS)));
    let sumRe = 0;
    let sumIm = 0;
    let energy = 0;
    let measured = 0;
    let count = 0;
    for (; i < timeS.length && (timeS[i] as number) < startS + lengthS; i++) {
      const x = samples[i] as number;
      sumRe += x * (re[i] as number);
      sumIm -= x * (im[i] as number);
      energy += (re[i] as number) ** 2 + (im[i] as number) ** 2;
      measured += x * x;
      count++;
    }
    if (count < 4 || energy === 0 || measured === 0) continue;
    const size = Math.hypot(sumRe, sumIm);
    // Share of the block that is the line: 1 for a pure one, small in noise.
    const coherence = Math.min(1, (2 * size * size) / (energy * measured));
    // What is left of the phase after conjugating the expected response is minus the error of the assumed phase.
    blocks.push({
      centreS: startS + lengthS / 2,
      re: sumRe,
      im: sumIm,
      weight: coherence ** 2 / Math.max(0.02, 1 - coherence),
    });
  }
  return blocks;
}
