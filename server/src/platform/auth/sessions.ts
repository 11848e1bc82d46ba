import type { AuditEntry } from '../db/audit';
import type { SignedInPerson } from './access';
import type { SessionEnd, SessionRepository, SessionRow } from './session-repository';
import type { SessionTokens } from './session-token';

const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
export const IDLE_LIMIT_MS = 12 * HOUR_MS;
export const LONGEST_SESSION_MS = 7 * 24 * HOUR_MS;
/** Renewing at each request would make every read a write. */
export const RENEW_AFTER_MS = 5 * MINUTE_MS;

const LONGEST_AGENT = 200;

/** What the browser is given: the token and until when it may be idle. */
export interface IssuedSession {
  readonly sessionId: string;
  readonly token: string;
  readonly expiresAt: Date;
}

export interface CheckedSession {
  readonly person: SignedInPerson;
  /** Present when the browser's token is due for a fresh one. */
  readonly renewed?: IssuedSession;
}

/** The life of a session. The row decides at every request; the token only names it. */
export class Sessions {
  constructor(
    private readonly repository: SessionRepository,
    private readonly tokens: SessionTokens,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {}

  /** @param details how the person proved who they are, for the log */
  start(personId: string, agent: string, details: AuditEntry['details'] = {}): IssuedSession {
    const now = this.now();
    const endsAt = after(now, LONGEST_SESSION_MS);
    const idleUntil = after(now, IDLE_LIMIT_MS);
    const at = now.toISOString();
    const id = this.newId();
    const row: SessionRow = {
      id,
      personId,
      createdAt: at,
      seenAt: at,
      idleUntil: idleUntil.toISOString(),
      endsAt: endsAt.toISOString(),
      endedAt: null,
      endedWhy: null,
      agent: agent.slice(0, LONGEST_AGENT),
    };
    this.repository.start(row, { at: now, personId, sessionId: id, action: 'session.start', subject: id, details });
    return { sessionId: id, token: this.tokens.sign(id, now, idleUntil), expiresAt: idleUntil };
  }

  /** @returns undefined when the token names no session that may be used now */
  check(token: string): CheckedSession | undefined {
    const now = this.now();
    const claims = this.tokens.read(token, now);
    if (claims === undefined) return undefined;
    const live = this.repository.findLive(claims.sessionId, now.toISOString());
    if (live === undefined) return undefined;
    if (now.getTime() - claims.issuedAt.getTime() < RENEW_AFTER_MS) return { person: live.person };
    return { person: live.person, renewed: this.renew(live.session, now) };
  }

  /** Whether a session that was checked before may still be used; for what outlives a request. */
  isLive(sessionId: string): boolean {
    return this.repository.findLive(sessionId, this.now().toISOString()) !== undefined;
  }

  /** @returns false when the person has no such live session */
  end(sessionId: string, person: SignedInPerson, why: SessionEnd, at = this.now()): boolean {
    const audit = { at, personId: person.id, sessionId: person.sessionId, action: 'session.end', subject: sessionId };
    return this.repository.end(sessionId, person.id, why, audit);
  }

  /** Ends all of the person's sessions but the one they ask from. @returns how many there were */
  endOthers(person: SignedInPerson): number {
    const now = this.now();
    const others = this.listOf(person.id).filter(({ id }) => id !== person.sessionId);
    return others.filter(({ id }) => this.end(id, person, 'endedByOwner', now)).length;
  }

  listOf(personId: string): SessionRow[] {
    return this.repository.listLive(personId, this.now().toISOString());
  }

  private renew(session: SessionRow, now: Date): IssuedSession {
    const idleUntil = new Date(Math.min(after(now, IDLE_LIMIT_MS).getTime(), Date.parse(session.endsAt)));
    this.repository.renew(session.id, now.toISOString(), idleUntil.toISOString());
    return { sessionId: session.id, token: this.tokens.sign(session.id, now, idleUntil), expiresAt: idleUntil };
  }
}

function after(start: Date, ms: number): Date {
  return new Date(start.getTime() + ms);
}
