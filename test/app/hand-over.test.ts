import { describe, expect, it } from 'vitest';
import { createHandOver, REPORT_MOST_COUNT, type HandOverParts } from '../../src/app/hand-over.ts';
import type { ExchangePort, ImportPreview, Watch } from '../../src/app/ports.ts';
import { DEFAULT_SETTINGS } from '../../src/app/settings.ts';

const file = new File(['x'], 'a.thrumbook.zip', { type: 'application/zip' });
const until = async (isSo: () => boolean) => {
  for (let i = 0; i < 100 && !isSo(); i += 1) await Promise.resolve();
};

function handOver(exchange: Partial<ExchangePort>, over: Partial<HandOverParts> = {}) {
  const errors: unknown[] = [];
  const kept = new Map<string, unknown>();
  const port = { canShare: () => false, savesSafely: true, ...exchange } as ExchangePort;
  const parts = {
    store: {
      getSetting: async (key: string) => kept.get(key),
      putSetting: async (key: string, value: unknown) => void kept.set(key, value),
    },
    readings: { list: async () => [] },
    settings: { get: () => DEFAULT_SETTINGS },
    exchange: async () => port,
    now: () => new Date('2026-03-02T08:00:00.000Z'),
    noteError: (error: unknown) => errors.push(error),
    ...over,
  } as unknown as HandOverParts;
  return { ...createHandOver(parts), errors };
}

const preview = (take: ImportPreview['take']): ImportPreview => ({
  newReadings: [],
  knownReadingCount: 0,
  otherNewCount: 1,
  newerCount: 0,
  refused: [{ name: 'a', problem: { code: 'damaged', facts: {} } }],
  take,
});

describe('making', () => {
  it('goes from progress to a file with the ways of this browser, and notes a back-up', async () => {
    const shares: number[] = [];
    const it = handOver({
      packet: async (_readings, _report, watch) => {
        watch.onProgress(0.5);
        return file;
      },
      canShare: () => true,
    });
    it.outgoing.subscribe((state) => state.phase === 'making' && shares.push(state.share));
    await it.make('all', { kind: 'packet' });
    expect(shares).toContain(0.5);
    expect(it.outgoing.get()).toMatchObject({ phase: 'ready', file, ways: ['share', 'save'] });
    expect(await it.lastBackUp()).toBe('2026-03-02T08:00:00.000Z');
  });

  it('offers only sharing where saving would trap, and saving where sharing is not possible', async () => {
    const trapped = handOver({ readingsTable: async () => file, canShare: () => true, savesSafely: false });
    await trapped.make('all', { kind: 'table' });
    expect(trapped.outgoing.get()).toMatchObject({ ways: ['share'] });
    const neither = handOver({ readingsTable: async () => file, savesSafely: false });
    await neither.make('all', { kind: 'table' });
    expect(neither.outgoing.get()).toMatchObject({ ways: ['save'] });
  });

  it('is stopped by putting it away, and shows nothing of it afterwards', async () => {
    let seen: Watch | undefined;
    const it = handOver({
      readingsTable: (_readings, watch) => {
        seen = watch;
        return new Promise((_, reject) =>
          watch.signal.addEventListener('abort', () => reject(new Error('x'))),
        );
      },
    });
    const making = it.make('all', { kind: 'table' });
    await until(() => seen !== undefined);
    it.clearOutgoing();
    await making;
    seen!.onProgress(0.9);
    expect(it.outgoing.get()).toEqual({ phase: 'idle' });
    expect(it.errors).toEqual([]);
  });

  it('says why there is no file', async () => {
    const broken = handOver({ readingsTable: () => Promise.reject(new Error('disk')) });
    await broken.make('all', { kind: 'table' });
    expect(broken.outgoing.get()).toMatchObject({ phase: 'failed', why: 'error' });
    expect(broken.errors).toHaveLength(1);
    const empty = handOver({});
    await empty.make([], { kind: 'report' });
    expect(empty.outgoing.get()).toMatchObject({ why: 'nothing' });
    await empty.make(Array<string>(REPORT_MOST_COUNT + 1).fill('reading:x'), { kind: 'report' });
    expect(empty.outgoing.get()).toMatchObject({ why: 'too-many' });
  });

  it('keeps the file when the person leaves the share sheet, and says when it was refused', async () => {
    let outcome: 'cancelled' | 'refused' = 'cancelled';
    const it = handOver({
      readingsTable: async () => file,
      canShare: () => true,
      share: async () => outcome,
    });
    await it.make('all', { kind: 'table' });
    const ready = it.outgoing.get();
    await it.share();
    expect(it.outgoing.get()).toBe(ready);
    outcome = 'refused';
    await it.share();
    expect(it.outgoing.get()).toMatchObject({ phase: 'ready', outcome: 'refused' });
  });
});

describe('taking in', () => {
  it('shows what is in it, takes it only when told, and counts what was left out', async () => {
    let taken = 0;
    const it = handOver({
      preview: async () => ({
        ok: true,
        value: preview(async () => {
          taken += 1;
          return { added: 1, damaged: ['edit:1'] };
        }),
      }),
    });
    await it.take();
    await it.look(file);
    expect(it.incoming.get()).toMatchObject({ phase: 'seen', name: file.name });
    expect(taken).toBe(0);
    await it.take();
    expect(taken).toBe(1);
    expect(it.incoming.get()).toMatchObject({ phase: 'taken', readingCount: 0, refusedCount: 2 });
  });

  it('tells a refused file from one that could not be stored', async () => {
    const problem = { code: 'unreadable-file', facts: { reason: 'no-packet' } } as const;
    const refused = handOver({ preview: async () => ({ ok: false, problem }) });
    await refused.look(file);
    expect(refused.incoming.get()).toEqual({ phase: 'refused', name: file.name, problem });
    const full = handOver({
      preview: async () => ({
        ok: true,
        value: preview(() => Promise.reject(Object.assign(new Error('full'), { code: 'quota' }))),
      }),
    });
    await full.look(file);
    await full.take();
    expect(full.incoming.get()).toEqual({ phase: 'failed', name: file.name, code: 'quota' });
  });

  it('shows the last file only, when a second is opened while the first is looked into', async () => {
    const waiting: (() => void)[] = [];
    const it = handOver({
      preview: () =>
        new Promise((resolve) =>
          waiting.push(() => resolve({ ok: true, value: preview(async () => ({ added: 0, damaged: [] })) })),
        ),
    });
    const first = it.look(file);
    const second = it.look(new File([], 'b.html'));
    await until(() => waiting.length === 2);
    waiting[1]!();
    await second;
    waiting[0]!();
    await first;
    expect(it.incoming.get()).toMatchObject({ phase: 'seen', name: 'b.html' });
  });
});
