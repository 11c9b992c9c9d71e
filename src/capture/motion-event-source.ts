import { askForMotion } from './motion-permission.ts';
import type { SampleSource, SensorEvents } from './sensor-source.ts';

export function hasMotionEvents(): boolean {
  return typeof (globalThis as { DeviceMotionEvent?: unknown }).DeviceMotionEvent === 'function';
}

/**
 * Motion events, for browsers without the Generic Sensor API: the latest value, polled, so with repeats and late stamps.
 * Gravity included (the other is a product of fusion filters); stamps from the event; `interval` is false in most
 * browsers and only noted.
 */
export function createMotionEventSource(userAgent: string): SampleSource {
  let remove = (): void => {};
  let claimedIntervalMs: number | undefined;

  return {
    ask: askForMotion,

    start({ onSample, onProblem }: SensorEvents) {
      if (!hasMotionEvents()) {
        onProblem('no-sensor');
        return;
      }
      const onMotion = (event: DeviceMotionEvent): void => {
        const total = event.accelerationIncludingGravity;
        if (total === null || total.x === null || total.y === null || total.z === null) {
          // One event with nulls is how browsers say that there is none, or that it is not allowed.
          onProblem('no-sensor');
          return;
        }
        claimedIntervalMs ??= event.interval;
        onSample(event.timeStamp, total.x, total.y, total.z);
      };
      window.addEventListener('devicemotion', onMotion);
      remove = () => window.removeEventListener('devicemotion', onMotion);
    },

    stop() {
      remove();
      remove = () => {};
    },

    describe: () => ({
      source: 'devicemotion',
      practice: false,
      name: userAgent,
      ...(claimedIntervalMs === undefined ? {} : { claimedIntervalMs }),
    }),
  };
}
