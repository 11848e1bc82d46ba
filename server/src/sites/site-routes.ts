import { Site } from '@riseback/contracts';
import * as z from 'zod';
import { signedInRoute, siteRoute, type Route } from '../platform/routes/route-table';
import type { SiteService } from './site-service';

export function siteRoutes(service: SiteService): Route[] {
  return [
    signedInRoute({
      method: 'get',
      path: '/api/sites',
      summary: 'The sites where one has a role',
      answers: { 200: z.array(Site) },
      handler: ({ access, res }) => {
        res.json(service.list(access) satisfies Site[]);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId',
      summary: 'A site with the role one has there',
      permission: 'view',
      answers: { 200: Site },
      handler: ({ access, res }) => {
        res.json(service.get(access) satisfies Site);
      },
    }),
  ];
}
