import { IMAGE_TYPES, type ImageType, otherKind, PLAN_LIMITS, readImage } from '@riseback/contracts';

/** Why a file cannot lie under the drawing, in words for whoever chose it. */
export class PlanFileError extends Error {
  override readonly name = 'PlanFileError';
}

export interface PreparedImage {
  readonly content: Blob;
  readonly widthPx: number;
  readonly heightPx: number;
  /** What was done to the file, if anything. */
  readonly note: string;
}

/** The largest file that is even looked at: a PDF of many sheets may be far larger than one page of it. */
const LARGEST_FILE_BYTES = 100 * 1024 * 1024;
/** A page is drawn as large as this; on an A1 sheet a pixel is then a fifth of a millimetre. */
export const PAGE_SIDE_PX = 4_096;
const JPEG_QUALITY = 0.9;
const SHRINK_STEP = 0.75;
const LEAST_SIDE_PX = 400;

export async function bytesOf(file: File): Promise<Uint8Array<ArrayBuffer>> {
  if (file.size > LARGEST_FILE_BYTES) {
    throw new PlanFileError(
      `It has ${(file.size / 1e6).toFixed(0)} MB; ${String(LARGEST_FILE_BYTES / 1048576)} MB are the most.`,
    );
  }
  try {
    return new Uint8Array(await file.arrayBuffer());
  } catch {
    throw new PlanFileError(
      'The browser cannot read it. It may have been moved, or is open elsewhere: choose it again.',
    );
  }
}

export function isPdf(bytes: Uint8Array): boolean {
  // readers allow some bytes before the mark (ISO 32000-2, annex H)
  return String.fromCharCode(...bytes.subarray(0, 1024)).includes('%PDF-');
}

/**
 * An image as the server takes it. One that is larger, or that is to be turned before it is shown, is drawn anew; anything else goes as
 * it is. @throws PlanFileError
 */
export async function prepareImage(bytes: Uint8Array<ArrayBuffer>): Promise<PreparedImage> {
  const reading = readImage(bytes);
  if (!reading.ok) {
    if (reading.wrong === 'kind') throw new PlanFileError(`It is ${otherKind(bytes)}. Choose a PNG, a JPEG or a PDF.`);
    throw new PlanFileError(`${reading.reason} Export it again, or choose another.`);
  }
  const { mediaType, widthPx, heightPx, endByte } = reading.image;
  if (widthPx * heightPx > PLAN_LIMITS.pixels * 4) {
    throw new PlanFileError(
      `It has ${String(widthPx)} by ${String(heightPx)} pixels, more than a browser can hold. Make it smaller.`,
    );
  }
  const content = new Blob([bytes.subarray(0, endByte)], { type: mediaType });
  const picture = await decoded(content);
  try {
    const isTurned = picture.width !== widthPx || picture.height !== heightPx;
    const isLarge =
      content.size > PLAN_LIMITS.bytes ||
      widthPx * heightPx > PLAN_LIMITS.pixels ||
      Math.max(widthPx, heightPx) > PLAN_LIMITS.sidePx;
    if (!isTurned && !isLarge) return { content, widthPx, heightPx, note: '' };
    const canvas = document.createElement('canvas');
    const share = Math.min(
      1,
      Math.sqrt(PLAN_LIMITS.pixels / (picture.width * picture.height)),
      PLAN_LIMITS.sidePx / Math.max(picture.width, picture.height),
    );
    drawInto(canvas, picture, Math.floor(picture.width * share), Math.floor(picture.height * share));
    return await imageOfCanvas(canvas, mediaType);
  } finally {
    picture.close();
  }
}

/** What a canvas shows, within the limits: a PNG if it fits, else a JPEG, else a smaller one. */
export async function imageOfCanvas(
  canvas: HTMLCanvasElement,
  preferred: ImageType = 'image/png',
): Promise<PreparedImage> {
  const types = preferred === 'image/png' ? IMAGE_TYPES : [preferred];
  for (const type of types) {
    const content = await encoded(canvas, type);
    if (content.size <= PLAN_LIMITS.bytes) {
      const { width: widthPx, height: heightPx } = canvas;
      return { content, widthPx, heightPx, note: `Drawn anew with ${String(widthPx)} by ${String(heightPx)} pixels.` };
    }
  }
  const smaller = document.createElement('canvas');
  const [width, height] = [Math.floor(canvas.width * SHRINK_STEP), Math.floor(canvas.height * SHRINK_STEP)];
  if (Math.max(width, height) < LEAST_SIDE_PX) throw new PlanFileError('It cannot be made small enough.');
  drawInto(smaller, canvas, width, height);
  return imageOfCanvas(smaller, 'image/jpeg');
}

async function decoded(content: Blob): Promise<ImageBitmap> {
  try {
    return await createImageBitmap(content);
  } catch {
    throw new PlanFileError(
      'The browser cannot show it: the picture in it is damaged. Export it again, or choose another.',
    );
  }
}

function drawInto(canvas: HTMLCanvasElement, picture: CanvasImageSource, width: number, height: number): void {
  canvas.width = width;
  canvas.height = height;
  canvas.getContext('2d')?.drawImage(picture, 0, 0, width, height);
}

function encoded(canvas: HTMLCanvasElement, type: ImageType): Promise<Blob> {
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (content) => {
        if (content === null) reject(new PlanFileError('The browser has no room to draw it. Make it smaller.'));
        else resolve(content);
      },
      type,
      JPEG_QUALITY,
    );
  });
}
