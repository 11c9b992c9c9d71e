import { estimatedTextPx, type MeasureText } from '../../core/picture/text-width.ts';

/** Tried size: widths grow in proportion, so each text is measured once. */
const TRIED_PX = 100;

/** Measures with the font the element uses; falls back on the estimate where there is no canvas. */
export function measureLike(element: Element): MeasureText {
  const context = document.createElement('canvas').getContext('2d');
  if (!context) return estimatedTextPx;
  context.font = `600 ${TRIED_PX}px ${getComputedStyle(element).fontFamily}`;
  const known = new Map<string, number>();
  return (text, sizePx) => {
    const width = known.get(text) ?? context.measureText(text).width;
    known.set(text, width);
    return (width * sizePx) / TRIED_PX;
  };
}
