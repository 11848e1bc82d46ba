import { IMAGE_TYPES, IMAGE_WORDS, type ImageFacts, readImage } from '@riseback/contracts';
import { payloadTooLarge, unprocessable, unsupportedMediaType } from '../platform/problem';

/** What an image may be at most. */
export interface ImageLimits {
  readonly bytes: number;
  readonly pixels: number;
  readonly sidePx: number;
}

export interface AcceptedImage extends ImageFacts {
  /** The bytes of the image alone: what someone hung behind its end is not kept. */
  readonly content: Buffer;
}

/**
 * An upload, once its own bytes have said that it is a whole image of the kind that it was sent as.
 * @param what as it stands in a refusal, such as "A plan"
 * @param advice of how to come to an image that is taken
 * @throws ProblemError 413 too many bytes; 415 another kind of file, or not the kind that it was said to be; 422 not whole, or too many pixels
 */
export function acceptedImage(
  { bytes, declared }: { readonly bytes: Uint8Array; readonly declared: string },
  limits: ImageLimits,
  { what, advice }: { readonly what: string; readonly advice: string },
): AcceptedImage {
  if (bytes.length > limits.bytes) throw payloadTooLarge(`${what} may hold ${megabytes(limits.bytes)} at most.`);
  const reading = readImage(bytes);
  if (!reading.ok) {
    throw reading.wrong === 'kind'
      ? unsupportedMediaType(`${reading.reason} ${advice}`)
      : unprocessable(reading.reason);
  }
  const { image } = reading;
  const said = IMAGE_TYPES.find((type) => type === declared);
  if (said !== image.mediaType) {
    throw unsupportedMediaType(`The header says ${declared}, but this is a ${IMAGE_WORDS[image.mediaType]}.`);
  }
  const { widthPx, heightPx, endByte } = image;
  if (widthPx * heightPx > limits.pixels || Math.max(widthPx, heightPx) > limits.sidePx) {
    throw unprocessable(
      `The image has ${widthPx} by ${heightPx} pixels; ${limits.pixels / 1e6} million in all and ${limits.sidePx} a side are the most. Make it smaller.`,
    );
  }
  return { ...image, content: Buffer.from(bytes.subarray(0, endByte)) };
}

function megabytes(bytes: number): string {
  return `${bytes / (1024 * 1024)} MB`;
}
