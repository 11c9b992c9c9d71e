/** Longest side kept: enough to find the spot again, small enough for a packet of a thousand readings. */
const LONGEST_PX = 1280;
const QUALITY = 0.8;

export interface PhotoJpeg {
  readonly jpeg: Uint8Array;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Scales a picture down and writes it as JPEG, which also leaves out where and when it was taken. */
export async function photoJpeg(image: Blob): Promise<PhotoJpeg> {
  const bitmap = await createImageBitmap(image);
  const scale = Math.min(1, LONGEST_PX / Math.max(bitmap.width, bitmap.height));
  const widthPx = Math.max(1, Math.round(bitmap.width * scale));
  const heightPx = Math.max(1, Math.round(bitmap.height * scale));
  const canvas = document.createElement('canvas');
  canvas.width = widthPx;
  canvas.height = heightPx;
  canvas.getContext('2d')?.drawImage(bitmap, 0, 0, widthPx, heightPx);
  bitmap.close();
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/jpeg', QUALITY));
  if (!blob) throw new TypeError('photoJpeg: this browser cannot write JPEG');
  return { jpeg: new Uint8Array(await blob.arrayBuffer()), widthPx, heightPx };
}
