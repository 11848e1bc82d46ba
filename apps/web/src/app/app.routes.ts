import type { Routes } from '@angular/router';
import { takeToken } from './links/link-token';
import { readingGuard } from './readings/reading-guard';
import { signedInGuard } from './session/signed-in-guard';

export const routes: Routes = [
  { path: '', pathMatch: 'full', redirectTo: 'sites' },
  {
    path: 'sign-in',
    title: 'Sign in · Riseback',
    loadComponent: () => import('./sign-in/sign-in-page').then((m) => m.SignInPage),
  },
  {
    path: 'forgotten-password',
    title: 'Forgotten password · Riseback',
    loadComponent: () => import('./password-reset/forgotten-password-page').then((m) => m.ForgottenPasswordPage),
  },
  {
    path: 'password-reset',
    title: 'New password · Riseback',
    canActivate: [takeToken],
    runGuardsAndResolvers: 'always',
    loadComponent: () => import('./password-reset/password-reset-page').then((m) => m.PasswordResetPage),
  },
  {
    path: 'invitation',
    title: 'Invitation · Riseback',
    canActivate: [takeToken],
    runGuardsAndResolvers: 'always',
    loadComponent: () => import('./invitation/invitation-page').then((m) => m.InvitationPage),
  },
  {
    path: 'account',
    title: 'Your account · Riseback',
    canActivate: [signedInGuard],
    loadComponent: () => import('./account/account-page').then((m) => m.AccountPage),
  },
  {
    path: 'sites/:siteId/networks/:networkId/gauges/reading',
    title: 'Readings · Riseback',
    canActivate: [readingGuard],
    loadComponent: () => import('./readings/reading-page').then((m) => m.ReadingPage),
  },
  {
    path: 'sites',
    canActivate: [signedInGuard],
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Sites · Riseback',
        loadComponent: () => import('./sites/site-list-page').then((m) => m.SiteListPage),
      },
      {
        path: ':siteId',
        pathMatch: 'full',
        title: 'Networks · Riseback',
        loadComponent: () => import('./networks/network-list-page').then((m) => m.NetworkListPage),
      },
      {
        path: ':siteId/audit',
        title: 'Log of the site · Riseback',
        loadComponent: () => import('./audit/audit-page').then((m) => m.AuditPage),
      },
      {
        path: ':siteId/people',
        title: 'People · Riseback',
        loadComponent: () => import('./people/people-page').then((m) => m.PeoplePage),
      },
      {
        path: ':siteId/mails',
        title: 'Mails · Riseback',
        loadComponent: () => import('./mails/mails-page').then((m) => m.MailsPage),
      },
      {
        path: ':siteId/settings',
        title: 'Site settings · Riseback',
        loadComponent: () => import('./sites/site-settings-page').then((m) => m.SiteSettingsPage),
      },
      {
        path: ':siteId/library',
        title: 'Trap library · Riseback',
        loadComponent: () => import('./library/library-page').then((m) => m.LibraryPage),
      },
      {
        path: ':siteId/networks/:networkId/frozen/:revisionId',
        loadComponent: () => import('./revisions/frozen-page').then((m) => m.FrozenPage),
        children: [
          { path: '', pathMatch: 'full', redirectTo: 'drawing' },
          { path: 'drawing', loadComponent: () => import('./drawing/drawing-page').then((m) => m.DrawingPage) },
          { path: 'lists', loadComponent: () => import('./lists/lists-page').then((m) => m.ListsPage) },
          { path: 'cases', loadComponent: () => import('./cases/cases-page').then((m) => m.CasesPage) },
          { path: 'ledger', loadComponent: () => import('./results/ledger-page').then((m) => m.LedgerPage) },
          { path: 'try', loadComponent: () => import('./what-if/what-if-page').then((m) => m.WhatIfPage) },
          { path: 'method', loadComponent: () => import('./method/method-page').then((m) => m.MethodPage) },
        ],
      },
      {
        path: ':siteId/networks/:networkId',
        loadComponent: () => import('./networks/network-page').then((m) => m.NetworkPage),
        children: [
          { path: '', pathMatch: 'full', redirectTo: 'drawing' },
          { path: 'drawing', loadComponent: () => import('./drawing/drawing-page').then((m) => m.DrawingPage) },
          { path: 'lists', loadComponent: () => import('./lists/lists-page').then((m) => m.ListsPage) },
          { path: 'cases', loadComponent: () => import('./cases/cases-page').then((m) => m.CasesPage) },
          { path: 'ledger', loadComponent: () => import('./results/ledger-page').then((m) => m.LedgerPage) },
          { path: 'try', loadComponent: () => import('./what-if/what-if-page').then((m) => m.WhatIfPage) },
          { path: 'gauges', loadComponent: () => import('./gauges/gauges-page').then((m) => m.GaugesPage) },
          {
            path: 'revisions',
            loadComponent: () => import('./revisions/revisions-page').then((m) => m.RevisionsPage),
          },
          {
            path: 'revisions/:revisionId/verification',
            loadComponent: () => import('./revisions/verification-page').then((m) => m.VerificationPage),
          },
          { path: 'report', loadComponent: () => import('./report/report-page').then((m) => m.ReportPage) },
          { path: 'method', loadComponent: () => import('./method/method-page').then((m) => m.MethodPage) },
        ],
      },
    ],
  },
  {
    path: 'unreachable',
    title: 'Not reached · Riseback',
    loadComponent: () => import('./shell/unreachable-page').then((m) => m.UnreachablePage),
  },
  {
    path: '**',
    title: 'Not found · Riseback',
    loadComponent: () => import('./shell/not-found-page').then((m) => m.NotFoundPage),
  },
];
