import { NetworkResults, SolveResult } from '@riseback/contracts';
import * as z from 'zod';
import { sendReadyJson } from '../platform/http/ready-json';
import { networkRoute, signedInRoute, SOLVED_FILE_LIMIT_BYTES, type Route } from '../platform/routes/route-table';
import type { ResultService } from './result-service';

/** Read by `readNetworkFile` in the solver's thread, whose mistakes point further than a schema's. */
const NetworkFileText = z
  .instanceof(Uint8Array)
  .meta({ description: 'A network file, format riseback-network version 1' });
const CaseQuery = z.object({ case: z.string().max(64).optional() });
const ResultsQuery = z.object({
  version: z.coerce.number().int().min(1).optional(),
  /** `later`: answers as soon as there are pressures, marked `bandsToCome` where each trap's bands and what hangs on them are not. */
  bands: z.enum(['later']).optional(),
});

export function solveRoutes(service: ResultService): Route[] {
  return [
    signedInRoute({
      method: 'post',
      path: '/api/solve',
      summary: 'Solve one case of a network file without storing it',
      query: CaseQuery,
      body: NetworkFileText,
      bodyAs: 'bytes',
      bodyLimitBytes: SOLVED_FILE_LIMIT_BYTES,
      answers: { 200: SolveResult },
      handler: async ({ access, query, body, res }) => {
        res.type('json').send(asBuffer(await service.solveText(access, body, query.case)));
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/results',
      summary: 'The results of a version in all its cases; 202 while they are being computed',
      permission: 'view',
      query: ResultsQuery,
      answers: { 200: NetworkResults, 202: NetworkResults },
      handler: async ({ access, query, req, res }) => {
        const results = await service.results(access, query.version, query.bands === 'later' ? 'pressures' : 'whole');
        if ('json' in results) await sendReadyJson(req, res, results);
        else res.status(results.state === 'waiting' ? 202 : 200).json(results satisfies NetworkResults);
      },
    }),
  ];
}

/** The same bytes as what Express sends as it is. */
function asBuffer({ buffer, byteOffset, byteLength }: Uint8Array): Buffer {
  return Buffer.from(buffer, byteOffset, byteLength);
}
