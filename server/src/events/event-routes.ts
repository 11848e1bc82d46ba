import { Presence } from '@riseback/contracts';
import type { Request } from 'express';
import * as z from 'zod';
import { badRequest } from '../platform/problem';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { EventService } from './event-service';
import { EventStream } from './event-stream';

/** A browser's first request cannot carry Last-Event-ID, so it names the version that it has here. */
const SinceQuery = z.object({ since: z.coerce.number().int().min(0).optional() });
const Version = z.coerce.number().int().min(0);

export function eventRoutes(service: EventService): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/events',
      summary:
        'Server-sent events: edit (its id is the version), solve, people, plan, revisions, comments, rounds, reload; Last-Event-ID or since resumes',
      permission: 'view',
      query: SinceQuery,
      answers: { 200: 'a stream of server-sent events (text/event-stream)' },
      handler: ({ access, query, req, res }) => {
        demandStreamReader(req);
        service.open(access, lastEventId(req) ?? query.since, () => new EventStream(res));
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/presence',
      summary: 'What the person has selected, for the others who have the network open',
      permission: 'view',
      body: Presence,
      answers: { 204: 'Taken' },
      handler: ({ access, body, res }) => {
        service.present(access, body);
        res.status(204).end();
      },
    }),
  ];
}

/** The answer never ends: whoever does not say that they read streams would wait for ever. */
export function demandStreamReader(req: Request): void {
  if (req.method === 'GET' && req.get('accept')?.includes('text/event-stream') === true) return;
  throw badRequest('This is a stream of server-sent events: ask with the header Accept: text/event-stream.');
}

function lastEventId(req: Request): number | undefined {
  const given = Version.safeParse(req.get('last-event-id') ?? Number.NaN);
  return given.success ? given.data : undefined;
}
