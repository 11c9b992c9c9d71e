import { MessageChannel } from 'node:worker_threads';
import { afterEach, describe, expect, it } from 'vitest';
import { failure, success } from '../../src/core/model/outcome.ts';
import type { Outcome } from '../../src/core/model/outcome.ts';
import type { AnalysisResult } from '../../src/core/model/pictures.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import { analyse } from '../../src/core/analyse.ts';
import { phoneCheck } from '../../src/core/phone-check.ts';
import { AnalysisError, createAnalysisClient } from '../../src/worker/client.ts';
import type { WorkerEnd } from '../../src/worker/client.ts';
import { serveAnalysis } from '../../src/worker/protocol.ts';
import type { MessageEnd } from '../../src/worker/protocol.ts';
import { ringingRecording } from '../support/ringing-recording.ts';

const SETTINGS = { procedure: 'tap', timing: 'auto' } as const;
const recording = ringingRecording({
  frequencyHz: 7.4,
  dampingRatio: 0.012,
  tapTimesS: [1, 9, 17],
  durationS: 25,
});

/** A worker over a real message channel: structured cloning as in a browser, its own side served in this thread. */
function channelWorker(run: (recording: Recording) => Outcome<AnalysisResult>) {
  const channel = new MessageChannel();
  serveAnalysis(channel.port2 as unknown as MessageEnd, { analyse: run, checkPhone: phoneCheck });
  const end = channel.port1 as unknown as WorkerEnd & { endedCount: number };
  end.endedCount = 0;
  end.terminate = () => {
    end.endedCount++;
    channel.port1.close();
  };
  return { end, close: () => channel.port1.close() };
}

const closers: (() => void)[] = [];
afterEach(() => closers.splice(0).forEach((close) => close()));

function clientOf(run: (recording: Recording) => Outcome<AnalysisResult>) {
  const workers: ReturnType<typeof channelWorker>[] = [];
  const client = createAnalysisClient(() => {
    const worker = channelWorker(run);
    workers.push(worker);
    closers.push(worker.close);
    return worker.end;
  });
  return { client, workers };
}

describe('createAnalysisClient', () => {
  it('gives the same analysis through the protocol as without it', async () => {
    const { client } = clientOf((r) => analyse(r, SETTINGS));
    expect(await client.analyse(recording, SETTINGS)).toEqual(analyse(recording, SETTINGS));
  });

  it('checks the phone through the same worker', async () => {
    const { client } = clientOf(() => failure('no-taps'));
    const checkedAt = '2031-05-06T07:08:09.000Z';
    const outcome = await client.checkPhone(recording, checkedAt);
    expect(outcome).toEqual(phoneCheck(recording, checkedAt));
    expect(outcome.ok).toBe(true);
  });

  it('copies the recording: its arrays stay usable here', async () => {
    const { client } = clientOf(() => failure('no-taps'));
    await client.analyse(recording, SETTINGS);
    expect(recording.timeS.length).toBeGreaterThan(1000);
    expect(recording.accelerationMps2[0]!.byteLength).toBeGreaterThan(0);
  });

  it('returns a problem as a value', async () => {
    const { client } = clientOf(() => failure('too-short', { durationS: 0.1 }));
    expect(await client.analyse(recording, SETTINGS)).toEqual(failure('too-short', { durationS: 0.1 }));
  });

  it('rejects with a coded error when the analysis throws, and works again after', async () => {
    let calls = 0;
    const { client, workers } = clientOf(() => {
      if (calls++ === 0) throw new RangeError('rateHz must be > 0, got -1');
      return failure('no-taps');
    });
    const error = await client.analyse(recording, SETTINGS).catch((e: unknown) => e);
    expect(error).toBeInstanceOf(AnalysisError);
    expect(error).toMatchObject({
      code: 'analysis-failed',
      message: 'RangeError: rateHz must be > 0, got -1',
    });
    expect(await client.analyse(recording, SETTINGS)).toEqual(failure('no-taps'));
    expect(workers).toHaveLength(2);
  });

  it('ends the worker within 100 ms of an abort and starts a new one for the next request', async () => {
    const silent: WorkerEnd[] = [];
    const ended: WorkerEnd[] = [];
    const client = createAnalysisClient(() => {
      const end: WorkerEnd = {
        onmessage: null,
        onerror: null,
        postMessage: () => undefined,
        terminate: () => ended.push(end),
      };
      silent.push(end);
      return end;
    });
    const abort = new AbortController();
    const running = client.analyse(recording, SETTINGS, abort.signal);
    await new Promise((resolve) => setTimeout(resolve, 5));
    const before = performance.now();
    abort.abort();
    expect(await running).toEqual(failure('cancelled'));
    expect(performance.now() - before).toBeLessThan(100);
    expect(ended).toEqual(silent);
    void client.analyse(recording, SETTINGS);
    await new Promise((resolve) => setTimeout(resolve, 5));
    expect(silent).toHaveLength(2);
  });

  it('gives up a queued request at once and leaves the running one alone', async () => {
    const { client, workers } = clientOf((r) =>
      success({ samples: r.timeS.length } as unknown as AnalysisResult),
    );
    const abort = new AbortController();
    const first = client.analyse(recording, SETTINGS);
    const second = client.analyse(recording, SETTINGS, abort.signal);
    abort.abort();
    expect(await second).toEqual(failure('cancelled'));
    expect((await first).ok).toBe(true);
    expect(workers[0]!.end.endedCount).toBe(0);
  });

  it('does not start for a signal that was aborted before', async () => {
    const { client, workers } = clientOf(() => failure('no-taps'));
    const abort = new AbortController();
    abort.abort();
    expect(await client.analyse(recording, SETTINGS, abort.signal)).toEqual(failure('cancelled'));
    expect(workers).toHaveLength(0);
  });

  it('rejects when the worker itself fails to load', async () => {
    const client = createAnalysisClient(() => {
      const end: WorkerEnd = {
        onmessage: null,
        onerror: null,
        postMessage: () => undefined,
        terminate: () => undefined,
      };
      setTimeout(() => end.onerror?.({ message: 'script not found' }), 5);
      return end;
    });
    const error = await client.analyse(recording, SETTINGS).catch((e: unknown) => e);
    expect(error).toMatchObject({ code: 'worker-failed', detail: 'script not found' });
  });
});
