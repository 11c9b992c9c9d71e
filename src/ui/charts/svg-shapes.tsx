import type { SvgShape } from '../../core/picture/svg-shape.ts';

/** Draws shapes as elements; their kinds become classes, so that the theme's tokens reach them. */
export function SvgShapes({ shapes }: { readonly shapes: readonly SvgShape[] }) {
  return (
    <>
      {shapes.map((shape, index) => {
        const Element = shape.element;
        return (
          <Element key={index} class={shape.kind} {...shape.attributes}>
            {shape.text}
          </Element>
        );
      })}
    </>
  );
}
