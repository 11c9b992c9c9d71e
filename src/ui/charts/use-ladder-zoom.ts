import type { RefObject } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Interval } from '../../core/model/interval.ts';
import { hzToY, pannedRange, yToHz, zoomedRange, type LogAxis } from '../../core/picture/log-axis.ts';
import { attachGestures } from './attach-gestures.ts';

/** A press of a button zooms by this, a key pans by this. */
const BUTTON_RATIO = 1.6;
const KEY_PX = 60;

export interface LadderZoom {
  /** Undefined: the whole ladder. */
  readonly rangeHz: Interval | undefined;
  zoom(closer: boolean): void;
  pan(upwards: boolean): void;
  whole(): void;
  /** Whether the pointer that was just released had been dragging. */
  wasDragged(): boolean;
}

const isSame = (a: Interval, b: Interval): boolean =>
  Math.abs(Math.log(a[0] / b[0])) < 1e-6 && Math.abs(Math.log(a[1] / b[1])) < 1e-6;

/** Zoom and pan of a ladder by wheel, pinch, drag, buttons and keys; at most one drawing per frame. */
export function useLadderZoom(
  element: RefObject<HTMLElement | null>,
  wholeHz: Interval,
  axisOf: () => LogAxis | undefined,
): LadderZoom {
  const [kept, setKept] = useState<Interval | undefined>();
  const live = useRef({ range: wholeHz, whole: wholeHz, frame: 0, axisOf, isDragged: false });
  const now = live.current;
  now.whole = wholeHz;
  now.axisOf = axisOf;
  if (now.frame === 0) now.range = kept ?? wholeHz;

  const show = (next: Interval) => {
    now.range = next;
    now.frame ||= requestAnimationFrame(() => {
      now.frame = 0;
      setKept(isSame(now.range, now.whole) ? undefined : now.range);
    });
  };
  const axisNow = () => {
    const axis = now.axisOf();
    return axis && { ...axis, rangeHz: now.range };
  };
  const zoomAt = (factor: number, clientY?: number) => {
    const axis = axisNow();
    const [low, high] = now.range;
    const top = element.current?.getBoundingClientRect().top ?? 0;
    const aboutHz = axis && clientY !== undefined ? yToHz(axis, clientY - top) : Math.sqrt(low * high);
    show(zoomedRange(now.range, now.whole, factor, Math.min(high, Math.max(low, aboutHz))));
  };
  const panBy = (pixels: number) => {
    const axis = axisNow();
    if (!axis) return;
    const ratio = yToHz(axis, hzToY(axis, now.range[0]) - pixels) / now.range[0];
    show(pannedRange(now.range, now.whole, ratio));
  };

  useEffect(() => {
    const target = element.current;
    if (!target) return undefined;
    const detach = attachGestures(target, {
      along: 'y',
      isZoomed: () => !isSame(now.range, now.whole),
      zoomAt,
      panBy,
      began: () => {
        now.isDragged = false;
      },
      dragged: () => {
        now.isDragged = true;
      },
    });
    return () => {
      detach();
      cancelAnimationFrame(now.frame);
      now.frame = 0;
    };
  }, [element]);

  return {
    rangeHz: kept,
    zoom: (closer) => zoomAt(closer ? BUTTON_RATIO : 1 / BUTTON_RATIO),
    pan: (upwards) => panBy(upwards ? KEY_PX : -KEY_PX),
    whole: () => show(now.whole),
    wasDragged: () => now.isDragged,
  };
}
