import type { Role } from '@riseback/contracts';
import { fromFile, layoutMissingPositions, readNetworkFile, type NetworkDocument } from '@riseback/network';
import { LibraryRepository } from '../src/library/library-repository';
import { LibraryService } from '../src/library/library-service';
import { NetworkRepository } from '../src/networks/network-repository';
import { NetworkService } from '../src/networks/network-service';
import { PeopleRepository } from '../src/people/people-repository';
import { appendAudit } from '../src/platform/db/audit';
import type { Database } from '../src/platform/db/database';
import { people } from '../src/platform/db/schema';
import type { SigningKey } from '../src/revisions/signing-key';
import { SiteRepository } from '../src/sites/site-repository';
import type { SolvePort } from '../src/solve/solve-port';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo-people';
import { seedLibrary } from './demo-library';
import { DEMO_AGE_MS, seedReadings } from './demo-readings';
import { demoHistory, seedRevisions, solveHistory, type DemoPersonHere } from './demo-revisions';
import ternQuay from './tern-quay.json';

export interface DemoParts {
  readonly db: Database;
  readonly solver: SolvePort;
  /** The demo's own signature is made with the installation's key. */
  readonly key: SigningKey;
  readonly hashPassword: (password: string) => Promise<string>;
  readonly newId: () => string;
  readonly now: () => Date;
}

/** Its solves are stored with it, and nobody has it open yet. */
const NO_SOLVES = { changed: () => undefined, summary: () => ({ state: 'stale' as const }) };
const NOBODY_TOLD = { edited: () => undefined };

/**
 * Fills a new database with the demo: one site, one person for each role, a trap library, one network with its results, two revisions of
 * it, and a month of readings. All of it or nothing; a database that holds a site or a person already is left as it is.
 * @returns whether it was filled
 */
export async function seedDemo({ db, solver, key, hashPassword, newId, now }: DemoParts): Promise<boolean> {
  if (!isNew(db)) return false;
  // one hash for all: each takes a third of a second, and everyone has the same password anyway
  const [passwordHash, solved] = await Promise.all([
    hashPassword(DEMO_PASSWORD),
    solveHistory(solver, demoHistory(demoNetwork())),
  ]);
  return db.transaction(
    () => {
      // someone may have come in while the hash was made
      if (!isNew(db)) return false;
      // everything is older than the readings that were taken in it
      const then = () => new Date(now().getTime() - DEMO_AGE_MS);
      const siteId = seedSite(db, newId(), then());
      const people = seedPeople(db, siteId, passwordHash, newId, then());
      const designer = withRole(people, 'designer');
      const library = new LibraryService(new LibraryRepository(db), newId, then);
      const history = demoHistory(seedLibrary(library, siteId, designer, demoNetwork()));
      const networks = new NetworkService(new NetworkRepository(db), NO_SOLVES, NOBODY_TOLD, newId, then);
      const reviewer = withRole(people, 'reviewer');
      const parts = { db, networks, key, newId, now: then, siteId, designer, reviewer };
      const networkId = seedRevisions(parts, history, solved);
      const version = 1 + history.edits.length;
      const present = { networkId, version, document: history.after, outcomes: solved[1].outcomes };
      const commissioning = withRole(people, 'commissioning');
      seedReadings({ db, newId, now, siteId, commissioning }, present);
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

/** @returns those with a role at the site */
function seedPeople(
  db: Database,
  siteId: string,
  passwordHash: string,
  newId: () => string,
  at: Date,
): DemoPersonHere[] {
  const repository = new PeopleRepository(db);
  const time = at.toISOString();
  return DEMO_PEOPLE.flatMap(({ email, name, role }) => {
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
    if (role === undefined) return [];
    repository.giveRole(id, siteId, role, null, { at, siteId, action: 'role.give', subject: id, details: { role } });
    return [{ id, name, role }];
  });
}

function withRole(people: readonly DemoPersonHere[], role: Role): DemoPersonHere {
  const person = people.find((each) => each.role === role);
  if (person === undefined) throw new Error(`the demo has no ${role}`);
  return person;
}

function demoNetwork(): NetworkDocument {
  const read = readNetworkFile(ternQuay);
  if (!read.ok) throw new Error(`server/demo/tern-quay.json: ${JSON.stringify(read.errors)}`);
  return layoutMissingPositions(fromFile(read.file));
}
