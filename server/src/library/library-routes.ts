import { LibraryModel, SavedLibraryModel } from '@riseback/contracts';
import * as z from 'zod';
import { versionETag, versionFromIfMatch } from '../platform/http/if-match';
import { siteRoute, type Route } from '../platform/routes/route-table';
import type { LibraryService } from './library-service';

const ModelPath = z.object({ modelId: z.string().min(1).max(64) });

export function libraryRoutes(service: LibraryService): Route[] {
  return [
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/library',
      summary: 'The trap models of a site, each in its newest version, retired ones too',
      permission: 'view',
      answers: { 200: z.array(LibraryModel) },
      handler: ({ access, res }) => {
        res.json(service.list(access) satisfies LibraryModel[]);
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/library',
      summary: 'Add a trap model to the library of a site',
      permission: 'draw',
      body: SavedLibraryModel,
      answers: { 201: LibraryModel },
      handler: ({ access, body, res }) => {
        const model = service.add(access, body) satisfies LibraryModel;
        res.status(201).location(`/api/sites/${access.siteId}/library/${model.id}`);
        res.set('ETag', versionETag(model.version)).json(model);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/library/:modelId',
      summary: 'A trap model of the library in its newest version, which is the ETag',
      permission: 'view',
      params: ModelPath,
      answers: { 200: LibraryModel },
      handler: ({ access, params, res }) => {
        const model = service.get(access, params.modelId) satisfies LibraryModel;
        res.set('ETag', versionETag(model.version)).json(model);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/library/:modelId/versions',
      summary: 'Every version of a trap model of the library, the newest first',
      permission: 'view',
      params: ModelPath,
      answers: { 200: z.array(LibraryModel) },
      handler: ({ access, params, res }) => {
        res.json(service.versions(access, params.modelId) satisfies LibraryModel[]);
      },
    }),
    siteRoute({
      method: 'put',
      path: '/api/sites/:siteId/library/:modelId',
      summary: 'Save a trap model as its next version, made on the version in If-Match',
      permission: 'draw',
      params: ModelPath,
      body: SavedLibraryModel,
      answers: { 200: LibraryModel },
      handler: ({ access, params, body, req, res }) => {
        const model = service.save(access, params.modelId, versionFromIfMatch(req), body) satisfies LibraryModel;
        res.set('ETag', versionETag(model.version)).json(model);
      },
    }),
  ];
}
