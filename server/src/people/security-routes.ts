import {
  CodesBeginning,
  CodesBegun,
  CodesConfirmation,
  CodesProof,
  CodesState,
  PasswordChange,
  RecoveryCodes,
  Session,
} from '@riseback/contracts';
import type { Request } from 'express';
import type { SessionGate } from '../platform/auth/session-gate';
import { signedInRoute, type Route } from '../platform/routes/route-table';
import type { OwnSecurityService } from './own-security-service';
import type { SignInOrigin } from './credential-check';

export function originOf(req: Request): SignInOrigin {
  return { address: req.ip ?? '', agent: req.get('user-agent') ?? '' };
}

export function securityRoutes(security: OwnSecurityService, gate: SessionGate): Route[] {
  return [
    signedInRoute({
      method: 'post',
      path: '/api/password',
      summary: "Change one's own password. Every session ends, and the caller is given a new one.",
      body: PasswordChange,
      answers: { 200: Session },
      handler: async ({ access, body, req, res }) => {
        const { person, issued } = await security.changePassword(access, body, originOf(req));
        gate.give(res, issued);
        res.json({ person } satisfies Session);
      },
    }),
    signedInRoute({
      method: 'get',
      path: '/api/one-time-codes',
      summary: "Whether one's own sign-in asks for one-time codes.",
      answers: { 200: CodesState },
      handler: ({ access, res }) => {
        res.json(security.codesState(access) satisfies CodesState);
      },
    }),
    signedInRoute({
      method: 'post',
      path: '/api/one-time-codes',
      summary: 'A secret for an authenticator. Nothing is asked for at sign-in until a code has confirmed it.',
      body: CodesBeginning,
      answers: { 201: CodesBegun },
      handler: async ({ access, body, req, res }) => {
        const begun = await security.beginCodes(access, body.password, originOf(req).address);
        res.status(201).json(begun satisfies CodesBegun);
      },
    }),
    signedInRoute({
      method: 'post',
      path: '/api/one-time-codes/confirmation',
      summary: 'Turn one-time codes on with the first of them. The recovery codes are shown this once.',
      body: CodesConfirmation,
      answers: { 200: RecoveryCodes },
      handler: ({ access, body, res }) => {
        res.json({ recoveryCodes: security.confirmCodes(access, body.code) } satisfies RecoveryCodes);
      },
    }),
    signedInRoute({
      method: 'post',
      path: '/api/one-time-codes/removal',
      summary: 'Turn one-time codes off.',
      body: CodesProof,
      answers: { 204: 'Off.' },
      handler: async ({ access, body, req, res }) => {
        await security.turnCodesOff(access, body, originOf(req).address);
        res.status(204).end();
      },
    }),
    signedInRoute({
      method: 'post',
      path: '/api/recovery-codes',
      summary: 'Ten new recovery codes, in the place of those one has. They are shown this once.',
      body: CodesProof,
      answers: { 200: RecoveryCodes },
      handler: async ({ access, body, req, res }) => {
        const recoveryCodes = await security.renewRecoveryCodes(access, body, originOf(req).address);
        res.json({ recoveryCodes } satisfies RecoveryCodes);
      },
    }),
  ];
}
