import { PHOTO_LIMITS } from '@riseback/contracts';

/** Enough to read a dial by. */
const LONGEST_SIDE_PX = 1_600;
/** Tried from the left until the photograph is small enough. */
const QUALITIES = [0.85, 0.7, 0.5] as const;

export type ShrunkPhoto =
  | { readonly ok: true; readonly mediaType: string; readonly content: ArrayBuffer }
  | { readonly ok: false; readonly reason: string };

/** A photograph as it goes to the server: a JPEG within the limits, without what the camera wrote into the file about place and owner. */
export async function shrinkPhoto(file: Blob): Promise<ShrunkPhoto> {
  let picture: ImageBitmap;
  try {
    picture = await createImageBitmap(file, { imageOrientation: 'from-image' });
  } catch {
    return { ok: false, reason: 'This file is not a picture that the browser can read. Take a JPEG or PNG.' };
  }
  const scale = Math.min(1, LONGEST_SIDE_PX / Math.max(picture.width, picture.height));
  const canvas = document.createElement('canvas');
  canvas.width = Math.max(1, Math.round(picture.width * scale));
  canvas.height = Math.max(1, Math.round(picture.height * scale));
  canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height);
  picture.close();
  for (const quality of QUALITIES) {
    const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/jpeg', quality));
    if (blob !== null && blob.size <= PHOTO_LIMITS.bytes) {
      return { ok: true, mediaType: 'image/jpeg', content: await blob.arrayBuffer() };
    }
  }
  return { ok: false, reason: 'The photograph cannot be made small enough. Take it again from closer by.' };
}
