/** Name of the Web Lock of whoever records. An update of the app waits until it is free. */
export const RECORDER_LOCK = 'thrumbook-recorder';

/** One recorder at a time over all tabs: undefined when another tab records. */
export function takeRecorderLock(): Promise<(() => void) | undefined> {
  const locks = globalThis.navigator?.locks;
  if (locks === undefined) return Promise.resolve(() => {});
  return new Promise((resolve, reject) => {
    locks
      .request(RECORDER_LOCK, { ifAvailable: true }, (lock) => {
        if (lock === null) {
          resolve(undefined);
          return undefined;
        }
        return new Promise<void>((release) => resolve(release));
      })
      .catch(reject);
  });
}
