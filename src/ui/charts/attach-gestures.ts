/** Wheel, pinch and drag along one direction, for pictures that can be zoomed. */
export interface Gestures {
  readonly along: 'x' | 'y';
  isZoomed(): boolean;
  /** Factor > 1: closer; the position on the page stays where it is. */
  zoomAt(factor: number, clientPx: number): void;
  panBy(pixels: number): void;
  /** The pointer went down: nothing has been dragged yet. */
  began(): void;
  dragged(): void;
}

/** One notch of a wheel (100 px) zooms by this. */
const WHEEL_RATIO = 1.2;
/** A movement shorter than this is a tap. */
const TAP_PX = 6;
/** Fingers closer than this do not give a useful ratio. */
const CLOSEST_FINGERS_PX = 24;

interface Fingers {
  readonly middlePx: number;
  readonly spreadPx: number;
}

const fingersOf = (touches: TouchList, along: 'x' | 'y'): Fingers => {
  const xs = Array.from(touches, (touch) => touch.clientX);
  const ys = Array.from(touches, (touch) => touch.clientY);
  const line = along === 'x' ? xs : ys;
  return {
    middlePx: line.reduce((sum, value) => sum + value, 0) / line.length,
    spreadPx:
      touches.length < 2 ? 0 : Math.max(CLOSEST_FINGERS_PX, Math.hypot(xs[0]! - xs[1]!, ys[0]! - ys[1]!)),
  };
};

/**
 * The page keeps its own scrolling: a wheel zooms only with Ctrl or once the picture is in use, and one finger scrolls
 * the page until the picture is zoomed. Returns the way to detach.
 */
export function attachGestures(target: HTMLElement, gestures: Gestures): () => void {
  const { along } = gestures;
  const stop = new AbortController();
  const quiet = { signal: stop.signal };
  const active = { passive: false, signal: stop.signal };
  const positionOf = (event: MouseEvent) => (along === 'x' ? event.clientX : event.clientY);
  let mouseAt: number | undefined;
  let travelledPx = 0;
  let fingers: Fingers | undefined;

  const onWheel = (event: WheelEvent) => {
    const isAsked = event.ctrlKey || event.metaKey;
    const isInUse = target.closest('[role="group"]')?.contains(document.activeElement) ?? false;
    if (!isAsked && !isInUse && !gestures.isZoomed()) return;
    if (!isAsked && event.deltaY > 0 && !gestures.isZoomed()) return;
    event.preventDefault();
    gestures.zoomAt(WHEEL_RATIO ** (-event.deltaY / 100), positionOf(event));
  };
  const onDown = (event: PointerEvent) => {
    gestures.began();
    travelledPx = 0;
    if (event.pointerType === 'mouse' && event.button === 0) mouseAt = positionOf(event);
  };
  const onMove = (event: PointerEvent) => {
    if (mouseAt === undefined) return;
    const movedPx = positionOf(event) - mouseAt;
    travelledPx += Math.abs(movedPx);
    mouseAt += movedPx;
    if (travelledPx < TAP_PX) return;
    gestures.dragged();
    gestures.panBy(movedPx);
  };
  const onUp = () => {
    mouseAt = undefined;
  };
  const onTouchStart = (event: TouchEvent) => {
    fingers = fingersOf(event.touches, along);
    travelledPx = 0;
    if (event.touches.length > 1) event.preventDefault();
  };
  const onTouchMove = (event: TouchEvent) => {
    const now = fingersOf(event.touches, along);
    const isPinch = event.touches.length > 1;
    if (!fingers || (!isPinch && !gestures.isZoomed())) return;
    event.preventDefault();
    travelledPx += Math.abs(now.middlePx - fingers.middlePx);
    if (isPinch || travelledPx > TAP_PX) gestures.dragged();
    if (isPinch && fingers.spreadPx > 0) gestures.zoomAt(now.spreadPx / fingers.spreadPx, now.middlePx);
    gestures.panBy(now.middlePx - fingers.middlePx);
    fingers = now;
  };
  const onTouchEnd = (event: TouchEvent) => {
    fingers = event.touches.length > 0 ? fingersOf(event.touches, along) : undefined;
  };

  target.addEventListener('wheel', onWheel, active);
  target.addEventListener('pointerdown', onDown, quiet);
  window.addEventListener('pointermove', onMove, quiet);
  window.addEventListener('pointerup', onUp, quiet);
  target.addEventListener('touchstart', onTouchStart, active);
  target.addEventListener('touchmove', onTouchMove, active);
  target.addEventListener('touchend', onTouchEnd, quiet);
  target.addEventListener('touchcancel', onTouchEnd, quiet);
  return () => stop.abort();
}
