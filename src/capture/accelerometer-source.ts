import type { CaptureProblem } from '../app/ports.ts';
import { askForMotion } from './motion-permission.ts';
import type { SampleSource, SensorEvents } from './sensor-source.ts';

/** The Generic Sensor API as far as used (W3C Accelerometer). */
interface GenericAccelerometer extends EventTarget {
  readonly timestamp: number | null;
  readonly x: number | null;
  readonly y: number | null;
  readonly z: number | null;
  start(): void;
  stop(): void;
}
type AccelerometerClass = new (options: {
  frequency: number;
  referenceFrame: 'device';
}) => GenericAccelerometer;

/** Readings a second that are asked for: the most that browsers give (they default to 5-10). */
export const REQUESTED_RATE_HZ = 60;

export function hasAccelerometer(): boolean {
  return typeof (globalThis as { Accelerometer?: unknown }).Accelerometer === 'function';
}

/** Acceleration with the sensor's own time stamps: no repeats, the first choice where it exists. */
export function createAccelerometerSource(userAgent: string): SampleSource {
  let sensor: GenericAccelerometer | undefined;
  let remove = (): void => {};

  return {
    ask: askForMotion,

    start({ onSample, onProblem }: SensorEvents) {
      try {
        const { Accelerometer } = globalThis as unknown as { Accelerometer: AccelerometerClass };
        sensor = new Accelerometer({ frequency: REQUESTED_RATE_HZ, referenceFrame: 'device' });
      } catch (error) {
        onProblem(problemOf(error));
        return;
      }
      const running = sensor;
      const onReading = (): void => {
        const { timestamp, x, y, z } = running;
        if (timestamp === null || x === null || y === null || z === null) return;
        onSample(timestamp, x, y, z);
      };
      const onError = (event: Event): void => onProblem(problemOf((event as { error?: unknown }).error));
      running.addEventListener('reading', onReading);
      running.addEventListener('error', onError);
      remove = () => {
        running.removeEventListener('reading', onReading);
        running.removeEventListener('error', onError);
      };
      running.start();
    },

    stop() {
      remove();
      sensor?.stop();
      sensor = undefined;
    },

    describe: () => ({
      source: 'accelerometer',
      practice: false,
      name: userAgent,
      requestedRateHz: REQUESTED_RATE_HZ,
    }),
  };
}

function problemOf(error: unknown): CaptureProblem {
  const name = typeof error === 'object' && error !== null && 'name' in error ? String(error.name) : '';
  if (name === 'NotAllowedError') return 'not-allowed';
  if (name === 'SecurityError') return 'blocked-by-policy';
  if (name === 'NotReadableError' || name === 'ReferenceError' || name === 'NotSupportedError')
    return 'no-sensor';
  return 'sensor-error';
}
