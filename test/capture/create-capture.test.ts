import { describe, it, expect } from 'vitest';
import type { SessionOptions } from '../../src/app/ports.ts';
import { phoneCheck } from '../../src/core/phone-check.ts';
import { createCapture } from '../../src/capture/create-capture.ts';
import { fakeCaptureEnvironment, type Signal } from '../support/fake-capture-environment.ts';
import { memoryJournal } from '../support/memory-journal.ts';

const BY_HAND: SessionOptions = { durationS: 10, startBy: 'hand' };

/** Sensor noise so that values change, no motion. */
const still: Signal = (t) => [
  0.01 * Math.sin(977 * t),
  0.01 * Math.sin(1201 * t),
  9.81 + 0.01 * Math.sin(1409 * t),
];

function setUp(signal: Signal = still) {
  const { environment, phone } = fakeCaptureEnvironment(signal);
  const journal = memoryJournal();
  const capture = createCapture({
    journal: journal.journal,
    checkPhone: async (recording, checkedAt) => phoneCheck(recording, checkedAt),
    environment,
  });
  const phases: string[] = [];
  capture.subscribe(({ phase }) => {
    if (phases.at(-1) !== phase) phases.push(phase);
  });
  return { capture, phone, journal, phases };
}

async function recordingOf(options: SessionOptions = BY_HAND, signal: Signal = still) {
  const parts = setUp(signal);
  await parts.capture.open(options);
  parts.phone.pass(5);
  if (options.startBy === 'hand') parts.capture.start();
  return parts;
}

describe('createCapture', () => {
  it('goes from asking over settling and recording to done, and lets everything go', async () => {
    const { capture, phone, phases, journal } = await recordingOf();
    phone.pass(10.2);
    await phone.settle();
    expect(phases).toEqual(['asking', 'settling', 'recording', 'done']);
    const { state } = capture;
    if (state.phase !== 'done') throw new Error(state.phase);
    const { timeS, sensor } = state.recording;
    expect(timeS[0]).toBe(0);
    expect(timeS.at(-1)).toBeGreaterThan(9.95);
    expect(timeS.at(-1)).toBeLessThanOrEqual(10);
    expect(sensor).toMatchObject({ practice: false, gravityReads: 'up', screenAngleDeg: 0 });
    expect(phone.log).toMatchObject({ isRecorderHeld: false, isSensorOn: false });
    expect(journal.chunks.reduce((sum, chunk) => sum + chunk.timeS.length, 0)).toBeGreaterThanOrEqual(
      timeS.length,
    );
  });

  it('journals every second, in order, with the stamps of the recording', async () => {
    const { phone, journal } = await recordingOf();
    phone.pass(4.5);
    await phone.settle();
    expect(journal.chunks.map(({ sequence }) => sequence)).toEqual([0, 1, 2, 3]);
    const stamps = journal.chunks.flatMap(({ timeS }) => [...timeS]);
    expect(stamps[0]).toBe(0);
    expect(4.5 - stamps.at(-1)!).toBeLessThan(1.1);
  });

  it.each(['hidden', 'frozen'] as const)('keeps what there is when the page is %s', async (reason) => {
    const { capture, phone } = await recordingOf();
    phone.pass(4);
    phone.interrupt(reason);
    await phone.settle();
    const { state } = capture;
    if (state.phase !== 'cut') throw new Error(state.phase);
    expect(state.reason).toBe(reason);
    expect(state.recording?.sensor.interruption).toBe(reason);
    expect(state.recording?.timeS.at(-1)).toBeCloseTo(4, 1);
    expect(state.journalId).toBe('J');
  });

  it('is cut without samples when the page is hidden before anything is recorded', async () => {
    const { capture, phone } = setUp();
    await capture.open(BY_HAND);
    phone.pass(2);
    phone.interrupt('hidden');
    await phone.settle();
    expect(capture.state).toEqual({ phase: 'cut', reason: 'hidden', recording: undefined, journalId: '' });
    expect(phone.log).toMatchObject({ isRecorderHeld: false, isSensorOn: false });
  });

  it('cuts when the sensor fails, goes silent, or the permission is withdrawn', async () => {
    const failed = await recordingOf();
    failed.phone.pass(2);
    failed.phone.problem('sensor-error');
    await failed.phone.settle();
    expect(failed.capture.state).toMatchObject({ phase: 'cut', reason: 'sensor-error' });

    const silent = await recordingOf();
    silent.phone.pass(2);
    silent.phone.isDelivering = false;
    silent.phone.pass(3.3);
    await silent.phone.settle();
    expect(silent.capture.state).toMatchObject({ phase: 'cut', reason: 'long-gap' });

    const withdrawn = await recordingOf();
    withdrawn.phone.pass(2);
    withdrawn.phone.withdraw();
    await withdrawn.phone.settle();
    expect(withdrawn.capture.state).toMatchObject({ phase: 'cut', reason: 'permission-withdrawn' });
  });

  it('flags a stall, a hole and a lost screen lock, and goes on', async () => {
    const { capture, phone, journal } = await recordingOf();
    phone.pass(2);
    phone.stall(1);
    phone.pass(2);
    phone.isDelivering = false;
    phone.pass(1.5);
    phone.isDelivering = true;
    phone.pass(1);
    phone.loseScreen();
    expect(capture.state).toMatchObject({
      phase: 'recording',
      flags: ['main-thread-stall', 'long-gap', 'wake-lock-lost'],
    });
    await phone.settle();
    expect(journal.flags).toEqual(['main-thread-stall', 'long-gap', 'wake-lock-lost']);
  });

  it('goes on in memory when the journal fails', async () => {
    const { capture, phone, journal } = setUp();
    journal.state.isBroken = true;
    await capture.open(BY_HAND);
    phone.pass(5);
    capture.start();
    phone.pass(1.5);
    await phone.settle();
    expect(capture.state).toMatchObject({ phase: 'recording', flags: ['storage-failed'] });
    phone.pass(9);
    await phone.settle();
    expect(capture.state).toMatchObject({ phase: 'done', journalId: '' });
  });

  it.each(['not-allowed', 'blocked-by-policy'] as const)('is refused: %s', async (permission) => {
    const { capture, phone } = setUp();
    phone.permission = permission;
    await capture.open(BY_HAND);
    expect(capture.state).toEqual({ phase: 'refused', problem: permission });
    expect(phone.log.isRecorderHeld).toBe(false);
  });

  it('is refused without a sensor, with a frozen one, a silent one and a slow one', async () => {
    const absent = setUp();
    absent.phone.isSensorThere = false;
    await absent.capture.open(BY_HAND);
    expect(absent.capture.state).toEqual({ phase: 'refused', problem: 'no-sensor' });

    const zeros = setUp(() => [0, 0, 0]);
    await zeros.capture.open(BY_HAND);
    zeros.phone.pass(1);
    expect(zeros.capture.state).toEqual({ phase: 'refused', problem: 'no-sensor' });

    const silent = setUp();
    silent.phone.isDelivering = false;
    await silent.capture.open(BY_HAND);
    silent.phone.pass(3.2);
    expect(silent.capture.state).toEqual({ phase: 'refused', problem: 'no-sensor' });

    const slow = setUp();
    slow.phone.rateHz = 10;
    await slow.capture.open(BY_HAND);
    slow.phone.pass(1.5);
    expect(slow.capture.state).toEqual({ phase: 'refused', problem: 'slow-sensor' });
  });

  it('takes a phone at rest within one rounding step for a running sensor', async () => {
    const { capture, phone } = setUp(() => [0, 0, 9.8]);
    await capture.open(BY_HAND);
    phone.pass(1);
    expect(capture.state.phase).toBe('settling');
  });

  it('is refused while another tab records, and can be tried again', async () => {
    const { capture, phone } = setUp();
    phone.isRecorderBusy = true;
    await capture.open(BY_HAND);
    expect(capture.state).toEqual({ phase: 'refused', problem: 'busy-elsewhere' });
    phone.isRecorderBusy = false;
    await capture.open(BY_HAND);
    phone.pass(1);
    expect(capture.state.phase).toBe('settling');
  });

  it('starts by timer once at rest', async () => {
    const shaking: Signal = (t) => {
      const [x, y, z] = still(t);
      return [x, y, z + 3 * Math.exp(-t / 1.5) * Math.sin(40 * t)];
    };
    const { capture, phone } = setUp(shaking);
    await capture.open({ durationS: 10, startBy: 'timer', timerS: 2 });
    phone.pass(3.5);
    expect(capture.state).toMatchObject({ phase: 'settling', settled: false });
    phone.pass(9);
    expect(capture.state.phase).toBe('recording');
  });

  it('starts by the first tap with the second before it, and counts taps', async () => {
    const taps = [6, 9, 12];
    const tapped: Signal = (t) => {
      const [x, y, z] = still(t);
      const ring = taps
        .filter((at) => t >= at)
        .reduce((sum, at) => sum + 1.2 * Math.exp(-(t - at) / 1.5) * Math.sin(46.5 * (t - at)), 0);
      return [x, y, z + ring];
    };
    const { capture, phone } = setUp(tapped);
    await capture.open({ durationS: 9, startBy: 'first-tap' });
    phone.pass(5.9);
    expect(capture.state).toMatchObject({ phase: 'settling', settled: true });
    phone.pass(7);
    expect(capture.state).toMatchObject({ phase: 'recording', tapCount: 3 });
    phone.pass(2);
    await phone.settle();
    const { state } = capture;
    if (state.phase !== 'done') throw new Error(state.phase);
    const { timeS, accelerationMps2 } = state.recording;
    const peakIndex = accelerationMps2[2]!.findIndex((value) => value > 10.3);
    expect(timeS[peakIndex]).toBeGreaterThan(0.9);
    expect(timeS[peakIndex]).toBeLessThan(1.2);
  });

  it('forgets on cancel, journal and all', async () => {
    const { capture, phone, journal } = await recordingOf();
    phone.pass(3);
    capture.cancel();
    await phone.settle();
    expect(capture.state).toEqual({ phase: 'idle' });
    expect(journal.dropped).toEqual(['J']);
    expect(phone.log).toMatchObject({ isRecorderHeld: false, isSensorOn: false });
  });

  it('checks the phone in 10 s at rest', async () => {
    const { capture, phone } = setUp();
    const outcome = capture.check();
    await phone.settle();
    phone.pass(11);
    const checked = await outcome;
    if (!checked.ok) throw new Error(checked.problem.code);
    expect(checked.value.rateHz).toBeCloseTo(60, 1);
    expect(checked.value.gravityMps2).toBeCloseTo(9.81, 2);
    expect(checked.value.smallestToneMps2).toBeGreaterThan(0);
    expect(capture.state).toEqual({ phase: 'idle' });
  });

  it('shows the newest seconds with figures', async () => {
    const { capture, phone } = await recordingOf();
    phone.pass(3);
    const live = capture.live();
    expect(live?.rateHz).toBeCloseTo(60, 0);
    expect(live?.elapsedS).toBeCloseTo(3, 1);
    expect(live?.length).toBeGreaterThan(400);
    expect(live?.timeS[live.length - 1]).toBeCloseTo(8, 1);
  });

  it('keeps only the newest samples while it waits', async () => {
    const { capture, phone } = setUp();
    await capture.open(BY_HAND);
    phone.pass(260);
    expect(capture.live()?.sampleCount).toBeLessThan(12_001);
    capture.start();
    phone.pass(10.2);
    await phone.settle();
    expect(capture.state).toMatchObject({ phase: 'done' });
  });
});
