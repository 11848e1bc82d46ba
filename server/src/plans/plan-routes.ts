import { IMAGE_TYPES, NetworkPlan, PLAN_LIMITS, PlanPlacement, PlanUpload } from '@riseback/contracts';
import * as z from 'zod';
import { versionETag, versionFromIfMatch } from '../platform/http/if-match';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { PlanService } from './plan-service';

const FilePath = z.object({ fileId: z.string().min(1).max(64) });

export function planRoutes(service: PlanService): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/plan',
      summary: 'The plan under the drawing and where it lies; its version is the ETag',
      permission: 'view',
      answers: { 200: NetworkPlan },
      handler: ({ access, res }) => {
        const plan = service.get(access) satisfies NetworkPlan;
        res.set('ETag', versionETag(plan.version)).json(plan);
      },
    }),
    networkRoute({
      method: 'put',
      path: '/api/networks/:networkId/plan',
      summary: 'Place the plan under the drawing, from the version in If-Match',
      permission: 'draw',
      body: PlanPlacement,
      answers: { 200: NetworkPlan },
      handler: ({ access, body, req, res }) => {
        const plan = service.place(access, versionFromIfMatch(req), body) satisfies NetworkPlan;
        res.set('ETag', versionETag(plan.version)).json(plan);
      },
    }),
    networkRoute({
      method: 'delete',
      path: '/api/networks/:networkId/plan',
      summary: 'Take the plan away with its image, from the version in If-Match',
      permission: 'draw',
      answers: { 200: NetworkPlan },
      handler: ({ access, req, res }) => {
        const plan = service.remove(access, versionFromIfMatch(req)) satisfies NetworkPlan;
        res.set('ETag', versionETag(plan.version)).json(plan);
      },
    }),
    networkRoute({
      method: 'put',
      path: '/api/networks/:networkId/plan/image',
      summary: 'Put an image under the drawing, in the place of the one before, from the version in If-Match',
      permission: 'draw',
      query: PlanUpload,
      upload: { types: IMAGE_TYPES, limitBytes: PLAN_LIMITS.bytes },
      answers: { 200: NetworkPlan },
      handler: ({ access, query, upload, req, res }) => {
        const version = versionFromIfMatch(req);
        const plan = service.upload(access, version, { ...query, ...upload }) satisfies NetworkPlan;
        res.set('ETag', versionETag(plan.version)).json(plan);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/plan/image/:fileId',
      summary: 'The image of the plan; another image has another address',
      permission: 'view',
      params: FilePath,
      answers: { 200: 'a PNG or a JPEG' },
      handler: ({ access, params, res }) => {
        const { mediaType, content } = service.image(access, params.fileId);
        // a name made anew, whatever the file was called where it came from
        res.set('Content-Disposition', `inline; filename="plan.${mediaType === 'image/png' ? 'png' : 'jpg'}"`);
        res.type(mediaType).send(content);
      },
    }),
  ];
}
