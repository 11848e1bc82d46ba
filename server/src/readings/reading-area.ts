import type { Database } from '../platform/db/database';
import type { Route } from '../platform/routes/route-table';
import { photoRoutes } from './photo-routes';
import { PhotoService } from './photo-service';
import { readingRoutes } from './reading-routes';
import { ReadingService } from './reading-service';
import { RoundDocuments, type RoundNetworks } from './round-documents';
import { RoundRepository } from './round-repository';
import { RoundService, type RoundListener } from './round-service';

export interface ReadingAreaParts {
  readonly db: Database;
  readonly networks: RoundNetworks;
  readonly listener: RoundListener;
  readonly now: () => Date;
}

/** Builds all of readings by hand, as app.ts does for the rest. */
export function buildReadingArea({ db, networks, listener, now }: ReadingAreaParts): { readonly routes: Route[] } {
  const parts = { rounds: new RoundRepository(db), documents: new RoundDocuments(networks), listener, now };
  return {
    routes: [
      ...readingRoutes(new RoundService(parts), new ReadingService(parts)),
      ...photoRoutes(new PhotoService(parts)),
    ],
  };
}
