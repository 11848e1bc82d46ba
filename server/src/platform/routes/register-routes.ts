import { Router, type Request, type Response } from 'express';
import type { AccessRules, SignedInPerson } from '../auth/access';
import type { SessionGate } from '../auth/session-gate';
import { parseRequest } from '../http/parse-request';
import { readBodyBytes, readJsonBody, readUpload, type UploadedBytes } from '../http/read-json-body';
import { methodNotAllowed } from '../problem';
import type { Route } from './route-table';

const NO_UPLOAD: UploadedBytes = { bytes: new Uint8Array(), declared: '' };

/** The one way of a request to a handler: who, from where, may they, and only then what they sent. */
export function registerRoutes(routes: readonly Route[], gate: SessionGate, rules: AccessRules): Router {
  const router = Router();
  for (const route of routes) {
    router[route.method](route.path, async (req, res) => {
      const person = gate.identify(req, res);
      if (route.mutates) demandOwnPages(route, gate, req, person);
      const access = accessOf(route, rules, req, person);
      await route.handle({
        access,
        params: route.params === undefined ? undefined : parseRequest(route.params, req.params, 'path'),
        query: route.query === undefined ? undefined : parseRequest(route.query, req.query, 'query'),
        body: await bodyOf(route, req, res),
        upload: route.upload === undefined ? NO_UPLOAD : await readUpload(req, res, route.upload),
        req,
        res,
      });
    });
  }
  for (const [path, methods] of methodsByPath(routes)) {
    router.all(path, () => {
      throw methodNotAllowed(methods);
    });
  }
  return router;
}

function demandOwnPages(route: Route, gate: SessionGate, req: Request, person: SignedInPerson | undefined): void {
  gate.demandSameOrigin(req);
  // Signing in has no session yet to bind a proof to; of the one that the browser may hold, a public route does no more than
  // end it once somebody has proved who they are.
  if (route.rule.kind !== 'public' && person !== undefined) gate.demandProof(req, person);
}

function accessOf(route: Route, rules: AccessRules, req: Request, person: SignedInPerson | undefined): unknown {
  switch (route.rule.kind) {
    case 'public':
      return undefined;
    case 'signedIn':
      return rules.signedIn(person);
    case 'site':
      return rules.site(person, String(req.params['siteId']), route.rule.anyOf);
    case 'network':
      return rules.network(person, String(req.params['networkId']), route.rule.anyOf);
  }
}

async function bodyOf(route: Route, req: Request, res: Response): Promise<unknown> {
  if (route.body === undefined) return undefined;
  const read = route.bodyAs === 'bytes' ? readBodyBytes : readJsonBody;
  return parseRequest(route.body, await read(req, res, route.bodyLimitBytes), 'body');
}

function methodsByPath(routes: readonly Route[]): Map<string, string[]> {
  const byPath = new Map<string, string[]>();
  for (const route of routes) {
    const methods = byPath.get(route.path) ?? [];
    byPath.set(route.path, [...methods, route.method.toUpperCase(), ...(route.method === 'get' ? ['HEAD'] : [])]);
  }
  return byPath;
}
