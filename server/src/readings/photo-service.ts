import { PHOTO_LIMITS, type ImageType, type Reading } from '@riseback/contracts';
import { acceptedImage } from '../files/accepted-image';
import type { NetworkAccess } from '../platform/auth/access';
import { conflict, notFound, unprocessable } from '../platform/problem';
import { photoHash } from './photo-repository';
import type { ReadingRow } from './reading-repository';
import type { RoundRepository } from './round-repository';
import { entryOf, readingOf, type RoundParts } from './round-service';

export interface PhotoName {
  readonly readingId: string;
  readonly photoId: string;
}

const WORDS = { what: 'A photograph', advice: 'Send a PNG or a JPEG.' } as const;

/** Photographs of a dial or of what is in its way. They come after their reading, perhaps when its round is closed. */
export class PhotoService {
  constructor(private readonly parts: RoundParts) {}

  /**
   * Stores a photograph beside a reading; sent again, it is stored once.
   * @throws ProblemError 404 no such reading; 409 the id is taken by another photograph; 413, 415, 422 as `acceptedImage`; 422 the reading
   *   has as many as it may
   */
  add(
    access: NetworkAccess,
    { readingId, photoId }: PhotoName,
    sent: { readonly bytes: Uint8Array; readonly declared: string },
  ): Reading {
    const { mediaType, content } = acceptedImage(sent, PHOTO_LIMITS, WORDS);
    const sha256 = photoHash(content);
    const added = this.parts.rounds.transaction((rounds) => {
      const { roundId } = demandReading(rounds, access, readingId);
      const known = rounds.photos.find(photoId);
      if (known !== undefined) {
        if (known.readingId !== readingId || known.sha256 !== sha256) throw taken();
        return undefined;
      }
      if (rounds.photos.countOf(readingId) >= PHOTO_LIMITS.ofAReading) {
        throw unprocessable(
          `A reading has ${PHOTO_LIMITS.ofAReading} photographs at most, and none is ever taken away. Put more beside a correction.`,
        );
      }
      const now = this.parts.now();
      rounds.photos.insert({ id: photoId, readingId, mediaType, sha256, content, createdAt: now.toISOString() });
      const details = { roundId, photoId, mediaType, sizeBytes: content.length, sha256 };
      rounds.audit({ ...entryOf(access, now), action: 'reading.photo', subject: readingId, details });
      return roundId;
    });
    if (added !== undefined) this.parts.listener.roundsChanged(access.networkId, added);
    return readingOf(this.parts.rounds.readings.withName(readingId));
  }

  /** @throws ProblemError 404 */
  content(
    { networkId }: NetworkAccess,
    { readingId, photoId }: PhotoName,
  ): { readonly mediaType: ImageType; readonly content: Buffer } {
    const photo = this.parts.rounds.photos.content(networkId, readingId, photoId);
    if (photo === undefined) throw notFound('The reading has no such photograph.');
    return photo;
  }
}

function demandReading(rounds: RoundRepository, { networkId }: NetworkAccess, id: string): ReadingRow {
  const reading = rounds.readings.find(id);
  if (reading === undefined || rounds.find(reading.roundId)?.networkId !== networkId) {
    throw notFound('The network has no such reading; if it is still on its way, send the reading first.');
  }
  return reading;
}

function taken(): Error {
  return conflict('This id is taken by another photograph: give every photograph a new UUID.');
}
