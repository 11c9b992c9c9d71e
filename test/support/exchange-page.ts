/*
 * A page that holds two stores and the exchange over them: proofs of packets reach them through `window.packets`. Never shipped.
 */
import type { Recording } from '../../src/core/model/recording.ts';
import type { Store } from '../../src/store/open-store.ts';
import { openStore } from '../../src/store/open-store.ts';
import { exchangeOf, watch } from './exchange-of.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

// What tsx wraps named functions in, for those that tests send into the page.
Object.assign(globalThis, { __name: (value: unknown) => value });

/** A phone's recording: noise rounded to 0.01 m/s², stamps that scatter. */
function phoneRecording(count: number): Recording {
  const recording = sampleRecording(count);
  const noise = () => (Math.random() + Math.random() - 1) * 0.2;
  recording.accelerationMps2.forEach((axis) => {
    for (let i = 0; i < count; i += 1) axis[i] = Math.round((axis[i]! + noise()) * 100) / 100;
  });
  for (let i = 0; i < count; i += 1) recording.timeS[i] = Math.round(1e4 * (i / 60 + 1e-3 * noise())) / 1e4;
  return recording;
}

const open = new Map<string, Store>();
let packet: File | undefined;

const packets = {
  async store(name: string): Promise<Store> {
    const store = open.get(name) ?? (await openStore({ name }));
    open.set(name, store);
    return store;
  },
  async fill(name: string, count: number, sampleCount: number): Promise<void> {
    const store = await packets.store(name);
    for (let i = 0; i < count; i += 1)
      await store.saveReading(readingDraft(), phoneRecording(sampleCount), { label: `Post ${i}` });
  },
  /** Seconds that the packet took, and its size. */
  async write(name: string): Promise<{ seconds: number; bytes: number }> {
    const startMs = performance.now();
    packet = await exchangeOf(await packets.store(name)).packet('all', undefined, watch());
    return { seconds: (performance.now() - startMs) / 1000, bytes: packet.size };
  },
  /** Seconds of looking and of taking, and what was new. */
  async take(name: string): Promise<{ lookS: number; takeS: number; added: number; refused: number }> {
    const startMs = performance.now();
    const seen = await exchangeOf(await packets.store(name)).preview(packet!, watch());
    if (!seen.ok) throw new Error(JSON.stringify(seen.problem));
    const seenMs = performance.now();
    const { added } = await seen.value.take(watch());
    return {
      lookS: (seenMs - startMs) / 1000,
      takeS: (performance.now() - seenMs) / 1000,
      added,
      refused: seen.value.refused.length,
    };
  },
  heapBytes: () => (performance as { memory?: { usedJSHeapSize: number } }).memory?.usedJSHeapSize ?? 0,
};

declare global {
  interface Window {
    packets: typeof packets;
  }
}
window.packets = packets;
