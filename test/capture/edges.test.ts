import { afterEach, beforeEach, describe, it, expect, vi } from 'vitest';
import { browserCaptureEnvironment } from '../../src/capture/capture-environment.ts';
import { watchPermission } from '../../src/capture/motion-permission.ts';
import { watchPage } from '../../src/capture/page-watch.ts';
import { createLatePracticeSource } from '../../src/capture/late-practice-source.ts';
import { createPracticeSource } from '../../src/capture/practice-source.ts';
import { takeRecorderLock } from '../../src/capture/recorder-lock.ts';
import { holdWakeLock } from '../../src/capture/wake-lock.ts';

afterEach(() => {
  vi.unstubAllGlobals();
  vi.useRealTimers();
});
const settle = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('createPracticeSource', () => {
  beforeEach(() => vi.useFakeTimers());
  const collect = (query: string) => {
    const source = createPracticeSource(query, () => performance.now());
    const stamps: number[] = [];
    const problems: string[] = [];
    source.start({
      onSample: (stampMs) => stamps.push(stampMs),
      onProblem: (problem) => problems.push(problem),
    });
    return { source, stamps, problems };
  };

  it('delivers at its rate, and faster at its pace', () => {
    const { source, stamps } = collect('?rig=handrail');
    const quick = collect('?rig=handrail&pace=10');
    vi.advanceTimersByTime(2000);
    expect(stamps.length).toBeGreaterThan(115);
    expect(stamps.length).toBeLessThan(125);
    expect(quick.stamps.length / stamps.length).toBeCloseTo(10, 0);
    source.stop();
    vi.advanceTimersByTime(1000);
    expect(stamps.length).toBeLessThan(125);
    expect(source.describe()).toMatchObject({ source: 'practice', practice: true, name: '?rig=handrail' });
  });

  it('fails when it was told to', () => {
    const { stamps, problems } = collect('?rig=handrail&fail=1');
    vi.advanceTimersByTime(3000);
    expect(problems).toEqual(['sensor-error']);
    expect(stamps.length).toBeLessThan(64);
  });
});

describe('createLatePracticeSource', () => {
  it('is the rig once asked', async () => {
    const source = createLatePracticeSource('?rig=pump', () => performance.now());
    expect(source.describe()).toMatchObject({ practice: true, name: '?rig=pump' });
    expect(await source.ask()).toBe('granted');
    let count = 0;
    source.start({ onSample: () => (count += 1), onProblem: () => {} });
    source.act?.();
    await vi.waitFor(() => expect(count).toBeGreaterThan(3));
    source.stop();
  });
});

describe('holdWakeLock', () => {
  const wakeLock = () => {
    const sentinel = Object.assign(new EventTarget(), { release: vi.fn(() => Promise.resolve()) });
    vi.stubGlobal('navigator', { wakeLock: { request: () => Promise.resolve(sentinel) } });
    return sentinel;
  };

  it('tells when a visible page loses it, and nothing once let go', async () => {
    vi.stubGlobal('document', { visibilityState: 'visible' });
    const sentinel = wakeLock();
    let lostCount = 0;
    const letGo = holdWakeLock(() => (lostCount += 1));
    await settle();
    sentinel.dispatchEvent(new Event('release'));
    expect(lostCount).toBe(1);
    letGo();
    sentinel.dispatchEvent(new Event('release'));
    expect(lostCount).toBe(1);
    expect(sentinel.release).toHaveBeenCalled();
  });

  it('leaves a hidden page to say so itself, and lets a late lock go', async () => {
    vi.stubGlobal('document', { visibilityState: 'hidden' });
    const sentinel = wakeLock();
    const lost = vi.fn();
    holdWakeLock(lost);
    await settle();
    sentinel.dispatchEvent(new Event('release'));
    expect(lost).not.toHaveBeenCalled();
    const late = wakeLock();
    holdWakeLock(lost)();
    await settle();
    expect(late.release).toHaveBeenCalled();
  });

  it('does without where there is none or it is refused', async () => {
    vi.stubGlobal('navigator', {});
    holdWakeLock(() => {})();
    vi.stubGlobal('navigator', { wakeLock: { request: () => Promise.reject(new Error('battery')) } });
    holdWakeLock(() => {})();
    await settle();
  });
});

describe('takeRecorderLock', () => {
  it('takes the lock, tells when it is taken, and does without where there are none', async () => {
    let isHeld = false;
    vi.stubGlobal('navigator', {
      locks: {
        async request(
          _name: string,
          _options: object,
          use: (lock: object | null) => Promise<void> | undefined,
        ) {
          if (isHeld) return use(null);
          isHeld = true;
          await use({});
          isHeld = false;
        },
      },
    });
    const release = await takeRecorderLock();
    expect(await takeRecorderLock()).toBeUndefined();
    release?.();
    await settle();
    expect(await takeRecorderLock()).toBeDefined();
    vi.stubGlobal('navigator', {});
    expect(await takeRecorderLock()).toBeDefined();
  });
});

describe('watchPage', () => {
  it('tells of hiding, freezing and leaving, until stopped', () => {
    const page = Object.assign(new EventTarget(), { visibilityState: 'visible' });
    const frame = new EventTarget();
    vi.stubGlobal('document', page);
    vi.stubGlobal('window', frame);
    const reasons: string[] = [];
    const stop = watchPage((reason) => reasons.push(reason));
    page.dispatchEvent(new Event('visibilitychange'));
    page.visibilityState = 'hidden';
    page.dispatchEvent(new Event('visibilitychange'));
    page.dispatchEvent(new Event('freeze'));
    frame.dispatchEvent(new Event('pagehide'));
    stop();
    page.dispatchEvent(new Event('freeze'));
    expect(reasons).toEqual(['hidden', 'frozen', 'hidden']);
  });
});

describe('watchPermission', () => {
  it('tells when it is withdrawn, not when it is given, until stopped', async () => {
    const status = Object.assign(new EventTarget(), { state: 'granted' });
    vi.stubGlobal('navigator', { permissions: { query: () => Promise.resolve(status) } });
    let count = 0;
    const stop = watchPermission(() => (count += 1));
    await settle();
    status.dispatchEvent(new Event('change'));
    status.state = 'denied';
    status.dispatchEvent(new Event('change'));
    stop();
    status.dispatchEvent(new Event('change'));
    expect(count).toBe(1);
  });

  it('does without where the name is unknown', async () => {
    vi.stubGlobal('navigator', {
      permissions: { query: () => Promise.reject(new TypeError('no such name')) },
    });
    watchPermission(() => {})();
    await settle();
  });
});

describe('browserCaptureEnvironment', () => {
  const agent = (over: object) => vi.stubGlobal('navigator', { userAgent: 'agent', ...over });

  it('prefers the Generic Sensor, falls back on motion events, and takes the rig alone for practice', () => {
    agent({});
    vi.stubGlobal('DeviceMotionEvent', class {});
    vi.stubGlobal('Accelerometer', class {});
    const named = (practice?: string) =>
      browserCaptureEnvironment()
        .sources(practice)
        .map((source) => source.describe().source);
    expect(named()).toEqual(['accelerometer', 'devicemotion']);
    expect(named('?rig=pump')).toEqual(['practice']);
    vi.stubGlobal('Accelerometer', undefined);
    expect(named()).toEqual(['devicemotion']);
  });

  it('says beforehand whether a sensor can be there', () => {
    agent({});
    vi.stubGlobal('DeviceMotionEvent', class {});
    expect(browserCaptureEnvironment().support).toBe('likely');
    vi.stubGlobal('DeviceMotionEvent', undefined);
    vi.stubGlobal('isSecureContext', false);
    expect(browserCaptureEnvironment().support).toBe('insecure-page');
    vi.stubGlobal('isSecureContext', true);
    expect(browserCaptureEnvironment().support).toBe('none');
  });
});
