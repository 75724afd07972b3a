import { PHOTO_LIMIT } from '@/api-types/site-limits';

/** Longest sides of the photo that is sent and of the one that stays to look at, px. */
const FULL_PX = 2560;
const SMALL_PX = 480;

export type Shrunk =
  | { readonly ok: true; readonly full: ArrayBuffer; readonly small: ArrayBuffer }
  | { readonly ok: false; readonly why: string };

const drawn = async (image: ImageBitmap, most: number, quality: number): Promise<Blob | null> => {
  const scale = Math.min(1, most / Math.max(image.width, image.height));
  const canvas = document.createElement('canvas');
  canvas.width = Math.max(1, Math.round(image.width * scale));
  canvas.height = Math.max(1, Math.round(image.height * scale));
  canvas.getContext('2d')!.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/jpeg', quality));
};

/**
 * A photo drawn anew on the phone, upright and small enough for a weak signal. What the camera wrote beside the pixels, such
 * as where it was taken, is left behind here already; the server leaves it behind again.
 */
export const photoShrunk = async (file: Blob): Promise<Shrunk> => {
  let image: ImageBitmap;
  try {
    image = await createImageBitmap(file, { imageOrientation: 'from-image' });
  } catch {
    return { ok: false, why: 'This is not a photo that this phone can read. Take it again.' };
  }
  const full = await drawn(image, FULL_PX, 0.85);
  const small = await drawn(image, SMALL_PX, 0.75);
  image.close();
  if (!full || !small || full.size > PHOTO_LIMIT) {
    return { ok: false, why: 'This photo could not be made small enough to send. Take it again.' };
  }
  return { ok: true, full: await full.arrayBuffer(), small: await small.arrayBuffer() };
};
