import { fromFile, layoutMissingPositions, readNetworkFile, type NetworkDocument } from '@riseback/network';
import { LibraryRepository } from '../src/library/library-repository';
import { LibraryService } from '../src/library/library-service';
import type { NetworkService } from '../src/networks/network-service';
import { PeopleRepository } from '../src/people/people-repository';
import { appendAudit } from '../src/platform/db/audit';
import type { Database } from '../src/platform/db/database';
import { people } from '../src/platform/db/schema';
import { SiteRepository } from '../src/sites/site-repository';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo-people';
import { seedLibrary } from './demo-library';
import ternQuay from './tern-quay.json';

export interface DemoParts {
  readonly db: Database;
  readonly networks: Pick<NetworkService, 'createFor'>;
  readonly hashPassword: (password: string) => Promise<string>;
  readonly newId: () => string;
  readonly now: () => Date;
}

/**
 * Fills a new database with the demo: one site, one person for each role, a trap library, one network, whose solve starts at once. All of
 * it or nothing; a database that holds a site or a person already is left as it is.
 * @returns whether it was filled
 */
export async function seedDemo({ db, networks, hashPassword, newId, now }: DemoParts): Promise<boolean> {
  if (!isNew(db)) return false;
  // one hash for all: each takes a third of a second, and everyone has the same password anyway
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  return db.transaction(
    () => {
      // someone may have come in while the hash was made
      if (!isNew(db)) return false;
      const siteId = seedSite(db, newId(), now());
      const [designerId] = seedPeople(db, siteId, passwordHash, newId, now());
      const library = new LibraryService(new LibraryRepository(db), newId, now);
      const plant = seedLibrary(library, siteId, { id: designerId }, demoNetwork());
      networks.createFor(siteId, { id: designerId }, plant);
      return true;
    },
    { behavior: 'immediate' },
  );
}

function isNew(db: Database): boolean {
  const somebody = db.select({ id: people.id }).from(people).limit(1).get();
  return somebody === undefined && new SiteRepository(db).isEmpty();
}

function seedSite(db: Database, siteId: string, at: Date): string {
  const { name, site } = demoNetwork();
  new SiteRepository(db).insert({ id: siteId, name, ...site, createdAt: at.toISOString() });
  appendAudit(db, { at, siteId, action: 'site.create', subject: siteId, details: { name } });
  return siteId;
}

function seedPeople(
  db: Database,
  siteId: string,
  passwordHash: string,
  newId: () => string,
  at: Date,
): [string, ...string[]] {
  const repository = new PeopleRepository(db);
  const time = at.toISOString();
  const seed = ({ email, name, role }: (typeof DEMO_PEOPLE)[number]): string => {
    const id = newId();
    repository.insert(
      {
        id,
        email,
        name,
        passwordHash,
        passwordChangedAt: time,
        units: 'us',
        theme: 'system',
        timeZone: 'America/New_York',
        administersInstallation: role === 'administrator',
        disabledAt: null,
        createdAt: time,
      },
      { at, action: 'person.create', subject: id },
    );
    if (role !== undefined) {
      repository.giveRole(id, siteId, role, null, { at, siteId, action: 'role.give', subject: id, details: { role } });
    }
    return id;
  };
  const [first, ...others] = DEMO_PEOPLE;
  return [seed(first), ...others.map(seed)];
}

function demoNetwork(): NetworkDocument {
  const read = readNetworkFile(ternQuay);
  if (!read.ok) throw new Error(`server/demo/tern-quay.json: ${JSON.stringify(read.errors)}`);
  return layoutMissingPositions(fromFile(read.file));
}
