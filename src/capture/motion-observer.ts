import { roundingStep } from '../core/signal/sensor-facts.ts';
import type { SampleBuffer } from './sample-buffer.ts';

/*
 * What the live view needs to know while samples come: level, rest, taps, clipping. Coarse on purpose, it guides the
 * person; the analysis finds its taps by itself. Runs in the tick, never in the sensor's handler.
 */

/** What is looked at together, s. */
const STEP_S = 0.1;
/** Length of one level, s. */
const LEVEL_S = 1;
/** At rest: levels of three seconds in a row within this factor (a steady machine counts as rest). */
const STEADY_RATIO = 1.6;
/** Below this rms it is rest whatever the trend, m/s²: hand tremor on a rail is ten times as much (our own trials with the rig). */
const QUIET_MPS2 = 0.04;
/** Turn of the mean between two seconds above which the phone is still being moved, m/s²: about 1.5 degrees. */
const STILL_MPS2 = 0.25;
/** A tap stands out by this factor over the shaking just before it, and over the level at rest. */
const TAP_OVER_BEFORE = 1.6;
const TAP_OVER_REST = 4;
/** Weakest thing counted as a tap, m/s², and steps of the rounding. */
const TAP_FLOOR_MPS2 = 0.12;
const TAP_FLOOR_STEPS = 2.5;
/** Contact and first swings of one tap, s. */
const TAP_DEAD_S = 0.4;
/** "Just before" ends this long ago, s (a tap needs some samples to rise), and fades with this time constant, s. */
const RISE_S = 0.06;
const MEMORY_S = 1;
/** Time constant of the mean that carries gravity, s. */
const MEAN_S = 0.7;
/** Amplitude that the fit needs over the rounding step (platform facts: decays are fitted above 3 steps). */
const WEAK_TAP_STEPS = 8;
/** Lowest full scale of a phone's sensor, 2 g, less 1 %: equal extremes above it are clipping. */
const CLIP_MPS2 = 19.4;
/** Gravity turned by more than this since the recording began: the phone moved. */
const MOVED_MPS2 = 0.35;

export interface Observed {
  readonly levelMps2: number;
  readonly isSettled: boolean;
  readonly tapCount: number;
  readonly tapAtS: number | undefined;
  readonly isClipped: boolean;
  readonly isWeak: boolean;
  readonly hasMoved: boolean;
  readonly stepMps2: number;
}

export class MotionObserver {
  readonly #buffer: SampleBuffer;
  readonly #sample = new Float64Array(3);
  readonly #mean = new Float64Array(3);
  readonly #sum = new Float64Array(3);
  #square = 0;
  #secondCount = 0;
  #secondFromS = Number.NaN;
  #levels: number[] = [];
  #means: number[][] = [];
  #reference: readonly number[] | undefined;
  #next = 0;
  #lastS = Number.NaN;
  #before = 0;
  #rising: { readonly timeS: number; readonly deviation: number }[] = [];
  #quiet = 0;
  #deadUntilS = -Infinity;
  #tapCount = 0;
  #tapAtS: number | undefined;
  #tapPeak = 0;
  #clippedRun = 0;
  #lastExtreme = 0;
  #isClipped = false;
  #stepMps2 = 0;
  /** Level at rest, while at rest. */
  #restLevel: number | undefined;

  constructor(buffer: SampleBuffer) {
    this.#buffer = buffer;
  }

  /** The buffer dropped its oldest samples. */
  shifted(count: number): void {
    this.#next = Math.max(0, this.#next - count);
  }

  /** Taps, clipping and the phone's position count from here: a recording begins. */
  restart(tapCount: number): void {
    this.#tapCount = tapCount;
    this.#isClipped = false;
    this.#reference = this.#means.at(-1);
  }

  /** Whether samples wait to be looked at. */
  get isBehind(): boolean {
    return this.#next < this.#buffer.count;
  }

  /** Time of the newest sample looked at, s. */
  get seenS(): number {
    return this.#lastS;
  }

  /** Looks at the next tenth of a second of samples: taps and rest are judged in small steps, however fast they come. */
  advance(): Observed {
    const untilS = this.#next < this.#buffer.count ? this.#buffer.timeAt(this.#next) + STEP_S : 0;
    for (; this.isBehind && this.#buffer.timeAt(this.#next) < untilS; this.#next += 1) this.#look(this.#next);
    const [level = 0] = this.#levels.slice(-1);
    return {
      levelMps2: level,
      isSettled: this.#restLevel !== undefined,
      tapCount: this.#tapCount,
      tapAtS: this.#tapAtS,
      isClipped: this.#isClipped,
      isWeak: this.#tapCount > 0 && this.#tapPeak < WEAK_TAP_STEPS * this.#stepMps2,
      hasMoved: this.#hasMoved(),
      stepMps2: this.#stepMps2,
    };
  }

  #look(index: number): void {
    const timeS = this.#buffer.timeAt(index);
    const sample = this.#sample;
    this.#buffer.read(index, sample);
    if (Number.isNaN(this.#lastS)) {
      this.#mean.set(sample);
      this.#secondFromS = timeS;
      this.#lastS = timeS;
    }
    const gapS = Math.max(0, timeS - this.#lastS);
    this.#lastS = timeS;
    const deviation = this.#deviation(gapS);
    this.#lookForClipping();
    this.#lookForTap(timeS, gapS, deviation);
    this.#addToSecond(timeS, index);
  }

  #deviation(gapS: number): number {
    const share = Math.min(1, gapS / MEAN_S);
    let square = 0;
    for (let axis = 0; axis < 3; axis += 1) {
      const off = this.#sample[axis]! - this.#mean[axis]!;
      square += off * off;
      this.#mean[axis] = this.#mean[axis]! + share * off;
    }
    return Math.sqrt(square);
  }

  #lookForClipping(): void {
    const extreme = Math.max(...this.#sample.map(Math.abs));
    this.#clippedRun = extreme >= CLIP_MPS2 && extreme === this.#lastExtreme ? this.#clippedRun + 1 : 0;
    this.#lastExtreme = extreme;
    if (this.#clippedRun >= 1) this.#isClipped = true;
  }

  #lookForTap(timeS: number, gapS: number, deviation: number): void {
    const threshold = Math.max(
      TAP_OVER_BEFORE * this.#before,
      TAP_OVER_REST * this.#quiet,
      TAP_FLOOR_MPS2,
      TAP_FLOOR_STEPS * this.#stepMps2,
    );
    if (timeS < this.#deadUntilS) this.#tapPeak = Math.max(this.#tapPeak, deviation);
    else if (deviation > threshold && this.#levels.length > 1) {
      this.#tapCount += 1;
      this.#tapAtS = timeS;
      this.#tapPeak = deviation;
      this.#deadUntilS = timeS + TAP_DEAD_S;
    }
    this.#rising.push({ timeS, deviation });
    this.#before *= Math.exp(-gapS / MEMORY_S);
    while (this.#rising.length > 0 && this.#rising[0]!.timeS < timeS - RISE_S) {
      this.#before = Math.max(this.#rising.shift()!.deviation, this.#before);
    }
  }

  #addToSecond(timeS: number, index: number): void {
    if (timeS - this.#secondFromS >= LEVEL_S) this.#closeSecond(timeS, index);
    let square = 0;
    for (let axis = 0; axis < 3; axis += 1) {
      this.#sum[axis] = this.#sum[axis]! + this.#sample[axis]!;
      square += this.#sample[axis]! ** 2;
    }
    this.#square += square;
    this.#secondCount += 1;
  }

  #closeSecond(timeS: number, index: number): void {
    const count = Math.max(1, this.#secondCount);
    const means = [...this.#sum].map((sum) => sum / count);
    const variance = this.#square / count - means.reduce((sum, mean) => sum + mean * mean, 0);
    this.#levels = [...this.#levels.slice(-3), Math.sqrt(Math.max(0, variance))];
    this.#means = [...this.#means.slice(-3), means];
    this.#quiet = Math.min(...this.#levels);
    this.#sum.fill(0);
    this.#square = 0;
    this.#secondCount = 0;
    this.#secondFromS = timeS;
    this.#measureStep(index);
    this.#judgeRest();
  }

  /** Rounding step from the newest 4 s; once found it stays, because a quiet phone shows too few values. */
  #measureStep(index: number): void {
    const from = Math.max(0, index - 240);
    if (index - from < 30) return;
    const { accelerationMps2 } = this.#buffer.slice(from, index);
    const found = Math.max(...accelerationMps2.map(roundingStep));
    if (found > 0) this.#stepMps2 = found;
  }

  /** Rest is reached when the level no longer falls, and left when it rises or the phone turns: it may fall further. */
  #judgeRest(): void {
    const [before, middle, now] = this.#levels.slice(-3);
    if (before === undefined || middle === undefined || now === undefined) return;
    const quiet = QUIET_MPS2 + 0.6 * this.#stepMps2;
    const isTurning = distance(this.#means.at(-1)!, this.#means.at(-2)!) > STILL_MPS2;
    if (this.#restLevel !== undefined) {
      const isRising = now > STEADY_RATIO * Math.max(this.#restLevel, quiet);
      this.#restLevel = isRising || isTurning ? undefined : Math.min(this.#restLevel, now);
      return;
    }
    const levels = [before, middle, now];
    const isSteady =
      Math.max(...levels) < STEADY_RATIO * Math.min(...levels) || Math.max(now, middle) < quiet;
    if (isSteady && !isTurning) this.#restLevel = now;
  }

  #hasMoved(): boolean {
    const now = this.#means.at(-1);
    if (this.#reference === undefined || now === undefined) return false;
    return distance(this.#reference, now) > MOVED_MPS2;
  }
}

function distance(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(...a.map((value, i) => value - b[i]!));
}
