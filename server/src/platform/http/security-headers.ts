import { randomBytes } from 'node:crypto';
import type { RequestHandler, Response } from 'express';
import helmet from 'helmet';

const nonces = new WeakMap<object, string>();

/** The nonce of this answer's content security policy; the page's own style elements carry it. */
export function nonceOf(res: Response): string {
  const nonce = nonces.get(res);
  if (nonce === undefined) throw new Error('The security headers have not been set on this answer');
  return nonce;
}

/** @param https whether people open the application over https, so that browsers may be told never to do otherwise */
export function securityHeaders(https: boolean): RequestHandler {
  const headers = helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'"],
        // Angular adds the styles of components while it runs; the nonce admits those and no others.
        styleSrc: ["'self'", (_req, res) => `'nonce-${nonceOf(res as Response)}'`],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        manifestSrc: ["'self'"],
        workerSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'self'"],
        formAction: ["'none'"],
        frameAncestors: ["'none'"],
        requireTrustedTypesFor: ["'script'"],
        // the last is the pages' own: it gives the one address of the worker that reads a PDF
        trustedTypes: ['angular', 'angular#components', 'riseback#pdf-worker'],
      },
    },
    strictTransportSecurity: https ? { maxAge: 365 * 24 * 3600, includeSubDomains: false } : false,
    referrerPolicy: { policy: 'no-referrer' },
    xFrameOptions: { action: 'deny' },
  });
  return (req, res, next) => {
    nonces.set(res, randomBytes(18).toString('base64'));
    headers(req, res, next);
  };
}
