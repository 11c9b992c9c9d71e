import type { RefObject } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Interval } from '../../core/model/interval.ts';
import { hzToY, pannedRange, yToHz, zoomedRange, type LogAxis } from '../../core/picture/log-axis.ts';

/** One notch of a wheel (100 px) zooms by this; a button press by the second. */
const WHEEL_RATIO = 1.2;
const BUTTON_RATIO = 1.6;
/** A drag shorter than this is a tap. */
const TAP_PX = 6;

export interface LadderZoom {
  /** Undefined: the whole ladder. */
  readonly rangeHz: Interval | undefined;
  readonly isZoomed: boolean;
  zoom(closer: boolean): void;
  pan(upwards: boolean): void;
  whole(): void;
  /** Whether the pointer that was just released had been dragging. */
  wasDragged(): boolean;
}

const sameRange = (a: Interval, b: Interval): boolean =>
  Math.abs(Math.log(a[0] / b[0])) < 1e-6 && Math.abs(Math.log(a[1] / b[1])) < 1e-6;

interface Touches {
  readonly centreY: number;
  readonly spreadPx: number;
}
const touchesOf = (list: TouchList): Touches => {
  const ys = Array.from(list, (touch) => touch.clientY);
  const xs = Array.from(list, (touch) => touch.clientX);
  const centreY = ys.reduce((sum, y) => sum + y, 0) / ys.length;
  const spreadPx = list.length < 2 ? 0 : Math.max(24, Math.hypot(xs[0]! - xs[1]!, ys[0]! - ys[1]!));
  return { centreY, spreadPx };
};

/**
 * Zoom and pan of a ladder by wheel, pinch, drag, buttons and keys. The page keeps its own scrolling: a wheel zooms only
 * with Ctrl or once the ladder is in use; one finger scrolls the page until the ladder is zoomed.
 */
export function useLadderZoom(
  element: RefObject<HTMLElement | null>,
  wholeHz: Interval,
  axisOf: () => LogAxis | undefined,
): LadderZoom {
  const [kept, setKept] = useState<Interval | undefined>();
  const live = useRef({ range: wholeHz, whole: wholeHz, frame: 0, axisOf, dragged: false });
  live.current.whole = wholeHz;
  live.current.range = kept ?? wholeHz;
  live.current.axisOf = axisOf;

  const show = (next: Interval) => {
    const state = live.current;
    state.range = next;
    // at most one drawing per frame, however many events come
    state.frame ||= requestAnimationFrame(() => {
      state.frame = 0;
      setKept(sameRange(state.range, state.whole) ? undefined : state.range);
    });
  };
  const zoomAt = (factor: number, clientY?: number) => {
    const { range, whole } = live.current;
    const axis = live.current.axisOf();
    const top = element.current?.getBoundingClientRect().top ?? 0;
    const aboutHz =
      axis && clientY !== undefined
        ? yToHz({ ...axis, rangeHz: range }, clientY - top)
        : Math.sqrt(range[0] * range[1]);
    show(zoomedRange(range, whole, factor, Math.min(range[1], Math.max(range[0], aboutHz))));
  };
  const panBy = (pixels: number) => {
    const axis = live.current.axisOf();
    if (!axis) return;
    const moved = { ...axis, rangeHz: live.current.range };
    const ratio = yToHz(moved, hzToY(moved, live.current.range[0]) - pixels) / live.current.range[0];
    show(pannedRange(live.current.range, live.current.whole, ratio));
  };

  useEffect(() => {
    const target = element.current;
    if (!target) return undefined;
    const isZoomedNow = () => !sameRange(live.current.range, live.current.whole);
    const onWheel = (event: WheelEvent) => {
      const isInUse = target.contains(document.activeElement) || isZoomedNow();
      if (!event.ctrlKey && !event.metaKey && !isInUse) return;
      if (event.deltaY > 0 && !isZoomedNow() && !event.ctrlKey) return;
      event.preventDefault();
      zoomAt(WHEEL_RATIO ** (-event.deltaY / 100), event.clientY);
    };
    let from: number | undefined;
    const onDown = (event: PointerEvent) => {
      live.current.dragged = false;
      if (event.pointerType === 'mouse' && event.button === 0) from = event.clientY;
    };
    let travelled = 0;
    const onMove = (event: PointerEvent) => {
      if (from === undefined) return;
      const moved = event.clientY - from;
      travelled += Math.abs(moved);
      if (travelled < TAP_PX) return;
      live.current.dragged = true;
      from = event.clientY;
      panBy(moved);
    };
    const onUp = () => {
      from = undefined;
      travelled = 0;
    };
    let touches: Touches | undefined;
    const onTouchStart = (event: TouchEvent) => {
      touches = touchesOf(event.touches);
      if (event.touches.length > 1) event.preventDefault();
    };
    const onTouchMove = (event: TouchEvent) => {
      const now = touchesOf(event.touches);
      const isPinch = event.touches.length > 1;
      if (!touches || (!isPinch && !isZoomedNow())) return;
      event.preventDefault();
      live.current.dragged = true;
      if (isPinch && touches.spreadPx > 0) zoomAt(now.spreadPx / touches.spreadPx, now.centreY);
      panBy(now.centreY - touches.centreY);
      touches = now;
    };
    const onTouchEnd = (event: TouchEvent) => {
      touches = event.touches.length > 0 ? touchesOf(event.touches) : undefined;
    };
    target.addEventListener('wheel', onWheel, { passive: false });
    target.addEventListener('pointerdown', onDown);
    target.addEventListener('touchstart', onTouchStart, { passive: false });
    target.addEventListener('touchmove', onTouchMove, { passive: false });
    target.addEventListener('touchend', onTouchEnd);
    window.addEventListener('pointermove', onMove);
    window.addEventListener('pointerup', onUp);
    return () => {
      target.removeEventListener('wheel', onWheel);
      target.removeEventListener('pointerdown', onDown);
      target.removeEventListener('touchstart', onTouchStart);
      target.removeEventListener('touchmove', onTouchMove);
      target.removeEventListener('touchend', onTouchEnd);
      window.removeEventListener('pointermove', onMove);
      window.removeEventListener('pointerup', onUp);
      cancelAnimationFrame(live.current.frame);
      live.current.frame = 0;
    };
  }, [element]);

  return {
    rangeHz: kept,
    isZoomed: kept !== undefined,
    zoom: (closer) => zoomAt(closer ? BUTTON_RATIO : 1 / BUTTON_RATIO),
    pan: (upwards) => panBy(upwards ? 60 : -60),
    whole: () => show(live.current.whole),
    wasDragged: () => live.current.dragged,
  };
}
