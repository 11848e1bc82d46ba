import { OutboxMail, ReceivedMail, ReceivedMailContent } from '@riseback/contracts';
import * as z from 'zod';
import { siteRoute, type Route } from '../platform/routes/route-table';
import type { MailService } from './mail-service';

export function mailRoutes(mails: MailService): Route[] {
  return [
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/mails',
      permission: 'people',
      summary: "The site's mails, sent and waiting, the newest first; not what is in them.",
      answers: { 200: z.array(OutboxMail) },
      handler: ({ access, res }) => {
        res.json(mails.listOutbox(access) satisfies OutboxMail[]);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/received-mails',
      permission: 'people',
      summary: 'What the local mail sink took in for the site; 404 where mails are really sent.',
      answers: { 200: z.array(ReceivedMail) },
      handler: ({ access, res }) => {
        res.json(mails.listReceived(access) satisfies ReceivedMail[]);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/received-mails/:mailId',
      permission: 'people',
      summary: 'One of them, with its text.',
      params: z.object({ mailId: z.string() }),
      answers: { 200: ReceivedMailContent },
      handler: ({ access, params, res }) => {
        res.json(mails.readReceived(access, params.mailId) satisfies ReceivedMailContent);
      },
    }),
  ];
}
