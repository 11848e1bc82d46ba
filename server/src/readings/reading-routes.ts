import { NewReading, NewRound, Reading, Round, RoundClosing, RoundSummary } from '@riseback/contracts';
import type { Request } from 'express';
import * as z from 'zod';
import { badRequest } from '../platform/problem';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { ReadingService } from './reading-service';
import type { RoundService } from './round-service';

const RoundPath = z.object({ roundId: z.string().min(1).max(64) });

export function readingRoutes(rounds: RoundService, readings: ReadingService): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/rounds',
      summary: 'The rounds of readings of a network, the newest first',
      permission: 'view',
      answers: { 200: z.array(RoundSummary) },
      handler: ({ access, res }) => {
        res.json(rounds.list(access) satisfies RoundSummary[]);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/rounds/:roundId',
      summary: 'A round with its readings, by device and number, those that were corrected too',
      permission: 'view',
      params: RoundPath,
      answers: { 200: Round },
      handler: ({ access, params, res }) => {
        res.json(rounds.get(access, params.roundId) satisfies Round);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/rounds',
      summary: 'Begin a round of readings in one case; sent again, it is the same round',
      permission: 'readings',
      body: NewRound,
      answers: { 201: Round },
      handler: ({ access, body, res }) => {
        res.status(201).json(rounds.begin(access, body) satisfies Round);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/rounds/:roundId/readings',
      summary: 'A reading, or a correction of one, with its id in Idempotency-Key; sent again, it is stored once',
      permission: 'readings',
      params: RoundPath,
      body: NewReading,
      answers: { 201: Reading },
      handler: ({ access, params, body, req, res }) => {
        demandKey(req, body.id);
        res.status(201).json(readings.take(access, params.roundId, body) satisfies Reading);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/rounds/:roundId/closing',
      summary: 'Close a round: nothing but corrections is taken after it',
      permission: 'readings',
      params: RoundPath,
      body: RoundClosing,
      answers: { 200: Round },
      handler: ({ access, params, body, res }) => {
        res.json(rounds.close(access, params.roundId, body) satisfies Round);
      },
    }),
  ];
}

/** The key by which whatever stands between may know a request that is sent again. */
function demandKey(req: Request, id: string): void {
  if (req.get('idempotency-key') === id) return;
  throw badRequest('Send the id of the reading in the header Idempotency-Key too, as it stands in the body.', [
    { pointer: 'Idempotency-Key', detail: `must be ${id}` },
  ]);
}
