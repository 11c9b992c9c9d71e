import { beforeAll, describe, expect, it } from 'vitest';
import { createOfflineUpdates } from '../../src/app/offline-updates.ts';

const LOCK = 'recorder';

beforeAll(() => {
  Object.assign(globalThis, { document: { addEventListener: () => {}, visibilityState: 'visible' } });
});

/** A service worker container with one registration whose waiting worker the test sets. */
function fakeContainer() {
  const posted: unknown[] = [];
  let onControllerChange = () => {};
  const waiting = { postMessage: (message: unknown) => posted.push(message), addEventListener: () => {} };
  const registration = {
    waiting: waiting as typeof waiting | null,
    installing: null,
    active: { state: 'activated', addEventListener: () => {} },
    addEventListener: () => {},
    update: () => Promise.resolve(),
  };
  return {
    posted,
    registration,
    changeController: () => onControllerChange(),
    container: {
      controller: {},
      register: () => Promise.resolve(registration),
      getRegistration: () => Promise.resolve(registration),
      addEventListener: (_: string, listener: () => void) => {
        onControllerChange = listener;
      },
    } as unknown as ServiceWorkerContainer,
  };
}

function bench(held: readonly string[] = []) {
  const fake = fakeContainer();
  let reloads = 0;
  const update = createOfflineUpdates({
    container: fake.container,
    locks: {
      query: () => Promise.resolve({ held: held.map((name) => ({ name })) }),
    } as unknown as LockManager,
    recorderLock: LOCK,
    reload: () => {
      reloads += 1;
    },
    isOff: false,
    onError: () => {},
  });
  return { ...fake, update, reloads: () => reloads };
}

const settled = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('an update', () => {
  it('waits, and is taken when the person says so', async () => {
    const { update, posted, changeController, reloads } = bench();
    await settled();
    expect(update.state.get()).toBe('waiting');
    expect(posted).toEqual([]);
    expect(await update.take()).toBe(true);
    expect(posted).toEqual([{ type: 'SKIP_WAITING' }]);
    changeController();
    expect(reloads()).toBe(1);
  });

  it('is refused while any tab records', async () => {
    const { update, posted } = bench([LOCK]);
    await settled();
    expect(await update.take()).toBe(false);
    expect(posted).toEqual([]);
  });

  it('that another tab took does not load this tab again', async () => {
    const { changeController, reloads } = bench();
    await settled();
    changeController();
    expect(reloads()).toBe(0);
  });
});

describe('without a service worker', () => {
  it('says so', () => {
    const update = createOfflineUpdates({
      container: undefined,
      locks: undefined,
      recorderLock: LOCK,
      reload: () => {},
      isOff: false,
      onError: () => {},
    });
    expect(update.state.get()).toBe('unsupported');
  });
});
