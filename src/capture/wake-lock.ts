/**
 * Keep the screen on while samples come. `onLost` when the browser lets go by itself. Where it cannot be had, nothing
 * happens: the hidden page that may follow is told apart. Returns how to let go.
 */
export function holdWakeLock(onLost: () => void): () => void {
  const lock = globalThis.navigator?.wakeLock;
  let sentinel: WakeLockSentinel | undefined;
  let isOver = false;
  const onRelease = (): void => {
    // A hidden page loses it too, but says so itself.
    if (!isOver && document.visibilityState === 'visible') onLost();
  };
  lock
    ?.request('screen')
    .then((held) => {
      if (isOver) return held.release();
      sentinel = held;
      held.addEventListener('release', onRelease);
      return undefined;
    })
    .catch(() => {
      // Low battery or no right to it: recordings are short, the screen may last.
    });
  return () => {
    isOver = true;
    void sentinel?.release().catch(() => {});
  };
}
