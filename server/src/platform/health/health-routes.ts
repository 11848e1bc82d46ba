import * as z from 'zod';
import { publicRoute, type Route } from '../routes/route-table';
import type { ReadinessCheck } from './readiness';

const Alive = z.object({ alive: z.literal(true) });
const Ready = z.object({ ready: z.boolean(), database: z.boolean(), disk: z.boolean(), worker: z.boolean() });

export function healthRoutes(readiness: ReadinessCheck): Route[] {
  return [
    publicRoute({
      method: 'get',
      path: '/healthz',
      summary: 'Whether the process answers.',
      answers: { 200: Alive },
      handler: ({ res }) => {
        res.set('Cache-Control', 'no-store').json({ alive: true } satisfies z.infer<typeof Alive>);
      },
    }),
    publicRoute({
      method: 'get',
      path: '/readyz',
      summary: 'Whether it can write, has room on its disk and can solve.',
      answers: { 200: Ready, 503: Ready },
      handler: async ({ res }) => {
        const parts = await readiness.check();
        const ready = parts.database && parts.disk && parts.worker;
        res.set('Cache-Control', 'no-store').status(ready ? 200 : 503);
        res.json({ ready, ...parts } satisfies z.infer<typeof Ready>);
      },
    }),
  ];
}
