import type { InterruptionCode } from '../core/model/recording.ts';
import { createAccelerometerSource, hasAccelerometer } from './accelerometer-source.ts';
import { createMotionEventSource, hasMotionEvents } from './motion-event-source.ts';
import { watchPermission } from './motion-permission.ts';
import { watchPage } from './page-watch.ts';
import { createLatePracticeSource } from './late-practice-source.ts';
import { takeRecorderLock } from './recorder-lock.ts';
import type { SampleSource } from './sensor-source.ts';
import { holdWakeLock } from './wake-lock.ts';

/** What capture takes from the browser: replaced in tests. */
export interface CaptureEnvironment {
  readonly support: 'likely' | 'none' | 'insecure-page';
  readonly keepsScreenOn: boolean;
  /** In order of preference; the first that delivers is the only one used. */
  sources(practice: string | undefined): readonly SampleSource[];
  /** The right to record, or undefined when another tab has it. */
  takeRecorder(): Promise<(() => void) | undefined>;
  /** Keep the screen on; tells when the browser lets go. Returns how to let go. */
  holdScreen(onLost: () => void): () => void;
  watchPage(onInterrupted: (reason: InterruptionCode) => void): () => void;
  watchPermission(onWithdrawn: () => void): () => void;
  /** Milliseconds on the page's clock, the one of the stamps. */
  nowMs(): number;
  /** Wall clock, ms since 1970. */
  wallMs(): number;
  every(periodMs: number, work: () => void): () => void;
  screenAngleDeg(): number | undefined;
}

export function browserCaptureEnvironment(): CaptureEnvironment {
  const userAgent = navigator.userAgent;
  const nowMs = (): number => performance.now();
  return {
    support: supportOf(),
    keepsScreenOn: navigator.wakeLock !== undefined,
    sources(practice) {
      if (practice !== undefined) return [createLatePracticeSource(practice, nowMs)];
      return [
        ...(hasAccelerometer() ? [createAccelerometerSource(userAgent)] : []),
        createMotionEventSource(userAgent),
      ];
    },
    takeRecorder: takeRecorderLock,
    holdScreen: holdWakeLock,
    watchPage,
    watchPermission,
    nowMs,
    wallMs: () => Date.now(),
    every(periodMs, work) {
      const timer = setInterval(work, periodMs);
      return () => clearInterval(timer);
    },
    screenAngleDeg: () => globalThis.screen?.orientation?.angle,
  };
}

function supportOf(): 'likely' | 'none' | 'insecure-page' {
  if (hasAccelerometer() || hasMotionEvents()) return 'likely';
  return globalThis.isSecureContext ? 'none' : 'insecure-page';
}
