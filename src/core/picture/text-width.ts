/** Width of a text in px at a size in px. Screens measure; reports and tests estimate. */
export type MeasureText = (text: string, sizePx: number) => number;

/** Mean advance of digits and lower-case letters in common sans-serif faces, in em, on the wide side (our own look at eight faces). */
const MEAN_ADVANCE_EM = 0.58;

export const estimatedTextPx: MeasureText = (text, sizePx) => [...text].length * sizePx * MEAN_ADVANCE_EM;

/** The text, or as much of its beginning as fits with an ellipsis. */
export const fittedText = (text: string, roomPx: number, sizePx: number, measure: MeasureText): string => {
  if (measure(text, sizePx) <= roomPx) return text;
  const letters = [...text];
  while (letters.length > 1 && measure(`${letters.join('').trimEnd()}…`, sizePx) > roomPx) letters.pop();
  return `${letters.join('').trimEnd()}…`;
};

/** Lines broken at spaces so that each fits where it can. */
export const wrappedText = (text: string, roomPx: number, sizePx: number, measure: MeasureText): string[] => {
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const last = lines.at(-1);
    if (last !== undefined && measure(`${last} ${word}`, sizePx) <= roomPx)
      lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines;
};
