import { Site, SiteSettings, SiteSettingsChange } from '@riseback/contracts';
import * as z from 'zod';
import { signedInRoute, siteRoute, type Route } from '../platform/routes/route-table';
import type { SiteService } from './site-service';
import type { SiteSettingsService } from './site-settings-service';

export function siteRoutes(service: SiteService, settings: SiteSettingsService): Route[] {
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
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/settings',
      summary: 'What new networks of a site begin with, and how its elements are tagged',
      permission: 'view',
      answers: { 200: SiteSettings },
      handler: ({ access, res }) => {
        res.json(settings.get(access) satisfies SiteSettings);
      },
    }),
    siteRoute({
      method: 'patch',
      path: '/api/sites/:siteId/settings',
      summary: 'Change some settings of a site; networks that are there already keep what they have',
      permission: 'draw',
      body: SiteSettingsChange,
      answers: { 200: SiteSettings },
      handler: ({ access, body, res }) => {
        res.json(settings.change(access, body) satisfies SiteSettings);
      },
    }),
  ];
}
