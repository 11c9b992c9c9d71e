import { launchBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';
import { scriptSensor } from '../support/scripted-sensor.ts';

const RATE_HZ = 60;
const NOISE_MPS2 = 0.05;

export interface LongRecording {
  readonly durationS: number;
  readonly sampleCount: number;
  /** Samples that should be there by the stamps, minus those that are. */
  readonly lostCount: number;
  /** Stored samples that differ from what was fed. */
  readonly differentCount: number;
  readonly sampleBytes: number;
  /** Heap and array buffers after a collection, end of the recording minus its beginning, less the samples. */
  readonly growthBytes: number;
  readonly longestTaskMs: number;
}

/** Records `durationS` in real time with the live view read ten times a second, saves, opens, compares. */
export async function recordLong(durationS: number): Promise<LongRecording> {
  const served = await serveFieldPage();
  const browser = await launchBrowser();
  const { page } = browser;
  try {
    await scriptSensor(page, { as: 'accelerometer', rateHz: RATE_HZ, noiseMps2: NOISE_MPS2 });
    await page.goto(served.url);
    const session = await page.context().newCDPSession(page);
    const memory = async (): Promise<number> => {
      await session.send('HeapProfiler.collectGarbage');
      const usage = (await session.send('Runtime.getHeapUsage')) as {
        usedSize: number;
        backingStorageSize?: number;
      };
      return usage.usedSize + (usage.backingStorageSize ?? 0);
    };
    await page.evaluate(async (lengthS) => {
      await window.field.openStore();
      await window.field.session({ durationS: lengthS, startBy: 'hand' }, ['settling']);
      window.field.watchTasks();
      window.field.capture().start();
      setInterval(() => window.field.capture().live(), 100);
    }, durationS);
    await pause(3000);
    const before = await memory();
    await pause((durationS - 6) * 1000);
    const growth = (await memory()) - before;
    const kept = await page.evaluate(async () => {
      const state = await window.field.until(['done', 'cut']);
      if (state.phase !== 'done') throw new Error(JSON.stringify({ ...state, recording: undefined }));
      const longestTaskMs = window.field.longestTaskMs();
      const { readingDraft } = window.field;
      const saved = await window.field
        .store()
        .saveReading(readingDraft(), state.recording, { journalId: state.journalId });
      const opened = (await window.field.store().openReading(saved._id))!.recording;
      return {
        timeS: [...opened.timeS],
        axes: opened.accelerationMps2.map((axis) => [...axis]),
        longestTaskMs,
      };
    });
    const expected = Math.round((kept.timeS.at(-1)! - kept.timeS[0]!) * RATE_HZ) + 1;
    const sampleBytes = (durationS - 6) * RATE_HZ * (8 + 3 * 4);
    return {
      durationS: kept.timeS.at(-1)!,
      sampleCount: kept.timeS.length,
      lostCount: expected - kept.timeS.length,
      differentCount: differences(kept.axes),
      sampleBytes,
      growthBytes: Math.round(growth - sampleBytes),
      longestTaskMs: kept.longestTaskMs,
    };
  } finally {
    await browser.close();
    await served.stop();
  }
}

/** The scripted sensor's noise again (Park & Miller 1988, three values a sample), found by its first sample. */
function differences(axes: readonly (readonly number[])[]): number {
  const count = axes[0]!.length;
  let seed = 12345;
  const uniform = (): number => {
    seed = (seed * 48271) % 2147483647;
    return (seed / 2147483647) * 2 - 1;
  };
  const fed = Array.from({ length: count + 60 * RATE_HZ }, () =>
    [0, 0, 9.81].map((rest) => Math.fround(rest + NOISE_MPS2 * uniform())),
  );
  const first = fed.findIndex((sample) => sample.every((value, axis) => value === axes[axis]![0]));
  if (first < 0) return count;
  let different = 0;
  for (let i = 0; i < count; i += 1) {
    if (!fed[first + i]?.every((value, axis) => value === axes[axis]![i])) different += 1;
  }
  return different;
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
