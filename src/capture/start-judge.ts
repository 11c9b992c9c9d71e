import type { CaptureProblem } from '../app/ports.ts';
import type { SampleBuffer } from './sample-buffer.ts';

/** Samples that must have come, and how long they must span, before a sensor counts as running. */
const LEAST_COUNT = 12;
const LEAST_SPAN_S = 0.5;
/** Slower than this nothing of use can be measured: half of it is 10 Hz. */
export const SLOWEST_RATE_HZ = 20;
/** Acceleration at rest that says "a real sensor that happens to lie still within one rounding step", m/s². */
const AT_REST_MPS2 = [7, 12.5] as const;

/**
 * Whether the sensor runs: finite samples that change, or that stand still at one g. Undefined: too early to say.
 */
export function judgeStart(buffer: SampleBuffer): 'running' | CaptureProblem | undefined {
  const { count } = buffer;
  const spanS = count > 1 ? buffer.timeAt(count - 1) - buffer.timeAt(0) : 0;
  if (count < 4 || spanS < LEAST_SPAN_S) return undefined;
  if ((count - 1) / spanS < SLOWEST_RATE_HZ) return spanS >= 2 * LEAST_SPAN_S ? 'slow-sensor' : undefined;
  if (count < LEAST_COUNT) return undefined;
  return isAlive(buffer) ? 'running' : 'no-sensor';
}

function isAlive(buffer: SampleBuffer): boolean {
  const first = new Float64Array(3);
  const sample = new Float64Array(3);
  buffer.read(0, first);
  for (let i = 1; i < buffer.count; i += 1) {
    buffer.read(i, sample);
    if (sample.some((value, axis) => value !== first[axis])) return true;
  }
  const norm = Math.hypot(...first);
  return norm > AT_REST_MPS2[0] && norm < AT_REST_MPS2[1];
}
