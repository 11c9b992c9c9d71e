import type { RefObject } from 'preact';
import { useLayoutEffect, useState } from 'preact/hooks';

/** Width of an element and the size of its text, in px; follows resizing, zoomed text and rotated phones. */
export function useElementSize(
  ref: RefObject<HTMLElement | null>,
): { widthPx: number; textPx: number } | undefined {
  const [size, setSize] = useState<{ widthPx: number; textPx: number }>();
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return undefined;
    const read = () => {
      const widthPx = Math.floor(element.clientWidth);
      const textPx = Number.parseFloat(getComputedStyle(element).fontSize);
      if (widthPx > 0)
        setSize((old) => (old?.widthPx === widthPx && old.textPx === textPx ? old : { widthPx, textPx }));
    };
    read();
    const observer = new ResizeObserver(read);
    observer.observe(element);
    return () => observer.disconnect();
  }, [ref]);
  return size;
}
