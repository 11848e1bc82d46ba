import { setTimeout as pause } from 'node:timers/promises';
import { passwordMistake, personalWords } from '@riseback/contracts';
import type { ResetCompletion } from '@riseback/contracts';
import type { MailQueue } from '../mail/mail-queue';
import type { SiteAccess } from '../platform/auth/access';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { SignInGuard } from '../platform/auth/sign-in-guard';
import type { Queries } from '../platform/db/database';
import { badRequest, codeNeeded, notFound, tooManyRequests, wrongCode } from '../platform/problem';
import type { LinkRepository } from './link-repository';
import type { OneTimeLinks } from './one-time-links';
import type { PeopleRepository, PersonRow } from './people-repository';
import type { SitePeopleRepository } from './site-people-repository';

const HOUR_MS = 60 * 60_000;
/** A request is answered after this time, in which all that it causes has long been done. */
const ANSWER_AFTER_MS = 250;
/** To one person, whoever asks and from wherever: nobody fills another's mailbox. */
const MOST_AN_HOUR = 5;

type Why = 'unknownAccount' | 'disabled' | 'tooManyMails' | 'tooManyAttempts' | 'wrongCode';

export interface ResetParts {
  readonly people: PeopleRepository;
  readonly sitePeople: SitePeopleRepository;
  readonly links: OneTimeLinks;
  readonly linkRows: LinkRepository;
  readonly mails: MailQueue;
  readonly passwords: Passwords;
  readonly codes: OneTimeCodes;
  /** Of its own: who asks for resets uses up nobody's attempts at signing in. */
  readonly guard: SignInGuard;
  readonly now: () => Date;
}

/** The way back for who has forgotten the password: a link to the address of the account. */
export class PasswordResetService {
  constructor(private readonly parts: ResetParts) {}

  /**
   * Sends a link where there is an account. Nothing that comes back tells whether there is one: each request counts as
   * an attempt, writes one transaction, and is answered after the same time.
   * @throws ProblemError 429 for many requests for one address, or from one
   */
  async request(email: string, address: string): Promise<void> {
    const turnedAway = () => this.note(undefined, 'tooManyAttempts', address);
    const attempt = () => {
      this.sendIfKnown(email, address);
      return Promise.resolve({ outcome: 'failed' as const });
    };
    const answerTime = pause(ANSWER_AFTER_MS);
    await this.parts.guard.guard({ email, address }, attempt, turnedAway);
    await answerTime;
  }

  /** In a transaction of the caller's, who has judged that the administrator may. @throws ProblemError 429 */
  sendFor({ person: by, siteId }: SiteAccess, person: { id: string; email: string }, tx: Queries): void {
    if (this.hasManyMails(person.email))
      throw tooManyRequests('This person was sent several links within the hour. Wait, then try again.', 900);
    const link = this.makeLink(person.email, by.id, tx);
    const data = { linkId: link.id, byName: by.name, expiresAt: link.expiresAt };
    this.parts.mails.enqueue(tx, { purpose: 'passwordReset', siteId, recipientId: person.id, data });
    const { id: personId, sessionId } = by;
    const at = this.parts.now();
    this.parts.people.note({ at, personId, sessionId, siteId, action: 'reset.send', subject: person.id });
  }

  /**
   * Sets the new password, which ends every session and makes every other reset of the person useless. Where codes are
   * on, one is asked for: a mailbox that somebody else reads must not be enough.
   * @throws ProblemError 404 for a link that does not count, 400 for a password that will not do, 401 for a code that is
   *   missing or wrong, 429 when codes are guessed
   */
  async complete({ token, newPassword, code }: ResetCompletion, address: string): Promise<void> {
    const { links, people, passwords, now } = this.parts;
    const { email } = links.demand(token, 'passwordReset');
    const person = this.demandPerson(email);
    const mistake = passwordMistake(newPassword, personalWords(person));
    if (mistake !== undefined) {
      throw badRequest('The new password will not do.', [{ pointer: '/newPassword', detail: mistake }]);
    }
    this.demandCode(person, code, address);
    const to = await passwords.hash(newPassword);
    people.inOneTransaction((tx) => {
      // as it is by now
      links.use(links.demand(token, 'passwordReset'), tx);
      const audit = { at: now(), personId: person.id, action: 'person.passwordReset', subject: person.id };
      people.changePassword(person.id, { to }, { ...audit, details: { address } });
      this.parts.linkRows.withdrawResets(email, now().toISOString(), tx);
    });
  }

  private sendIfKnown(email: string, address: string): void {
    const { people, sitePeople, mails, now } = this.parts;
    people.inOneTransaction((tx) => {
      const person = people.findByEmail(email);
      const why = this.whyNot(person);
      if (person === undefined || why !== undefined) {
        this.note(person, why ?? 'unknownAccount', address);
        return;
      }
      const link = this.makeLink(person.email, undefined, tx);
      const data = { linkId: link.id, expiresAt: link.expiresAt };
      // Its administrators may see that it was sent where the account is their site's alone.
      const siteId = sitePeople.onlySiteOf(person.id) ?? null;
      mails.enqueue(tx, { purpose: 'passwordReset', siteId, recipientId: person.id, data });
      people.note({ at: now(), action: 'reset.ask', subject: person.id, details: { address } });
    });
  }

  private whyNot(person: PersonRow | undefined): Why | undefined {
    if (person === undefined) return 'unknownAccount';
    if (person.disabledAt !== null) return 'disabled';
    return this.hasManyMails(person.email) ? 'tooManyMails' : undefined;
  }

  private makeLink(email: string, madeBy: string | undefined, tx: Queries) {
    this.parts.linkRows.withdrawResets(email, this.parts.now().toISOString(), tx);
    return this.parts.links.make({ purpose: 'passwordReset', email, ...(madeBy === undefined ? {} : { madeBy }) }, tx);
  }

  private hasManyMails(email: string): boolean {
    const since = new Date(this.parts.now().getTime() - HOUR_MS).toISOString();
    return this.parts.linkRows.resetsSince(email, since) >= MOST_AN_HOUR;
  }

  private demandPerson(email: string): PersonRow {
    const person = this.parts.people.findByEmail(email);
    if (person === undefined) throw notFound('This person is not known any more.');
    return person;
  }

  private demandCode(person: PersonRow, code: string | undefined, address: string): void {
    const { codes } = this.parts;
    if (!codes.areOn(person.id)) return;
    if (code === undefined) throw codeNeeded();
    if (codes.take(person.id, code, () => this.note(person, 'tooManyAttempts', address)) !== undefined) return;
    this.note(person, 'wrongCode', address);
    throw wrongCode();
  }

  /** Never what was typed as an address. */
  private note(person: PersonRow | undefined, why: Why, address: string): void {
    const subject = person?.id ?? 'unknown';
    this.parts.people.note({ at: this.parts.now(), action: 'reset.refuse', subject, details: { why, address } });
  }
}
