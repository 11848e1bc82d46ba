import { ReportJob, ReportRequest } from '@riseback/contracts';
import * as z from 'zod';
import { demandStreamReader } from '../events/event-routes';
import { EventStream } from '../events/event-stream';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { ReportService } from './report-service';

const JobPath = z.object({ jobId: z.string().min(1).max(64) });

export function reportRoutes(service: ReportService): Route[] {
  return [
    networkRoute({
      method: 'post',
      path: '/api/networks/:networkId/reports',
      summary: 'Order a calculation report of a revision, or of the network as it stands',
      permission: 'view',
      body: ReportRequest,
      answers: { 202: ReportJob },
      handler: ({ access, body, res }) => {
        const job = service.order(access, body) satisfies ReportJob;
        res.status(202).location(`/api/networks/${access.networkId}/reports/${job.id}`).json(job);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/reports',
      summary: "One's own reports of the network, the newest first; they are kept for a day",
      permission: 'view',
      answers: { 200: z.array(ReportJob) },
      handler: ({ access, res }) => {
        res.json(service.list(access) satisfies ReportJob[]);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/reports/:jobId',
      summary: 'How far a report is',
      permission: 'view',
      params: JobPath,
      answers: { 200: ReportJob },
      handler: ({ access, params, res }) => {
        res.json(service.find(access, params.jobId) satisfies ReportJob);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/reports/:jobId/events',
      summary: 'Server-sent events: report, first the present state, then each step',
      permission: 'view',
      params: JobPath,
      answers: { 200: 'a stream of server-sent events (text/event-stream)' },
      handler: ({ access, params, req, res }) => {
        demandStreamReader(req);
        service.watch(access, params.jobId, () => new EventStream(res));
      },
    }),
    networkRoute({
      method: 'delete',
      path: '/api/networks/:networkId/reports/:jobId',
      summary: 'Call a report off; one that has ended stays as it is',
      permission: 'view',
      params: JobPath,
      answers: { 200: ReportJob },
      handler: ({ access, params, res }) => {
        res.json(service.cancel(access, params.jobId) satisfies ReportJob);
      },
    }),
    networkRoute({
      method: 'get',
      path: '/api/networks/:networkId/reports/:jobId/content',
      summary: 'The file of a report that is made',
      permission: 'view',
      params: JobPath,
      answers: { 200: 'a PDF, a spreadsheet, a ZIP of CSV tables or JSON' },
      handler: ({ access, params, res }) => {
        const { name, mediaType, content } = service.content(access, params.jobId);
        res.attachment(name).type(mediaType).send(content);
      },
    }),
  ];
}
