import type { ExchangePort, Watch } from '../../src/app/ports.ts';
import { createExchange } from '../../src/exchange/create-exchange.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';

let serial = 0;

/** A phone: a store of its own and the exchange over it. */
export async function phone(): Promise<{ readonly store: Store; readonly exchange: ExchangePort }> {
  const store = await openStore({ name: `exchange-${(serial += 1)}` });
  return { store, exchange: exchangeOf(store) };
}

export const exchangeOf = (store: Store): ExchangePort =>
  createExchange({
    store,
    about: { version: '0.1.0', commit: 'abc', analysisVersion: 1 },
    tokensCss: (names) => `:root{${names.map((name) => `${name}:Canvas`).join(';')}}`,
    now: () => new Date('2026-03-02T08:00:00.000Z'),
  });

export const watch = (): Watch => ({ signal: new AbortController().signal, onProgress: () => undefined });

/** Looks at a packet and takes it; how many facts were new. */
export async function takeIn(exchange: ExchangePort, file: Blob): Promise<number> {
  const seen = await exchange.preview(file, watch());
  if (!seen.ok) throw new Error(JSON.stringify(seen.problem));
  return (await seen.value.take(watch())).added;
}
