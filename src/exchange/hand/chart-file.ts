/** Pixels of a picture for one unit of the drawing: sharp in a document at full width. */
const SCALE = 3;

const FOOT_PX = 22;

/** The drawing as a file of its own: white paper, black ink, its size stated, a line of words below. */
export function standaloneSvg(
  svg: string,
  foot: string,
): { readonly text: string; readonly widthPx: number; readonly heightPx: number } {
  const [, width = '400', height = '300'] = /viewBox="0 0 ([\d.]+) ([\d.]+)"/.exec(svg) ?? [];
  const [widthPx, heightPx] = [Number(width), Number(height) + FOOT_PX];
  const text = svg
    .replace(
      /viewBox="[^"]*"/,
      `width="${widthPx}" height="${heightPx}" viewBox="0 0 ${widthPx} ${heightPx}"`,
    )
    // System colour names mean nothing to other programs.
    .replaceAll('"Canvas"', '"white"')
    .replaceAll('"currentColor"', '"black"')
    .replace('>', '><rect width="100%" height="100%" fill="white"/>')
    .replace(
      /<\/svg>$/,
      `<text x="8" y="${heightPx - 8}" font-family="sans-serif" font-size="10">${foot}</text></svg>`,
    );
  return { text, widthPx, heightPx };
}

/** The same as PNG. Rejects where the browser cannot draw it. */
export async function pngOf(svg: string, foot: string): Promise<Blob> {
  const { text, widthPx, heightPx } = standaloneSvg(svg, foot);
  const address = URL.createObjectURL(new Blob([text], { type: 'image/svg+xml' }));
  try {
    const image = new Image(widthPx * SCALE, heightPx * SCALE);
    image.src = address;
    await image.decode();
    const canvas = document.createElement('canvas');
    canvas.width = widthPx * SCALE;
    canvas.height = heightPx * SCALE;
    canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
    const png = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
    if (png === null) throw new Error('the browser could not draw the picture');
    return png;
  } finally {
    URL.revokeObjectURL(address);
  }
}
