import { Invitation, NamedPerson, NewInvitation, RoleChange, SitePerson } from '@riseback/contracts';
import * as z from 'zod';
import { siteRoute, type Route } from '../platform/routes/route-table';
import type { InvitationService } from './invitation-service';
import type { SitePeopleService } from './site-people-service';

const PERSON = z.object({ personId: z.string() });
const INVITATION = z.object({ invitationId: z.string() });

export function peopleRoutes(people: SitePeopleService, invitations: InvitationService): Route[] {
  return [
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/names',
      permission: 'view',
      summary: 'Who has a role at the site, by name; for mentions.',
      answers: { 200: z.array(NamedPerson) },
      handler: ({ access, res }) => {
        res.json(people.names(access) satisfies NamedPerson[]);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/people',
      permission: 'people',
      summary: 'Who has a role at the site, with what administrators need to know.',
      answers: { 200: z.array(SitePerson) },
      handler: ({ access, res }) => {
        res.json(people.list(access) satisfies SitePerson[]);
      },
    }),
    siteRoute({
      method: 'put',
      path: '/api/sites/:siteId/people/:personId',
      permission: 'people',
      summary: "Give a person another role. The person's sessions end.",
      params: PERSON,
      body: RoleChange,
      answers: { 200: SitePerson },
      handler: ({ access, params, body, res }) => {
        res.json(people.changeRole(access, params.personId, body.role) satisfies SitePerson);
      },
    }),
    siteRoute({
      method: 'delete',
      path: '/api/sites/:siteId/people/:personId',
      permission: 'people',
      summary: "Take a person's role at the site away. The account stays, and its sessions end.",
      params: PERSON,
      answers: { 204: 'Taken away.' },
      handler: ({ access, params, res }) => {
        people.takeRole(access, params.personId);
        res.status(204).end();
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/people/:personId/disabling',
      permission: 'people',
      summary: "Disable a person's account, where it is this site's alone. Its sessions end.",
      params: PERSON,
      answers: { 200: SitePerson },
      handler: ({ access, params, res }) => {
        res.json(people.disable(access, params.personId) satisfies SitePerson);
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/people/:personId/enabling',
      permission: 'people',
      summary: 'Enable it again.',
      params: PERSON,
      answers: { 200: SitePerson },
      handler: ({ access, params, res }) => {
        res.json(people.enable(access, params.personId) satisfies SitePerson);
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/people/:personId/password-reset',
      permission: 'people',
      summary: 'Send a person a link to choose a new password.',
      params: PERSON,
      answers: { 202: 'A mail is on its way.' },
      handler: ({ access, params, res }) => {
        people.sendReset(access, params.personId);
        res.status(202).end();
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/people/:personId/codes-off',
      permission: 'people',
      summary: "Turn a person's one-time codes off, where the account is this site's alone. Its sessions end.",
      params: PERSON,
      answers: { 200: SitePerson },
      handler: ({ access, params, res }) => {
        res.json(people.turnCodesOff(access, params.personId) satisfies SitePerson);
      },
    }),
    siteRoute({
      method: 'get',
      path: '/api/sites/:siteId/invitations',
      permission: 'people',
      summary: 'Invitations that were neither accepted nor withdrawn.',
      answers: { 200: z.array(Invitation) },
      handler: ({ access, res }) => {
        res.json(invitations.list(access) satisfies Invitation[]);
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/invitations',
      permission: 'people',
      summary: 'Invite somebody by mail. The link in it works once, for 24 hours.',
      body: NewInvitation,
      answers: { 201: Invitation },
      handler: ({ access, body, res }) => {
        res.status(201).json(invitations.invite(access, body) satisfies Invitation);
      },
    }),
    siteRoute({
      method: 'delete',
      path: '/api/sites/:siteId/invitations/:invitationId',
      permission: 'people',
      summary: 'Withdraw an invitation. Its link does not work any more.',
      params: INVITATION,
      answers: { 204: 'Withdrawn.' },
      handler: ({ access, params, res }) => {
        invitations.withdraw(access, params.invitationId);
        res.status(204).end();
      },
    }),
    siteRoute({
      method: 'post',
      path: '/api/sites/:siteId/invitations/:invitationId/sending',
      permission: 'people',
      summary: 'Send an invitation again, with a fresh link in the place of the one before.',
      params: INVITATION,
      answers: { 200: Invitation },
      handler: ({ access, params, res }) => {
        res.json(invitations.sendAgain(access, params.invitationId) satisfies Invitation);
      },
    }),
  ];
}
