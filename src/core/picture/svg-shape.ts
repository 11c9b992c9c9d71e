/**
 * A drawing as plain values: screens render it as elements styled by class, reports as a string painted in place. One
 * description keeps both alike.
 */
export interface SvgShape {
  readonly element: 'path' | 'rect' | 'text' | 'circle';
  /** What it is; style follows from it. May hold several words. */
  readonly kind: string;
  readonly attributes: Readonly<Record<string, string | number>>;
  readonly text?: string;
}

/** Presentation attributes by kind, for drawings without a style sheet. */
export type SvgPaint = Readonly<Record<string, Readonly<Record<string, string | number>>>>;

const escaped = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');

const attributesText = (attributes: Readonly<Record<string, string | number>>): string =>
  Object.entries(attributes)
    .map(([name, value]) => ` ${name}="${escaped(String(value))}"`)
    .join('');

const shapeText = (shape: SvgShape, paint: SvgPaint): string => {
  const painted = Object.assign({}, ...shape.kind.split(' ').map((kind) => paint[kind] ?? {})) as Record<
    string,
    string | number
  >;
  const open = `<${shape.element}${attributesText({ ...painted, ...shape.attributes })}`;
  return shape.text === undefined ? `${open}/>` : `${open}>${escaped(shape.text)}</${shape.element}>`;
};

/** A complete SVG element with its sentence as accessible name. */
export const svgText = (
  shapes: readonly SvgShape[],
  size: { readonly widthPx: number; readonly heightPx: number },
  sentence: string,
  paint: SvgPaint,
): string =>
  `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${size.widthPx} ${size.heightPx}" role="img" aria-label="${escaped(sentence)}">` +
  `${shapes.map((shape) => shapeText(shape, paint)).join('')}</svg>`;
