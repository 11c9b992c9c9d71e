import type { CDPSession, Page } from 'playwright-core';
import type { Sample } from './scripted-sensor.ts';

/** All three are needed, or `devicemotion` never starts. */
const TYPES = ['accelerometer', 'linear-acceleration', 'gyroscope'] as const;

export interface SensorOverride {
  /** Feeds `sample(timeS)` to the browser's own sensor code at `rateHz` until `stop()`. Values get rounded there. */
  feed(sample: (timeS: number) => Sample, rateHz: number): { stop(): void };
  /** No sensor from now on: pages get one event of nulls, `Accelerometer` an error. */
  remove(): Promise<void>;
  provide(): Promise<void>;
}

/**
 * Trusted motion events through Chromium's virtual sensors. For permission and loss, not for accuracy.
 * `maximumFrequency`: readings a second that the sensor can do.
 */
export async function overrideSensors(
  page: Page,
  options: { readonly maximumFrequency?: number } = {},
): Promise<SensorOverride> {
  const session = await page.context().newCDPSession(page);
  const set = async (available: boolean) => {
    // Enabling twice throws, so each change begins with off.
    for (const type of TYPES) {
      await session.send('Emulation.setSensorOverrideEnabled', { enabled: false, type });
      await session.send('Emulation.setSensorOverrideEnabled', {
        enabled: true,
        type,
        metadata: { available, ...(available ? options : {}) },
      });
    }
  };
  await set(true);
  return {
    feed: (sample, rateHz) => feed(session, sample, rateHz),
    remove: () => set(false),
    provide: () => set(true),
  };
}

function feed(session: CDPSession, sample: (timeS: number) => Sample, rateHz: number): { stop(): void } {
  const startMs = performance.now();
  const timer = setInterval(() => {
    const [x, y, z] = sample((performance.now() - startMs) / 1000);
    const readings = {
      accelerometer: { x, y, z },
      'linear-acceleration': { x, y, z: z - 9.81 },
      gyroscope: { x: 0, y: 0, z: 0 },
    };
    for (const type of TYPES) {
      // The page may be gone by now; then there is nothing to feed.
      session
        .send('Emulation.setSensorOverrideReadings', { type, reading: { xyz: readings[type] } })
        .catch(() => clearInterval(timer));
    }
  }, 1000 / rateHz);
  return { stop: () => clearInterval(timer) };
}

/** Sets the answer to "may this page use the motion sensor?". */
export async function setMotionPermission(
  page: Page,
  origin: string,
  setting: 'granted' | 'denied' | 'prompt',
): Promise<void> {
  const session = await page.context().newCDPSession(page);
  for (const name of ['accelerometer', 'gyroscope']) {
    // The answer lasts as long as this session: detaching would give 'granted' back.
    await session.send('Browser.setPermission', { permission: { name }, setting, origin });
  }
}
