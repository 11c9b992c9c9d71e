import type { CaptureProblem } from '../../src/app/ports.ts';
import type { CaptureEnvironment } from '../../src/capture/capture-environment.ts';
import type { SampleSource, SensorEvents } from '../../src/capture/sensor-source.ts';
import type { InterruptionCode } from '../../src/core/model/recording.ts';

export type Signal = (timeS: number) => readonly [number, number, number];

/** A phone whose clock the test moves: a 60 Hz sensor that gives `signal`, and every way to be interrupted. */
export function fakeCaptureEnvironment(signal: Signal = () => [0, 0, 9.81]) {
  let nowMs = 0;
  let events: SensorEvents | undefined;
  let timers: { readonly periodMs: number; readonly work: () => void; nextMs: number }[] = [];
  let interrupt: ((reason: InterruptionCode) => void) | undefined;
  let withdraw: (() => void) | undefined;
  let loseScreen: (() => void) | undefined;
  const log = { acts: 0, isRecorderHeld: false, isSensorOn: false };
  const phone = {
    rateHz: 60,
    permission: 'granted' as 'granted' | CaptureProblem,
    isRecorderBusy: false,
    isSensorThere: true,
    isDelivering: true,
    log,
    /** Lets time pass: samples and timers in order, 1 ms at a time. */
    pass(durationS: number) {
      for (const endMs = nowMs + Math.round(durationS * 1000); nowMs < endMs;) {
        nowMs += 1;
        const isDue =
          Math.floor((nowMs * phone.rateHz) / 1000) > Math.floor(((nowMs - 1) * phone.rateHz) / 1000);
        if (isDue && phone.isDelivering) events?.onSample(nowMs, ...signal(nowMs / 1000));
        for (const timer of timers) {
          if (nowMs < timer.nextMs) continue;
          timer.nextMs = nowMs + timer.periodMs;
          timer.work();
        }
      }
    },
    /** The page is busy: no timer, no sample. */
    stall(durationS: number) {
      nowMs += Math.round(durationS * 1000);
    },
    /** Lets every promise that can settle do so. */
    settle: () => new Promise<void>((resolve) => setTimeout(resolve, 0)),
    interrupt: (reason: InterruptionCode) => interrupt?.(reason),
    withdraw: () => withdraw?.(),
    loseScreen: () => loseScreen?.(),
    problem: (problem: CaptureProblem) => events?.onProblem(problem),
  };

  const source: SampleSource = {
    ask: () => Promise.resolve(phone.permission),
    start(given) {
      log.isSensorOn = true;
      if (phone.isSensorThere) events = given;
      else given.onProblem('no-sensor');
    },
    stop() {
      log.isSensorOn = false;
      events = undefined;
    },
    describe: () => ({ source: 'accelerometer', practice: false, name: 'fake' }),
    act() {
      log.acts += 1;
    },
  };

  const environment: CaptureEnvironment = {
    support: 'likely',
    keepsScreenOn: true,
    sources: () => [source],
    takeRecorder() {
      if (phone.isRecorderBusy) return Promise.resolve(undefined);
      log.isRecorderHeld = true;
      return Promise.resolve(() => {
        log.isRecorderHeld = false;
      });
    },
    holdScreen(onLost) {
      loseScreen = onLost;
      return () => {
        loseScreen = undefined;
      };
    },
    watchPage(onInterrupted) {
      interrupt = onInterrupted;
      return () => {
        interrupt = undefined;
      };
    },
    watchPermission(onWithdrawn) {
      withdraw = onWithdrawn;
      return () => {
        withdraw = undefined;
      };
    },
    nowMs: () => nowMs,
    wallMs: () => Date.UTC(2026, 2, 1, 10) + nowMs,
    every(periodMs, work) {
      const timer = { periodMs, work, nextMs: nowMs + periodMs };
      timers.push(timer);
      return () => {
        timers = timers.filter((one) => one !== timer);
      };
    },
    screenAngleDeg: () => 0,
  };
  return { environment, phone };
}
