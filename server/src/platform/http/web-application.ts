import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router, type Request, type RequestHandler } from 'express';
import { notFound } from '../problem';
import { nonceOf } from './security-headers';

/** What index.html holds where the nonce belongs. */
const NONCE_PLACEHOLDER = 'CSP_NONCE';
/** Names such as main-ABCDEFGH.js change with their content. */
const HASHED_NAME = /-[A-Z0-9]{8}\.\w+(\.br|\.gz)?$/;
/** What the build lays beside a file, best first. */
const COMPRESSED = [
  { suffix: '.br', encoding: 'br' },
  { suffix: '.gz', encoding: 'gzip' },
] as const;

/**
 * The built pages. Every address that a person may open gets index.html, with this answer's nonce in it; a missing file
 * gets 404, since a page in the place of a script only hides what is wrong.
 * @param folder the browser build, with index.html in it
 */
export function webApplication(folder: string): Router {
  const index = readFileSync(join(folder, 'index.html'), 'utf8');
  const files = new Set(
    readdirSync(folder, { recursive: true }).map((path) => `/${String(path).replaceAll('\\', '/')}`),
  );
  const router = Router();
  router.use(preferCompressed(files));
  router.use(
    express.static(folder, {
      index: false,
      redirect: false,
      setHeaders: (res, path) => {
        res.setHeader('Cache-Control', HASHED_NAME.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache');
      },
    }),
  );
  router.use((req, res) => {
    if (!isNavigation(req)) throw notFound('There is no such file.');
    res
      .set('Cache-Control', 'no-store')
      .type('html')
      .send(index.replaceAll(NONCE_PLACEHOLDER, nonceOf(res)));
  });
  return router;
}

/** Serves the compressed form of a file where there is one that the browser takes. */
function preferCompressed(files: ReadonlySet<string>): RequestHandler {
  return (req, res, next) => {
    const forms = COMPRESSED.filter(({ suffix }) => files.has(req.path + suffix));
    if (forms.length > 0) res.vary('Accept-Encoding');
    const form = forms.find(({ encoding }) => req.acceptsEncodings(encoding) === encoding);
    if (form !== undefined) {
      res.type(req.path.slice(req.path.lastIndexOf('.'))).set('Content-Encoding', form.encoding);
      req.url = req.path + form.suffix;
    }
    next();
  };
}

function isNavigation(req: Request): boolean {
  const reads = req.method === 'GET' || req.method === 'HEAD';
  // No page's path has a dot in it (an element's tag may, but that stands in the query): what has one is a file.
  return reads && req.accepts(['json', 'html']) === 'html' && !req.path.includes('.');
}
