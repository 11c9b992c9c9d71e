/** The shaking as it comes, drawn on a canvas at most ten times a second from the capture's own memory: no layout, no garbage. */
import { useEffect, useRef } from 'preact/hooks';
import type { LiveWindow } from '../../../app/ports.ts';
import styles from './live-trace.module.css';

/** Drawing pauses between two frames, ms: 10 a second is enough to follow by eye and leaves the sensor alone. */
const FRAME_MS = 100;
/** Seconds across the picture. */
const SPAN_S = 6;
/** Smallest half-height, m/s²: noise of a resting phone then stays a calm line. */
const LEAST_SCALE_MPS2 = 0.25;

export function LiveTrace(props: { readonly live: () => LiveWindow | undefined; readonly label: string }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const element = canvas.current;
    const pen = element?.getContext('2d');
    if (!element || !pen) return undefined;
    let scaleMps2 = LEAST_SCALE_MPS2;
    const timer = setInterval(() => {
      const window = props.live();
      // The pens are taken anew each time: the theme may change with the evening while it records.
      if (window) scaleMps2 = draw(element, pen, window, axisPens(element), scaleMps2);
    }, FRAME_MS);
    return () => clearInterval(timer);
  }, []);
  return <canvas ref={canvas} class={styles.trace} role="img" aria-label={props.label} />;
}

interface Pens {
  readonly axes: readonly string[];
  readonly grid: string;
}

const axisPens = (element: Element): Pens => {
  const style = getComputedStyle(element);
  return {
    axes: ['--chart-x', '--chart-y', '--chart-z'].map((name) => style.getPropertyValue(name)),
    grid: style.getPropertyValue('--edge'),
  };
};

/** Draws the last seconds about their mean; returns the scale used, which follows the signal slowly downwards. */
function draw(
  element: HTMLCanvasElement,
  pen: CanvasRenderingContext2D,
  window: LiveWindow,
  pens: Pens,
  formerScaleMps2: number,
): number {
  const density = devicePixelRatio || 1;
  const width = Math.round(element.clientWidth * density);
  const height = Math.round(element.clientHeight * density);
  if (element.width !== width || element.height !== height) Object.assign(element, { width, height });
  const { from, to } = shownRange(window);
  const means = window.accelerationMps2.map((axis) => mean(axis, from, to));
  const wanted = Math.max(LEAST_SCALE_MPS2, largest(window, means, from, to) * 1.1);
  const scaleMps2 = wanted > formerScaleMps2 ? wanted : formerScaleMps2 * 0.95 + wanted * 0.05;
  pen.clearRect(0, 0, width, height);
  pen.strokeStyle = pens.grid;
  pen.lineWidth = density;
  pen.beginPath();
  pen.moveTo(0, height / 2);
  pen.lineTo(width, height / 2);
  pen.stroke();
  pen.lineWidth = 1.6 * density;
  pen.lineJoin = 'round';
  const endS = window.timeS[to - 1] ?? 0;
  window.accelerationMps2.forEach((axis, index) => {
    pen.strokeStyle = pens.axes[index % pens.axes.length] ?? '';
    pen.beginPath();
    for (let i = from; i < to; i += 1) {
      const x = width * (1 - (endS - (window.timeS[i] ?? 0)) / SPAN_S);
      const y = (height / 2) * (1 - ((axis[i] ?? 0) - (means[index] ?? 0)) / scaleMps2);
      if (i === from) pen.moveTo(x, y);
      else pen.lineTo(x, y);
    }
    pen.stroke();
  });
  return scaleMps2;
}

function shownRange(window: LiveWindow): { from: number; to: number } {
  const to = window.length;
  const startS = (window.timeS[to - 1] ?? 0) - SPAN_S;
  let from = to;
  while (from > 0 && (window.timeS[from - 1] ?? 0) >= startS) from -= 1;
  return { from, to };
}

function mean(axis: Float32Array, from: number, to: number): number {
  let sum = 0;
  for (let i = from; i < to; i += 1) sum += axis[i] ?? 0;
  return to > from ? sum / (to - from) : 0;
}

function largest(window: LiveWindow, means: readonly number[], from: number, to: number): number {
  let found = 0;
  window.accelerationMps2.forEach((axis, index) => {
    for (let i = from; i < to; i += 1)
      found = Math.max(found, Math.abs((axis[i] ?? 0) - (means[index] ?? 0)));
  });
  return found;
}
