import 'fake-indexeddb/auto';
import { openStore, type Store } from '../../src/store/open-store.ts';
import { browserEnvironment } from '../../src/store/store-environment.ts';

let phoneCount = 0;

/** A store of its own in memory, as one phone has it; `clockMs`: how much its clock is ahead. */
export async function newPhone({ clockMs = 0 } = {}): Promise<Store> {
  phoneCount += 1;
  const environment = {
    ...browserEnvironment,
    nowMs: () => browserEnvironment.nowMs() + clockMs,
    nowIso: () => new Date(browserEnvironment.nowMs() + clockMs).toISOString(),
  };
  return openStore({ name: `phone-${phoneCount}`, environment });
}
