import type { IncomingMessage } from 'node:http';
import type { CookieOptions, Request, Response } from 'express';
import { forgedRequest } from '../problem';
import type { SignedInPerson } from './access';
import type { CheckedSession, IssuedSession, Sessions } from './sessions';
import type { SessionTokens } from './session-token';

/** Angular's own pair of names. */
const PROOF_COOKIE = 'XSRF-TOKEN';
const PROOF_HEADER = 'x-xsrf-token';

/** Where HTTP meets sessions: cookies in and out, and proof that a change was asked for by our own pages. */
export class SessionGate {
  private readonly cookieName: string;
  private readonly secure: boolean;
  private readonly found = new WeakMap<IncomingMessage, CheckedSession | undefined>();

  /** @param origin the address people open, when it is not the one the request names */
  constructor(
    private readonly sessions: Sessions,
    private readonly tokens: SessionTokens,
    private readonly origin: URL | undefined,
    private readonly now: () => Date,
  ) {
    this.secure = origin?.protocol === 'https:';
    // Browsers take the prefix over https only; it keeps a neighbouring host from planting a cookie.
    this.cookieName = this.secure ? '__Host-riseback-session' : 'riseback-session';
  }

  /** Who is signed in; renews the cookies when due. Asks the database once a request. */
  identify(req: Request, res: Response): SignedInPerson | undefined {
    if (!this.found.has(req)) {
      const token: unknown = (req.cookies as Record<string, unknown>)[this.cookieName];
      const checked = typeof token === 'string' ? this.sessions.check(token) : undefined;
      if (checked?.renewed !== undefined) this.give(res, checked.renewed);
      this.found.set(req, checked);
    }
    return this.found.get(req)?.person;
  }

  /** Who `identify` found, for the log, which asks when all is done. */
  identified(req: IncomingMessage): SignedInPerson | undefined {
    return this.found.get(req)?.person;
  }

  give(res: Response, issued: IssuedSession): void {
    const maxAge = issued.expiresAt.getTime() - this.now().getTime();
    res.cookie(this.cookieName, issued.token, { ...this.cookie(true), maxAge });
    res.cookie(PROOF_COOKIE, this.tokens.forgeryProof(issued.sessionId), { ...this.cookie(false), maxAge });
  }

  take(res: Response): void {
    res.clearCookie(this.cookieName, this.cookie(true));
    res.clearCookie(PROOF_COOKIE, this.cookie(false));
  }

  /** @throws ProblemError 403 when the browser says that another origin asks */
  demandSameOrigin(req: Request): void {
    const site = req.get('sec-fetch-site');
    if (site !== undefined && site !== 'same-origin') {
      throw forgedRequest('Changes are accepted from the pages of this application only (Sec-Fetch-Site).');
    }
    const origin = req.get('origin');
    const own = this.origin?.origin ?? `${req.protocol}://${req.host}`;
    if (origin !== undefined && origin !== own) {
      throw forgedRequest('Changes are accepted from the pages of this application only (Origin).');
    }
  }

  /** @throws ProblemError 403 when the header does not repeat the session's own proof */
  demandProof(req: Request, person: SignedInPerson): void {
    if (!this.tokens.proves(person.sessionId, req.get(PROOF_HEADER))) {
      throw forgedRequest('Send the value of the cookie XSRF-TOKEN in the header X-XSRF-TOKEN, then try again.');
    }
  }

  private cookie(httpOnly: boolean): CookieOptions {
    return { httpOnly, secure: this.secure, sameSite: 'strict', path: '/' };
  }
}
