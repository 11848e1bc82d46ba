import { createHash, createHmac, createSecretKey, hkdfSync, timingSafeEqual, type KeyObject } from 'node:crypto';
import type { LinkPurpose, Role } from '@riseback/contracts';
import type { Queries } from '../platform/db/database';
import { notFound } from '../platform/problem';
import type { LinkRepository, LinkRow, NamedLink } from './link-repository';
import type { PeopleRepository } from './people-repository';

export const LINK_LIFE_MS = 24 * 60 * 60_000;

export interface NewLink {
  readonly purpose: LinkPurpose;
  readonly email: string;
  /** Of an invitation. */
  readonly to?: { readonly siteId: string; readonly role: Role };
  /** Absent where the person asked for it themselves. */
  readonly madeBy?: string;
}

/**
 * The links in invitations and resets. A token is made of the link's id and a key that the database does not hold, and
 * made anew when its mail is sent: whoever reads or writes the database alone can neither learn one nor plant one.
 */
export class OneTimeLinks {
  private readonly key: KeyObject;

  constructor(
    private readonly repository: LinkRepository,
    private readonly people: Pick<PeopleRepository, 'findByEmail'>,
    secret: string,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {
    this.key = createSecretKey(Buffer.from(hkdfSync('sha256', secret, 'riseback', 'one-time link', 32)));
  }

  make({ purpose, email, to, madeBy }: NewLink, tx: Queries): LinkRow {
    const id = this.newId();
    const madeAt = this.now();
    const row: LinkRow = {
      id,
      tokenHash: hashOf(this.tokenFor(id)),
      purpose,
      email,
      siteId: to?.siteId ?? null,
      role: to?.role ?? null,
      madeBy: madeBy ?? null,
      madeAt: madeAt.toISOString(),
      expiresAt: new Date(madeAt.getTime() + LINK_LIFE_MS).toISOString(),
      usedAt: null,
      withdrawnAt: null,
    };
    this.repository.insert(row, tx);
    return row;
  }

  /** For the mail. @returns undefined when the link does not count any more, or was made under another secret */
  tokenOf(id: string): string | undefined {
    const link = this.repository.find(id);
    if (link === undefined || !this.counts(link)) return undefined;
    const token = this.tokenFor(id);
    return hashOf(token) === link.tokenHash ? token : undefined;
  }

  /** @throws ProblemError 404, in the same words whatever is wrong with it */
  demand(token: string, purpose?: LinkPurpose): NamedLink {
    const link = this.repository.findByHash(hashOf(token));
    if (link === undefined || !this.isToken(token, link.id)) throw spent();
    if ((purpose !== undefined && link.purpose !== purpose) || !this.counts(link)) throw spent();
    return link;
  }

  /** Spends it, in the transaction of what it is spent on. @throws ProblemError 404 when somebody was faster */
  use(link: LinkRow, tx: Queries): void {
    if (!this.repository.use(link.id, this.now().toISOString(), tx)) throw spent();
  }

  /** Whether it would be taken now: of an invitation, also that who made it may still invite; of a reset, that the password is still the one of that time. */
  private counts(link: LinkRow): boolean {
    const { usedAt, withdrawnAt, expiresAt, purpose, siteId, role, madeBy, madeAt, email } = link;
    if (usedAt !== null || withdrawnAt !== null || expiresAt <= this.now().toISOString()) return false;
    if (purpose === 'invitation') {
      return siteId !== null && role !== null && madeBy !== null && this.repository.mayInvite(madeBy, siteId);
    }
    const person = this.people.findByEmail(email);
    return person !== undefined && person.disabledAt === null && person.passwordChangedAt <= madeAt;
  }

  private tokenFor(id: string): string {
    return createHmac('sha256', this.key).update(id).digest('base64url');
  }

  private isToken(token: string, id: string): boolean {
    const right = Buffer.from(this.tokenFor(id));
    const given = Buffer.from(token);
    return right.length === given.length && timingSafeEqual(right, given);
  }
}

function hashOf(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

function spent() {
  return notFound(
    'This link does not work any more: it was used or withdrawn, or is older than 24 hours. Ask for another.',
  );
}
