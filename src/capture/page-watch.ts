import type { InterruptionCode } from '../core/model/recording.ts';

/**
 * Tells when the page is about to get no samples any more: hidden (another app, a call, the lock screen), frozen, or
 * left. Returns how to stop watching.
 */
export function watchPage(onInterrupted: (reason: InterruptionCode) => void): () => void {
  const onVisibility = (): void => {
    if (document.visibilityState === 'hidden') onInterrupted('hidden');
  };
  const onFreeze = (): void => onInterrupted('frozen');
  const onHide = (): void => onInterrupted('hidden');
  document.addEventListener('visibilitychange', onVisibility);
  document.addEventListener('freeze', onFreeze);
  window.addEventListener('pagehide', onHide);
  return () => {
    document.removeEventListener('visibilitychange', onVisibility);
    document.removeEventListener('freeze', onFreeze);
    window.removeEventListener('pagehide', onHide);
  };
}
