import {
  NetworkResults,
  NewRevision,
  Revision,
  RevisionNote,
  RevisionReason,
  RevisionSummary,
} from '@riseback/contracts';
import * as z from 'zod';
import { sendReadyJson } from '../platform/http/ready-json';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { RevisionService } from './revision-service';

export const RevisionPath = z.object({ revisionId: z.string().min(1).max(64) });

export function revisionRoutes(service: RevisionService): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/revisions',
      summary: 'The revisions of a network, the newest first',
      permission: 'view',
      answers: { 200: z.array(RevisionSummary) },
      handler: ({ access, res }) => {
        res.json(service.list(access) satisfies RevisionSummary[]);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/revisions',
      summary: 'Freeze the network as it stood at a version, with the results of all its cases',
      permission: 'draw',
      body: NewRevision,
      answers: { 201: Revision },
      handler: async ({ access, body, res }) => {
        const revision = (await service.freeze(access, body)) satisfies Revision;
        res.status(201).location(`/api/networks/${access.networkId}/revisions/${revision.id}`).json(revision);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/revisions/:revisionId',
      summary: 'A revision: what it froze, what became of it, its signatures, and what the reader may do with it',
      permission: 'view',
      params: RevisionPath,
      answers: { 200: Revision },
      handler: ({ access, params, res }) => {
        res.json(service.get(access, params.revisionId) satisfies Revision);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/revisions/:revisionId/results',
      summary: 'The frozen results of all cases, as the results of a version are answered',
      permission: 'view',
      params: RevisionPath,
      answers: { 200: NetworkResults },
      handler: async ({ access, params, req, res }) => {
        await sendReadyJson(req, res, service.results(access, params.revisionId));
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/revisions/:revisionId/submission',
      summary: 'Submit a draft for review',
      permission: 'draw',
      params: RevisionPath,
      body: RevisionNote,
      answers: { 200: Revision },
      handler: ({ access, params, body, res }) => {
        res.json(service.submit(access, params.revisionId, body.note) satisfies Revision);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/revisions/:revisionId/return',
      summary: 'Return a revision under review, with the reason',
      permission: 'sign',
      params: RevisionPath,
      body: RevisionReason,
      answers: { 200: Revision },
      handler: ({ access, params, body, res }) => {
        res.json(service.return(access, params.revisionId, body.note) satisfies Revision);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/revisions/:revisionId/withdrawal',
      summary: 'Withdraw a revision, with the reason',
      permission: 'draw',
      params: RevisionPath,
      body: RevisionReason,
      answers: { 200: Revision },
      handler: ({ access, params, body, res }) => {
        res.json(service.withdraw(access, params.revisionId, body.note) satisfies Revision);
      },
    }),
  ];
}
