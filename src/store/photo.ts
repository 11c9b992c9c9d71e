import { StoreError } from './store-error.ts';

/** Longest side of a kept photo, pixels: a placement is recognised, a packet stays small (our own choice). */
export const PHOTO_SIDE_PX = 1280;
const JPEG_QUALITY = 0.8;

export interface PreparedPhoto {
  readonly jpeg: Uint8Array;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** The picture drawn anew at a modest size: position, camera and time marks of the file do not survive that. */
export async function preparePhoto(file: Blob): Promise<PreparedPhoto> {
  const picture = await decoded(file);
  const scale = Math.min(1, PHOTO_SIDE_PX / Math.max(picture.width, picture.height));
  const widthPx = Math.max(1, Math.round(picture.width * scale));
  const heightPx = Math.max(1, Math.round(picture.height * scale));
  const canvas = document.createElement('canvas');
  canvas.width = widthPx;
  canvas.height = heightPx;
  const context = canvas.getContext('2d');
  if (context === null) throw new StoreError('unavailable');
  context.drawImage(picture, 0, 0, widthPx, heightPx);
  picture.close();
  const blob = await new Promise<Blob | null>((resolve) =>
    canvas.toBlob(resolve, 'image/jpeg', JPEG_QUALITY),
  );
  if (blob === null) throw new StoreError('unavailable');
  return { jpeg: new Uint8Array(await blob.arrayBuffer()), widthPx, heightPx };
}

async function decoded(file: Blob): Promise<ImageBitmap> {
  try {
    // The turn that the camera noted is applied now, because the note goes.
    return await createImageBitmap(file, { imageOrientation: 'from-image' });
  } catch (error) {
    throw new StoreError('damaged', error);
  }
}
