import type { LiveWindow, SessionState } from '../app/ports.ts';
import type { Observed } from './motion-observer.ts';
import { AXES, type SampleBuffer } from './sample-buffer.ts';

/** Seconds shown, and room for them at the fastest sensor that is drawn in full. */
const SHOWN_S = 10;
const ROOM_COUNT = 4096;

/** Figures and newest samples for drawing, on memory made once. */
export function createLiveView(
  buffer: SampleBuffer,
): (observed: Observed, phase: SessionState['phase'], fromS: number) => LiveWindow {
  const timeS = new Float64Array(ROOM_COUNT);
  const accelerationMps2 = AXES.map(() => new Float32Array(ROOM_COUNT));

  return (observed, phase, fromS) => {
    const { count } = buffer;
    const lastS = count > 0 ? buffer.timeAt(count - 1) : 0;
    const first = Math.max(count - ROOM_COUNT, buffer.indexAt(lastS - SHOWN_S));
    buffer.copy(first, count, timeS, accelerationMps2);
    const length = count - first;
    const spanS = length > 1 ? lastS - buffer.timeAt(first) : 0;
    const hint = hintOf(observed, phase);
    return {
      sampleCount: count,
      elapsedS: Math.max(0, lastS - fromS),
      timeS,
      accelerationMps2,
      length,
      rateHz: spanS > 0 ? (length - 1) / spanS : 0,
      levelMps2: observed.levelMps2,
      stepMps2: observed.stepMps2,
      tapCount: observed.tapCount,
      settled: observed.isSettled,
      clipped: observed.isClipped,
      ...(hint === undefined ? {} : { hint }),
    };
  };
}

function hintOf(observed: Observed, phase: SessionState['phase']): LiveWindow['hint'] {
  if (phase === 'settling') return observed.isSettled ? undefined : 'wait-to-settle';
  if (phase === 'checking') return observed.isSettled ? undefined : 'keep-still';
  if (phase !== 'recording') return undefined;
  if (observed.isClipped) return 'too-strong';
  if (observed.hasMoved) return 'keep-still';
  return observed.isWeak ? 'tap-harder' : undefined;
}
