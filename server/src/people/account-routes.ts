import { OwnSession, Person, ProfileChange, Session, SessionsEnded, SignIn } from '@riseback/contracts';
import * as z from 'zod';
import type { SessionGate } from '../platform/auth/session-gate';
import { publicRoute, signedInRoute, type Route } from '../platform/routes/route-table';
import type { OwnAccountService } from './own-account-service';
import { originOf } from './security-routes';
import type { SignInService } from './sign-in-service';

export function accountRoutes(signIn: SignInService, account: OwnAccountService, gate: SessionGate): Route[] {
  return [
    publicRoute({
      method: 'post',
      path: '/api/session',
      summary:
        'Sign in, with a one-time or recovery code where codes are on. Sets the session cookie and XSRF-TOKEN; a session that the browser held until then ends.',
      body: SignIn,
      answers: { 200: Session },
      handler: async ({ body, req, res }) => {
        const { person, issued } = await signIn.signIn(body, originOf(req), gate.identify(req, res));
        gate.give(res, issued);
        res.json({ person } satisfies Session);
      },
    }),
    signedInRoute({
      method: 'get',
      path: '/api/session',
      summary: 'Who is signed in.',
      answers: { 200: Session },
      handler: ({ access, res }) => {
        res.json({ person: account.person(access) } satisfies Session);
      },
    }),
    signedInRoute({
      method: 'delete',
      path: '/api/session',
      summary: 'Sign out. The session is dead at once, wherever its cookie may have gone.',
      answers: { 204: 'Signed out.' },
      handler: ({ access, res }) => {
        account.signOut(access);
        gate.take(res);
        res.status(204).end();
      },
    }),
    signedInRoute({
      method: 'patch',
      path: '/api/profile',
      summary: "Change one's own name, units, theme or time zone.",
      body: ProfileChange,
      answers: { 200: Person },
      handler: ({ access, body, res }) => {
        res.json(account.changeProfile(access, body) satisfies Person);
      },
    }),
    signedInRoute({
      method: 'get',
      path: '/api/own-sessions',
      summary: "One's own sessions, the latest first.",
      answers: { 200: z.array(OwnSession) },
      handler: ({ access, res }) => {
        res.json(account.ownSessions(access) satisfies OwnSession[]);
      },
    }),
    signedInRoute({
      method: 'delete',
      path: '/api/own-sessions',
      summary: "End all of one's own sessions but this one.",
      answers: { 200: SessionsEnded },
      handler: ({ access, res }) => {
        res.json({ ended: account.endOtherSessions(access) } satisfies SessionsEnded);
      },
    }),
    signedInRoute({
      method: 'delete',
      path: '/api/own-sessions/:sessionId',
      summary: "End one of one's own sessions, such as one left open on a shared computer.",
      params: z.object({ sessionId: z.string() }),
      answers: { 204: 'Ended.' },
      handler: ({ access, params, res }) => {
        account.endOwnSession(access, params.sessionId);
        res.status(204).end();
      },
    }),
  ];
}
