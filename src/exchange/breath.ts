/** Longest work at a stretch, ms: below what a person feels as a stop (common practice: 50). */
const STRETCH_MS = 40;

/**
 * Lets the page draw and the person cancel during long work: await it often. Rejects with the signal's reason once aborted.
 */
export function createBreath(signal: AbortSignal): () => Promise<void> {
  let since = performance.now();
  return async () => {
    signal.throwIfAborted();
    if (performance.now() - since < STRETCH_MS) return;
    await new Promise<void>((resolve) => {
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => {
        port1.close();
        resolve();
      };
      port2.postMessage(undefined);
    });
    since = performance.now();
    signal.throwIfAborted();
  };
}
