import type { LiveWindow, SessionState } from '../app/ports.ts';
import type { InterruptionCode, Recording } from '../core/model/recording.ts';
import type { CaptureEnvironment } from './capture-environment.ts';
import type { JournalWriter } from './journal-writer.ts';
import { createLiveView } from './live-view.ts';
import { MotionObserver, type Observed } from './motion-observer.ts';
import { AXES, SampleBuffer } from './sample-buffer.ts';
import type { SampleSource } from './sensor-source.ts';

/** Time between two samples that is flagged as a loss, s. */
const LONG_GAP_S = 1;
/** No sample for this long: the sensor is gone, ms. */
const SILENCE_MS = 3000;
/** While nothing is recorded only the newest samples are kept: about three minutes, cut to one. */
const WAITING_COUNT = 12_000;
const WAITING_KEPT_COUNT = 4000;
/** Share of gravity along z from which the screen is taken to face up, m/s². */
const FLAT_MPS2 = 7;

export interface Losses {
  readonly hasLongGap: boolean;
  readonly isSilent: boolean;
}

/** One opened sensor with its samples, and the recording that is cut out of them. */
export class SensorRun {
  readonly source: SampleSource;
  readonly buffer = new SampleBuffer();
  readonly observer = new MotionObserver(this.buffer);
  /** What has to be undone at the end: listeners, timers, the sensor. */
  readonly stops: (() => void)[] = [];
  readonly startedMs: number;
  observed: Observed = this.observer.advance();
  writer: JournalWriter | undefined;
  readonly #view = createLiveView(this.buffer);
  readonly #screenAngleDeg: number | undefined;
  #firstIndex = 0;
  #startedAt: string | undefined;
  #seenCount = 0;
  #seenMs: number;

  constructor(source: SampleSource, environment: CaptureEnvironment) {
    this.source = source;
    this.startedMs = environment.nowMs();
    this.#seenMs = this.startedMs;
    this.#screenAngleDeg = environment.screenAngleDeg();
  }

  get newestS(): number {
    return this.buffer.count === 0 ? 0 : this.buffer.timeAt(this.buffer.count - 1);
  }

  stop(): void {
    this.stops.splice(0).forEach((stop) => stop());
  }

  /** Holes in the stamps since the last look, or silence. A stall of the page explains both. */
  lookForLosses(nowMs: number, isStalled: boolean): Losses {
    const { buffer } = this;
    const before = this.#seenCount;
    if (buffer.count > before || isStalled) this.#seenMs = nowMs;
    this.#seenCount = buffer.count;
    let hasLongGap = false;
    for (let i = Math.max(1, before); i < buffer.count && !isStalled; i += 1) {
      hasLongGap ||= buffer.timeAt(i) - buffer.timeAt(i - 1) > LONG_GAP_S;
    }
    return { hasLongGap, isSilent: nowMs - this.#seenMs > SILENCE_MS };
  }

  /** Forgets old samples while nothing is recorded. */
  trim(): void {
    if (this.buffer.count < WAITING_COUNT) return;
    this.observer.shifted(this.buffer.keepNewest(WAITING_KEPT_COUNT));
    this.#seenCount = this.buffer.count;
  }

  /** The recording begins at sensor time `fromS`. Returns the index of its first sample. */
  beginRecording(fromS: number, wallMs: number, tapCount: number): number {
    this.#firstIndex = this.buffer.indexAt(fromS);
    this.#startedAt = new Date(wallMs - 1000 * (this.newestS - fromS)).toISOString();
    this.observer.restart(tapCount);
    return this.#firstIndex;
  }

  /** Facts of the recording that runs. */
  meta(): Pick<Recording, 'startedAt' | 'sensor' | 'axes'> {
    return {
      ...(this.#startedAt === undefined ? {} : { startedAt: this.#startedAt }),
      sensor: {
        ...this.source.describe(),
        ...(this.#screenAngleDeg === undefined ? {} : { screenAngleDeg: this.#screenAngleDeg }),
        ...this.#gravityReads(),
      },
      axes: AXES,
    };
  }

  /** The samples up to sensor time `untilS`, stamps from the first one; undefined when there are none. */
  recording(untilS: number, interruption: InterruptionCode | undefined): Recording | undefined {
    const { buffer } = this;
    const first = this.#firstIndex;
    const last = Math.min(buffer.count, buffer.indexAt(untilS) + 1);
    if (last <= first) return undefined;
    const { sensor, ...meta } = this.meta();
    return {
      ...meta,
      sensor: interruption === undefined ? sensor : { ...sensor, interruption },
      ...buffer.slice(first, last, buffer.timeAt(first)),
    };
  }

  view(phase: SessionState['phase'], fromS: number): LiveWindow {
    return this.#view(this.observed, phase, fromS);
  }

  #gravityReads(): { readonly gravityReads?: 'up' | 'down' } {
    const count = Math.min(60, this.buffer.count);
    const sample = new Float64Array(3);
    let mean = 0;
    for (let i = this.buffer.count - count; i < this.buffer.count; i += 1) {
      this.buffer.read(i, sample);
      mean += sample[2]! / count;
    }
    if (Math.abs(mean) < FLAT_MPS2) return {};
    return { gravityReads: mean > 0 ? 'up' : 'down' };
  }
}
