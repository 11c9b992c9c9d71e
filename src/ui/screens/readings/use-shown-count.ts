import { useEffect, useRef, useState } from 'preact/hooks';
import type { RefObject } from 'preact';

/** Rows drawn at once; more come when the foot of the list is near, so that ten thousand open as quickly as ten. */
const PAGE_COUNT = 60;

export function useShownCount(
  total: number,
  key: string,
): { readonly shown: number; readonly sentinel: RefObject<HTMLDivElement | null> } {
  const [shown, setShown] = useState(PAGE_COUNT);
  const sentinel = useRef<HTMLDivElement>(null);
  useEffect(() => setShown(PAGE_COUNT), [key]);
  useEffect(() => {
    const foot = sentinel.current;
    if (!foot || shown >= total) return undefined;
    const observer = new IntersectionObserver(
      (entries) => {
        if (entries.some((entry) => entry.isIntersecting)) setShown((now) => now + PAGE_COUNT);
      },
      { rootMargin: '600px' },
    );
    observer.observe(foot);
    return () => observer.disconnect();
  }, [shown, total]);
  return { shown, sentinel };
}
