import type { OwnSession, Person, ProfileChange } from '@riseback/contracts';
import type { PersonAccess } from '../platform/auth/access';
import type { Sessions } from '../platform/auth/sessions';
import type { AuditEntry } from '../platform/db/audit';
import { badRequest, notFound } from '../platform/problem';
import type { PeopleRepository } from './people-repository';

/** What people see and change of their own. */
export class OwnAccountService {
  constructor(
    private readonly people: PeopleRepository,
    private readonly sessions: Sessions,
    private readonly now: () => Date,
  ) {}

  person(access: PersonAccess): Person {
    const row = this.people.find(access.person.id);
    if (row === undefined) throw notFound('This person is not known any more.');
    return this.people.profileOf(row);
  }

  changeProfile(access: PersonAccess, change: ProfileChange): Person {
    const { name, units, theme, timeZone, unwantedMails } = change;
    if (timeZone !== undefined && !isTimeZone(timeZone)) {
      throw badRequest('This time zone is not known.', [
        { pointer: '/timeZone', detail: 'give a name of the IANA time zone database, such as Europe/Lisbon' },
      ]);
    }
    const columns = {
      ...(name === undefined ? {} : { name }),
      ...(units === undefined ? {} : { units }),
      ...(theme === undefined ? {} : { theme }),
      ...(timeZone === undefined ? {} : { timeZone }),
    };
    if (unwantedMails !== undefined) this.people.setUnwantedMails(access.person.id, unwantedMails);
    const row = this.people.changeProfile(access.person.id, columns, this.renaming(access, name));
    if (row === undefined) throw notFound('This person is not known any more.');
    return this.people.profileOf(row);
  }

  ownSessions(access: PersonAccess): OwnSession[] {
    return this.sessions.listOf(access.person.id).map(({ id, agent, createdAt, seenAt }) => {
      return { id, agent, createdAt, seenAt, current: id === access.person.sessionId };
    });
  }

  signOut(access: PersonAccess): void {
    this.sessions.end(access.person.sessionId, access.person, 'signedOut');
  }

  endOtherSessions(access: PersonAccess): number {
    return this.sessions.endOthers(access.person);
  }

  endOwnSession(access: PersonAccess, sessionId: string): void {
    if (!this.sessions.end(sessionId, access.person, 'endedByOwner')) {
      throw notFound('You have no such session; it may have ended already.');
    }
  }

  /** Only a name is for the log: it stands in what others read. */
  private renaming({ person }: PersonAccess, to: string | undefined): AuditEntry | undefined {
    if (to === undefined || to === person.name) return undefined;
    const { id, name: from, sessionId } = person;
    return { at: this.now(), personId: id, sessionId, action: 'person.rename', subject: id, details: { from, to } };
  }
}

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}
