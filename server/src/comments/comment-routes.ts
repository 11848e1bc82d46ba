import { CommentResolution, CommentThread, NewComment } from '@riseback/contracts';
import * as z from 'zod';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { CommentService } from './comment-service';

/** `none`: those on the network as it stands. */
const CommentQuery = z.object({ revision: z.string().min(1).max(64).optional() });
const ThreadPath = z.object({ threadId: z.string().min(1).max(64) });

export function commentRoutes(service: CommentService): Route[] {
  return [
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/comments',
      summary:
        'The threads of a network and of its revisions, the oldest first; `revision` names one, or `none` those on the network as it stands',
      permission: 'view',
      query: CommentQuery,
      answers: { 200: z.array(CommentThread) },
      handler: ({ access, query, res }) => {
        const threads = service.list(access, query.revision === 'none' ? null : query.revision);
        res.json(threads satisfies CommentThread[]);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/comments',
      summary: 'Begin a thread on the whole, an element or a result, or answer in one',
      permission: 'comment',
      body: NewComment,
      answers: { 201: CommentThread },
      handler: ({ access, body, res }) => {
        res.status(201).json(service.add(access, body) satisfies CommentThread);
      },
    }),
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/comments/:threadId/resolution',
      summary: 'Resolve a thread, or open it again',
      permission: 'comment',
      params: ThreadPath,
      body: CommentResolution,
      answers: { 200: CommentThread },
      handler: ({ access, params, body, res }) => {
        res.json(service.resolve(access, params.threadId, body.resolved) satisfies CommentThread);
      },
    }),
  ];
}
