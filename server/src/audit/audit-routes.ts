import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { AuditExportQuery, AuditPage, AuditQuery } from '@riseback/contracts';
import { siteRoute, type Route } from '../platform/routes/route-table';
import type { AuditService } from './audit-service';

export function auditRoutes(service: AuditService): Route[] {
  return [
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/audit',
      summary: 'The log of a site, the newest entries first',
      permission: 'people',
      query: AuditQuery,
      answers: { 200: AuditPage },
      handler: ({ access, query, res }) => {
        res.json(service.page(access, query) satisfies AuditPage);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/audit-export',
      summary: 'The log of a site as a file, the oldest entries first, each with its hashes',
      permission: 'people',
      query: AuditExportQuery,
      answers: { 200: 'Comma-separated values (RFC 4180), or an array in JSON.' },
      handler: async ({ access, query, res }) => {
        res.type(query.format === 'csv' ? 'text/csv; charset=utf-8' : 'application/json; charset=utf-8');
        res.attachment(`riseback-log.${query.format}`);
        await pipeline(Readable.from(service.export(access, query)), res);
      },
    }),
  ];
}
