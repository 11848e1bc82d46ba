import { NewSignature, Revision, SigningQuery, SigningTerms, Verification } from '@riseback/contracts';
import { networkRoute, publicRoute, type Route } from '../platform/routes/route-table';
import { RevisionPath } from './revision-routes';
import type { SigningService } from './signing-service';
import type { VerificationService } from './verification-service';
import type { VerifyingKeys } from './verifying-keys';

export function signingRoutes(
  signing: SigningService,
  verification: VerificationService,
  keys: VerifyingKeys,
): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/revisions/:revisionId/signing',
      summary: 'What a signature of the reader would mean, word for word, before it is made',
      permission: 'sign',
      params: RevisionPath,
      query: SigningQuery,
      answers: { 200: SigningTerms },
      handler: ({ access, params, query, res }) => {
        res.json(signing.terms(access, params.revisionId, query.meaning) satisfies SigningTerms);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/revisions/:revisionId/signatures',
      summary: 'Sign a revision: the password (and a code, where turned on) again, and the token of what was shown',
      permission: 'sign',
      params: RevisionPath,
      body: NewSignature,
      answers: { 201: Revision },
      handler: async ({ access, params, body, req, res }) => {
        const revision = await signing.sign(access, params.revisionId, body, req.ip ?? '');
        res.status(201).json(revision satisfies Revision);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/revisions/:revisionId/verification',
      summary:
        'Whether inputs, results, events, signatures and log are as they were; and what the present engine makes of the inputs',
      permission: 'view',
      params: RevisionPath,
      answers: { 200: Verification },
      handler: async ({ access, params, res }) => {
        res.json((await verification.verify(access, params.revisionId)) satisfies Verification);
      },
    }),
    publicRoute({
      method: 'get',
      path: '/api/signing-key',
      summary: 'The public key (Ed25519, PEM) that signatures are verified with, and those of the keys before it',
      answers: { 200: 'PEM, the oldest key first' },
      handler: ({ res }) => {
        res.type('text/plain').send(keys.pem());
      },
    }),
  ];
}
