import type { Page } from 'playwright-core';

/** One acceleration sample, gravity included, m/s², sensor axes. */
export type Sample = readonly [x: number, y: number, z: number];

export interface ScriptedSensorOptions {
  /**
   * `accelerometer`: the page's `Accelerometer` class is replaced; `devicemotion`: that class is taken away and motion
   * events are dispatched. Both carry exact time stamps and values without rounding.
   */
  readonly as: 'accelerometer' | 'devicemotion';
  readonly rateHz: number;
  /** What the sensor reads between plays; default face up at rest. */
  readonly rest?: Sample;
  /** Half-width of the uniform noise on every axis at rest and while playing, m/s²; default 0.002. */
  readonly noiseMps2?: number;
  /** How many times faster than real time samples and stamps run; default 1. */
  readonly speed?: number;
}

export interface ScriptedSensor {
  /** Plays samples one per sensor period, after whatever still plays; resolves when the last was delivered. */
  play(samples: readonly Sample[]): Promise<void>;
  /** Stops (or resumes) delivering anything, as a lost sensor does. */
  silence(silent?: boolean): Promise<void>;
  /** Samples delivered so far. */
  deliveredCount(): Promise<number>;
}

interface Rig {
  play(samples: readonly Sample[]): Promise<void>;
  silent: boolean;
  deliveredCount: number;
}
type RigWindow = Window & { thrumbookRig?: Rig };

/** Puts a scripted sensor into every page that `page` loads from now on: call it before `page.goto`. */
export async function scriptSensor(page: Page, options: ScriptedSensorOptions): Promise<ScriptedSensor> {
  // tsx wraps named functions in a helper of this name, which a page does not have.
  await page.addInitScript('globalThis.__name ??= (value) => value;');
  await page.addInitScript(installRig, {
    as: options.as,
    periodMs: 1000 / options.rateHz,
    rest: options.rest ?? ([0, 0, 9.81] as const),
    noise: options.noiseMps2 ?? 0.002,
    speed: options.speed ?? 1,
  });
  return {
    play: (samples) => page.evaluate((list) => (window as RigWindow).thrumbookRig!.play(list), samples),
    silence: (silent = true) =>
      page.evaluate((value) => void ((window as RigWindow).thrumbookRig!.silent = value), silent),
    deliveredCount: () => page.evaluate(() => (window as RigWindow).thrumbookRig!.deliveredCount),
  };
}

/** Runs in the page before its scripts: must not use anything outside itself. */
function installRig(options: {
  as: ScriptedSensorOptions['as'];
  periodMs: number;
  rest: Sample;
  noise: number;
  speed: number;
}): void {
  const { as, periodMs, rest, noise, speed } = options;
  const queue: Sample[] = [];
  const waiting: { atCount: number; done: () => void }[] = [];
  let queuedCount = 0;
  let playedCount = 0;
  let seed = 12345;
  const uniform = () => {
    // Park & Miller 1988: the same noise in every run.
    seed = (seed * 48271) % 2147483647;
    return (seed / 2147483647) * 2 - 1;
  };
  const rig: Rig = {
    silent: false,
    deliveredCount: 0,
    play: (samples) => {
      queue.push(...samples);
      queuedCount += samples.length;
      const atCount = queuedCount;
      return new Promise((done) => waiting.push({ atCount, done }));
    },
  };
  (window as RigWindow).thrumbookRig = rig;

  /** Calls `deliver` for every sample that is due; returns how to end it. */
  const run = (deliver: (stampMs: number, sample: Sample) => void): (() => void) => {
    const startMs = performance.now();
    let index = 0;
    const timer = setInterval(() => {
      const dueCount = Math.floor(((performance.now() - startMs) * speed) / periodMs);
      for (; index < dueCount; index++) {
        if (rig.silent) continue;
        const isPlayed = queue.length > 0;
        const clean = queue.shift() ?? rest;
        const noisy = clean.map((value) => value + noise * uniform()) as unknown as Sample;
        deliver(startMs + index * periodMs, noisy);
        rig.deliveredCount++;
        if (isPlayed) playedCount++;
        while (waiting[0] && waiting[0].atCount <= playedCount) waiting.shift()!.done();
      }
    }, 4);
    return () => clearInterval(timer);
  };

  if (as === 'accelerometer') {
    class ScriptedAccelerometer extends EventTarget {
      x: number | null = null;
      y: number | null = null;
      z: number | null = null;
      timestamp: number | null = null;
      activated = false;
      hasReading = false;
      onreading: ((event: Event) => void) | null = null;
      onactivate: ((event: Event) => void) | null = null;
      onerror: ((event: Event) => void) | null = null;
      #end: (() => void) | undefined;
      start() {
        if (this.#end) return;
        this.#end = run((stampMs, [x, y, z]) => {
          if (!this.activated) {
            this.activated = true;
            this.#tell('activate');
          }
          this.hasReading = true;
          Object.assign(this, { x, y, z, timestamp: stampMs });
          this.#tell('reading');
        });
      }
      stop() {
        this.#end?.();
        this.#end = undefined;
        this.activated = false;
        this.hasReading = false;
      }
      #tell(type: 'activate' | 'reading') {
        const event = new Event(type);
        this.dispatchEvent(event);
        (type === 'reading' ? this.onreading : this.onactivate)?.call(this, event);
      }
    }
    Object.defineProperty(window, 'Accelerometer', {
      value: ScriptedAccelerometer,
      configurable: true,
      writable: true,
    });
    return;
  }
  Reflect.deleteProperty(window, 'Accelerometer');
  // Without a real sensor Chromium sends one event of nulls, which here would be a second source.
  window.addEventListener(
    'devicemotion',
    (event) => {
      if (event.isTrusted) event.stopImmediatePropagation();
    },
    true,
  );
  run((stampMs, [x, y, z]) => {
    const event = new DeviceMotionEvent('devicemotion', {
      acceleration: null as unknown as DeviceMotionEventAccelerationInit,
      accelerationIncludingGravity: { x, y, z },
      rotationRate: null as unknown as DeviceMotionEventRotationRateInit,
      interval: 16,
    });
    Object.defineProperty(event, 'timeStamp', { value: stampMs });
    window.dispatchEvent(event);
  });
}
