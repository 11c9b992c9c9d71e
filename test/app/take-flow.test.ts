import 'fake-indexeddb/auto';
import { describe, expect, it } from 'vitest';
import { openSettings } from '../../src/app/settings.ts';
import { createRounds } from '../../src/app/rounds.ts';
import { createTakeFlow, isWorthUsing, type TakeFlow, type TakeState } from '../../src/app/take-flow.ts';
import { planTake } from '../../src/app/take-plan.ts';
import { failure, success, type Outcome } from '../../src/core/model/outcome.ts';
import type { AnalysisResult } from '../../src/core/model/pictures.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';
import { fakeCapture } from '../support/fake-capture.ts';
import { sampleAnalysis, sampleRecording } from '../support/reading-draft.ts';

let serial = 0;
const recording = sampleRecording(300);
const answered = success({ analysis: sampleAnalysis(), pictures: {} } as unknown as AnalysisResult);

async function bench(answer: () => Promise<Outcome<AnalysisResult>> = () => Promise.resolve(answered)) {
  const store = await openStore({ name: `take-${(serial += 1)}` });
  const capture = fakeCapture();
  const settings = await openSettings(store, () => {});
  const kept: string[] = [];
  const flow = createTakeFlow({
    capture,
    analysis: { analyse: answer, checkPhone: async () => failure('no-samples') },
    store,
    rounds: createRounds(store, settings),
    plan: planTake('tap', { names: {} }, 'laid'),
    about: { version: '0.1.0', commit: 'abc' },
    environment: {
      now: () => new Date('2026-05-04T09:00:00Z'),
      timeZone: 'Europe/Berlin',
      userAgent: 'test',
    },
    onKept: (reading) => kept.push(reading._id),
  });
  return { store, capture, flow, kept };
}

const until = (flow: TakeFlow, phase: TakeState['phase']) =>
  new Promise<TakeState>((resolve) => {
    if (flow.state.get().phase === phase) return resolve(flow.state.get());
    const stop = flow.state.subscribe((state) => {
      if (state.phase !== phase) return;
      stop();
      resolve(state);
    });
  });

const summaries = (store: Store) => store.listReadings();

describe('taking a reading', () => {
  it('goes from the plan over the session to a kept reading in a round of its own', async () => {
    const { store, capture, flow, kept } = await bench();
    flow.begin();
    expect(capture.opened).toEqual([{ durationS: 30, startBy: 'first-tap' }]);
    capture.tell({ phase: 'settling', settled: false, startBy: 'first-tap' });
    expect(flow.state.get()).toMatchObject({ phase: 'capture', session: { phase: 'settling' } });
    capture.tell({ phase: 'done', recording, journalId: 'j1' });
    const done = await until(flow, 'kept');
    expect(kept).toEqual([(done as { id: string }).id]);
    const [reading] = await summaries(store);
    expect(reading).toMatchObject({
      procedure: 'tap',
      practice: false,
      round: expect.stringMatching(/^round:/),
    });
    const opened = await store.openReading(kept[0] ?? '');
    expect(opened?.reading.circumstances.excitation).toBe('knuckle');
    expect(opened?.recording).toEqual(recording);
  });

  it('keeps nothing where the analysis has no answer, and says why', async () => {
    const { store, capture, flow } = await bench(() => Promise.resolve(failure('no-taps')));
    capture.tell({ phase: 'done', recording, journalId: 'j1' });
    expect(await until(flow, 'failed')).toMatchObject({ problem: { code: 'no-taps' } });
    expect(await summaries(store)).toEqual([]);
  });

  it('keeps nothing that was cancelled while it was worked out', async () => {
    let answer: (outcome: Outcome<AnalysisResult>) => void = () => {};
    const { store, capture, flow } = await bench(() => new Promise((resolve) => (answer = resolve)));
    capture.tell({ phase: 'done', recording, journalId: 'j1' });
    await until(flow, 'analysing');
    flow.cancel();
    answer(answered);
    await Promise.resolve();
    expect(flow.state.get()).toEqual({ phase: 'prepare' });
    expect(await summaries(store)).toEqual([]);
  });

  it('offers a cut recording, and goes on with it when the person says so', async () => {
    const { store, capture, flow } = await bench();
    capture.tell({ phase: 'cut', reason: 'hidden', recording, journalId: 'j1' });
    expect(flow.state.get()).toMatchObject({ phase: 'cut', reason: 'hidden' });
    expect(await summaries(store)).toEqual([]);
    flow.useCut();
    await until(flow, 'kept');
    expect(await summaries(store)).toHaveLength(1);
  });

  it('holds a reading that the full phone refused, and keeps it on the next try', async () => {
    const { store, capture, flow } = await bench();
    const save = store.saveReading.bind(store);
    store.saveReading = () => Promise.reject(new Error('quota'));
    capture.tell({ phase: 'done', recording, journalId: 'j1' });
    const unsaved = (await until(flow, 'unsaved')) as TakeState & { phase: 'unsaved' };
    expect(unsaved.detail).toBe('quota');
    store.saveReading = save;
    unsaved.retry();
    await until(flow, 'kept');
    expect(await summaries(store)).toHaveLength(1);
  });

  it('takes a file with circumstances unknown, in no round, under its name', async () => {
    const { store, flow } = await bench();
    const sensor = { source: 'file' as const, practice: false, name: 'rail.csv' };
    await flow.takeFile({ ...recording, sensor }, 'rail.csv');
    const [reading] = await summaries(store);
    expect(reading).toMatchObject({ label: 'rail.csv' });
    expect(reading?.round).toBeUndefined();
    const opened = await store.openReading(reading?.id ?? '');
    expect(opened?.reading.circumstances.mounting).toBe('unknown');
  });
});

describe('a cut recording', () => {
  it('is worth using from two seconds on', () => {
    expect(isWorthUsing(sampleRecording(60))).toBe(false);
    expect(isWorthUsing(sampleRecording(200))).toBe(true);
    expect(isWorthUsing(undefined)).toBe(false);
  });
});
