import { EditAccepted, EditRequest, Network, NetworkSummary, SavedBatch } from '@riseback/contracts';
import * as z from 'zod';
import { versionETag, versionFromIfMatch } from '../platform/http/if-match';
import { networkRoute, NETWORK_FILE_LIMIT_BYTES, siteRoute, type Route } from '../platform/routes/route-table';
import type { NetworkService } from './network-service';

/** Read by `readNetworkFile` in the service, whose mistakes point further than a schema's. */
const AnyNetworkFile = z.unknown().meta({ description: 'A network file, format riseback-network version 1' });
const FileQuery = z.object({ download: z.literal('1').optional() });
const SinceQuery = z.object({ since: z.coerce.number().int().min(0) });

export function networkRoutes(service: NetworkService): Route[] {
  return [
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/networks',
      summary: 'The networks of a site with the verdicts of their first case',
      permission: 'view',
      answers: { 200: z.array(NetworkSummary) },
      handler: ({ access, res }) => {
        res.json(service.list(access) satisfies NetworkSummary[]);
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/networks',
      summary: 'Make a network of a network file',
      permission: 'draw',
      body: AnyNetworkFile,
      bodyLimitBytes: NETWORK_FILE_LIMIT_BYTES,
      answers: { 201: Network },
      handler: ({ access, body, res }) => {
        const network = service.create(access, body) satisfies Network;
        res.status(201).location(`/api/networks/${network.id}`).set('ETag', versionETag(network.version)).json(network);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId',
      summary: 'A network with its document; the ETag is its version',
      permission: 'view',
      answers: { 200: Network },
      handler: ({ access, res }) => {
        const { version, json } = service.text(access);
        res.set('ETag', versionETag(version)).type('json').send(json);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/file',
      summary: 'The network as a network file',
      permission: 'view',
      query: FileQuery,
      answers: { 200: 'a network file (docs/network-file.md)' },
      handler: ({ access, query, res }) => {
        const file = service.file(access);
        if (query.download !== undefined) res.attachment(downloadName(file.name));
        res.type('json').json(file);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/edits',
      summary:
        'The batches accepted after a version, oldest first, 500 at most; while there are more, Link names the next',
      permission: 'view',
      query: SinceQuery,
      answers: { 200: z.array(SavedBatch) },
      handler: ({ access, query, res }) => {
        const { batches, more } = service.editsSince(access, query.since);
        const last = batches.at(-1);
        if (more && last !== undefined) {
          res.links({ next: `/api/networks/${access.networkId}/edits?since=${String(last.version)}` });
        }
        res.json(batches satisfies SavedBatch[]);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/edits',
      summary: 'Apply one batch of edits to the version in If-Match',
      // which of the two a batch needs depends on what it touches: the service asks for it
      permission: ['draw', 'readings'],
      body: EditRequest,
      bodyLimitBytes: NETWORK_FILE_LIMIT_BYTES,
      answers: { 200: EditAccepted },
      handler: async ({ access, body, req, res }) => {
        const accepted = (await service.edit(access, versionFromIfMatch(req), body)) satisfies EditAccepted;
        res.set('ETag', versionETag(accepted.version)).json(accepted);
      },
    }),
  ];
}

/** A name for the file that every system takes, whatever the network is called. */
function downloadName(networkName: string): string {
  const plain = networkName
    .normalize('NFKD')
    .replaceAll(/\p{Mark}/gu, '')
    .replaceAll(/[^A-Za-z0-9]+/g, '-')
    .replaceAll(/^-+|-+$/g, '')
    .slice(0, 80);
  return `${plain === '' ? 'network' : plain}.json`;
}
