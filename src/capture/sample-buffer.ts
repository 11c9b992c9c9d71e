import type { AxisName, Recording } from '../core/model/recording.ts';

/** Samples per block: about a minute at 60 a second. A new block is the only allocation while recording. */
const BLOCK_COUNT = 4096;

interface Block {
  readonly timeS: Float64Array;
  readonly x: Float32Array;
  readonly y: Float32Array;
  readonly z: Float32Array;
}

export const AXES: readonly AxisName[] = ['x', 'y', 'z'];

/** Growing store of samples: `push` is all that the sensor's handler does. */
export class SampleBuffer {
  #blocks: Block[] = [newBlock()];
  /** Samples so far. */
  count = 0;

  /** What is not finite is no sample. */
  push(timeS: number, x: number, y: number, z: number): void {
    if (!Number.isFinite(timeS + x + y + z)) return;
    const at = this.count % BLOCK_COUNT;
    const index = (this.count - at) / BLOCK_COUNT;
    const block = this.#blocks[index] ?? this.#grow();
    block.timeS[at] = timeS;
    block.x[at] = x;
    block.y[at] = y;
    block.z[at] = z;
    this.count += 1;
  }

  #grow(): Block {
    const block = newBlock();
    this.#blocks.push(block);
    return block;
  }

  timeAt(index: number): number {
    return this.#blocks[Math.floor(index / BLOCK_COUNT)]?.timeS[index % BLOCK_COUNT] ?? Number.NaN;
  }

  /** Fills `sample` with x, y, z of one sample, m/s². */
  read(index: number, sample: Float64Array): void {
    const block = this.#blocks[Math.floor(index / BLOCK_COUNT)];
    const at = index % BLOCK_COUNT;
    sample[0] = block?.x[at] ?? 0;
    sample[1] = block?.y[at] ?? 0;
    sample[2] = block?.z[at] ?? 0;
  }

  /** First index whose time is at least `timeS` (times do not decrease by more than jitter: searched from the end). */
  indexAt(timeS: number): number {
    let index = this.count;
    while (index > 0 && this.timeAt(index - 1) >= timeS) index -= 1;
    return index;
  }

  /** Copy of samples [from, to), stamps shifted by `originS`. */
  slice(from: number, to: number, originS = 0): Pick<Recording, 'timeS' | 'accelerationMps2'> {
    const length = Math.max(0, to - from);
    const out = {
      timeS: new Float64Array(length),
      accelerationMps2: AXES.map(() => new Float32Array(length)),
    };
    this.copy(from, to, out.timeS, out.accelerationMps2);
    if (originS !== 0) for (let i = 0; i < length; i += 1) out.timeS[i] = out.timeS[i]! - originS;
    return out;
  }

  /** Copies samples [from, to) to the start of given arrays. */
  copy(from: number, to: number, timeS: Float64Array, axes: readonly Float32Array[]): void {
    for (let at = from; at < to;) {
      const block = this.#blocks[Math.floor(at / BLOCK_COUNT)]!;
      const first = at % BLOCK_COUNT;
      const last = Math.min(BLOCK_COUNT, first + to - at);
      timeS.set(block.timeS.subarray(first, last), at - from);
      axes[0]!.set(block.x.subarray(first, last), at - from);
      axes[1]!.set(block.y.subarray(first, last), at - from);
      axes[2]!.set(block.z.subarray(first, last), at - from);
      at += last - first;
    }
  }

  /** Drops all but the newest samples, while nothing is recorded. Returns how many went. */
  keepNewest(count: number): number {
    const dropped = this.count - count;
    if (dropped <= 0) return 0;
    const kept = this.slice(dropped, this.count);
    this.#blocks = [newBlock()];
    this.count = 0;
    for (let i = 0; i < count; i += 1) {
      const [x, y, z] = kept.accelerationMps2;
      this.push(kept.timeS[i]!, x![i]!, y![i]!, z![i]!);
    }
    return dropped;
  }
}

function newBlock(): Block {
  return {
    timeS: new Float64Array(BLOCK_COUNT),
    x: new Float32Array(BLOCK_COUNT),
    y: new Float32Array(BLOCK_COUNT),
    z: new Float32Array(BLOCK_COUNT),
  };
}
