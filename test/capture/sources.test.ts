import { afterEach, describe, it, expect, vi } from 'vitest';
import { createAccelerometerSource, hasAccelerometer } from '../../src/capture/accelerometer-source.ts';
import { createMotionEventSource, hasMotionEvents } from '../../src/capture/motion-event-source.ts';
import { askForMotion } from '../../src/capture/motion-permission.ts';

afterEach(() => vi.unstubAllGlobals());

const heard = () => {
  const samples: number[][] = [];
  const problems: string[] = [];
  return {
    samples,
    problems,
    events: {
      onSample: (...sample: number[]) => samples.push(sample),
      onProblem: (problem: string) => problems.push(problem),
    },
  };
};

class FakeAccelerometer extends EventTarget {
  static last: FakeAccelerometer | undefined;
  static failure: string | undefined;
  timestamp: number | null = null;
  x: number | null = 1;
  y: number | null = 2;
  z: number | null = 3;
  isRunning = false;
  readonly options: unknown;
  constructor(options: unknown) {
    super();
    if (FakeAccelerometer.failure !== undefined)
      throw Object.assign(new Error(), { name: FakeAccelerometer.failure });
    this.options = options;
    FakeAccelerometer.last = this;
  }
  start() {
    this.isRunning = true;
  }
  stop() {
    this.isRunning = false;
  }
  read(timestamp: number) {
    this.timestamp = timestamp;
    this.dispatchEvent(new Event('reading'));
  }
}

describe('createAccelerometerSource', () => {
  it('asks for 60 readings a second in device axes and passes on stamps and values', () => {
    FakeAccelerometer.failure = undefined;
    vi.stubGlobal('Accelerometer', FakeAccelerometer);
    expect(hasAccelerometer()).toBe(true);
    const source = createAccelerometerSource('agent');
    const { samples, events } = heard();
    source.start(events);
    const sensor = FakeAccelerometer.last!;
    expect(sensor.options).toEqual({ frequency: 60, referenceFrame: 'device' });
    sensor.dispatchEvent(new Event('reading'));
    sensor.read(12.5);
    expect(samples).toEqual([[12.5, 1, 2, 3]]);
    source.stop();
    expect(sensor.isRunning).toBe(false);
    sensor.read(20);
    expect(samples).toHaveLength(1);
  });

  it.each([
    ['NotAllowedError', 'not-allowed'],
    ['NotReadableError', 'no-sensor'],
    ['SecurityError', 'blocked-by-policy'],
    ['AbortError', 'sensor-error'],
  ])('tells %s as %s, at construction and later', (name, problem) => {
    vi.stubGlobal('Accelerometer', FakeAccelerometer);
    const { problems, events } = heard();
    FakeAccelerometer.failure = name;
    createAccelerometerSource('agent').start(events);
    FakeAccelerometer.failure = undefined;
    createAccelerometerSource('agent').start(events);
    FakeAccelerometer.last!.dispatchEvent(Object.assign(new Event('error'), { error: { name } }));
    expect(problems).toEqual([problem, problem]);
  });
});

describe('createMotionEventSource', () => {
  const page = () => {
    const target = new EventTarget();
    vi.stubGlobal('window', target);
    vi.stubGlobal('DeviceMotionEvent', class {});
    return (x: number | null, timeStamp: number) => {
      const event = Object.assign(new Event('devicemotion'), {
        accelerationIncludingGravity: { x, y: x, z: x },
        interval: 16,
      });
      Object.defineProperty(event, 'timeStamp', { value: timeStamp });
      target.dispatchEvent(event);
    };
  };

  it('takes gravity and the stamp of the event, and notes the claimed interval', () => {
    const move = page();
    expect(hasMotionEvents()).toBe(true);
    const source = createMotionEventSource('agent');
    const { samples, events } = heard();
    source.start(events);
    move(9, 33);
    source.stop();
    move(9, 50);
    expect(samples).toEqual([[33, 9, 9, 9]]);
    expect(source.describe()).toEqual({
      source: 'devicemotion',
      practice: false,
      name: 'agent',
      claimedIntervalMs: 16,
    });
  });

  it('takes one event of nulls for "no sensor", and the missing class too', () => {
    const move = page();
    const { problems, events } = heard();
    createMotionEventSource('agent').start(events);
    move(null, 1);
    vi.stubGlobal('DeviceMotionEvent', undefined);
    createMotionEventSource('agent').start(events);
    expect(problems).toEqual(['no-sensor', 'no-sensor']);
  });
});

describe('askForMotion', () => {
  it.each([
    ['granted', 'granted'],
    ['denied', 'not-allowed'],
    ['prompt', 'not-allowed'],
    ['default', 'not-allowed'],
  ])('takes the answer "%s" for %s', async (answer, expected) => {
    vi.stubGlobal('DeviceMotionEvent', { requestPermission: () => Promise.resolve(answer) });
    expect(await askForMotion()).toBe(expected);
  });

  it('calls the browser at once, inside the tap, and takes a rejection for a refusal', async () => {
    let isCalled = false;
    vi.stubGlobal('DeviceMotionEvent', {
      requestPermission: () => {
        isCalled = true;
        return Promise.reject(new Error('no gesture'));
      },
    });
    const answer = askForMotion();
    expect(isCalled).toBe(true);
    expect(await answer).toBe('not-allowed');
  });

  it('needs no asking where the browser does not ask', async () => {
    vi.stubGlobal('DeviceMotionEvent', {});
    expect(await askForMotion()).toBe('granted');
  });
});
