import { InvitationAcceptance, LinkQuestion, LinkTold, ResetCompletion, ResetRequest } from '@riseback/contracts';
import { publicRoute, type Route } from '../platform/routes/route-table';
import type { LinkService } from './link-service';
import type { PasswordResetService } from './password-reset-service';
import { originOf } from './security-routes';

/** For people who are not signed in and hold a link, or ask for one. */
export function linkRoutes(links: LinkService, resets: PasswordResetService): Route[] {
  return [
    publicRoute({
      method: 'post',
      path: '/api/links',
      summary: 'What a link from a mail is for. Nothing is done with it yet.',
      body: LinkQuestion,
      answers: { 200: LinkTold },
      handler: ({ body, res }) => {
        res.json(links.tell(body.token) satisfies LinkTold);
      },
    }),
    publicRoute({
      method: 'post',
      path: '/api/links/acceptance',
      summary: 'Accept an invitation: with a new account, or with the password (and code) of the one there is.',
      body: InvitationAcceptance,
      answers: { 204: 'Accepted. Sign in to begin.' },
      handler: async ({ body, req, res }) => {
        await links.accept(body, originOf(req));
        res.status(204).end();
      },
    }),
    publicRoute({
      method: 'post',
      path: '/api/password-resets',
      summary: 'Ask for a mail with a link to choose a new password.',
      body: ResetRequest,
      answers: { 202: 'Where there is an account under the address, a mail is on its way.' },
      handler: async ({ body, req, res }) => {
        await resets.request(body.email, originOf(req).address);
        res.status(202).end();
      },
    }),
    publicRoute({
      method: 'post',
      path: '/api/password-resets/completion',
      summary: 'Choose a new password with such a link, and a code where codes are on. Every session ends.',
      body: ResetCompletion,
      answers: { 204: 'Changed. Sign in with the new password.' },
      handler: async ({ body, req, res }) => {
        await resets.complete(body, originOf(req).address);
        res.status(204).end();
      },
    }),
  ];
}
