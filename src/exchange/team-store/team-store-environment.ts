/** What the client needs of its host; tests bring their own. */
export interface TeamStoreEnvironment {
  fetch(url: string, init: RequestInit): Promise<Response>;
  nowIso(): string;
  /** 0 to 1: spreads the attempts of ten phones that lost the same link. */
  chance(): number;
  /** Ends after `ms`, or when the link comes back; rejects when aborted. */
  pause(ms: number, signal: AbortSignal): Promise<void>;
  /** Whether the page's own policy refused the call to this origin that just failed. */
  wasBlocked(origin: string): Promise<boolean>;
  /** Longest silence of a server, ms. */
  readonly stallMs: number;
}

/** Long enough for a slow server behind a slow link (our own choice). */
const STALL_MS = 30_000;
/** Chromium tells of a refused call within a few ms (tried). */
const TOLD_LATER_MS = 100;

export function browserEnvironment(): TeamStoreEnvironment {
  const blocked = new Set<string>();
  document.addEventListener('securitypolicyviolation', ({ blockedURI, effectiveDirective }) => {
    if (effectiveDirective === 'connect-src') blocked.add(originOf(blockedURI));
  });
  return {
    fetch: (url, init) => fetch(url, init),
    nowIso: () => new Date().toISOString(),
    chance: () => Math.random(),
    pause,
    async wasBlocked(origin) {
      // The browser tells of it a moment after the call has failed.
      await new Promise((resolve) => setTimeout(resolve, TOLD_LATER_MS));
      return blocked.delete(origin);
    },
    stallMs: STALL_MS,
  };
}

function originOf(url: string): string {
  try {
    return new URL(url).origin;
  } catch {
    return url;
  }
}

function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve, reject) => {
    const end = (settle: () => void) => () => {
      clearTimeout(timer);
      removeEventListener('online', onOnline);
      signal.removeEventListener('abort', onAbort);
      settle();
    };
    const onOnline = end(resolve);
    const onAbort = end(() => reject(signal.reason as Error));
    const timer = setTimeout(onOnline, ms);
    addEventListener('online', onOnline);
    signal.addEventListener('abort', onAbort);
    if (signal.aborted) onAbort();
  });
}
