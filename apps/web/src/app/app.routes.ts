import type { Routes } from '@angular/router';
import { signedInGuard } from './session/signed-in-guard';

export const routes: Routes = [
  { path: '', pathMatch: 'full', redirectTo: 'sites' },
  {
    path: 'sign-in',
    title: 'Sign in · Riseback',
    loadComponent: () => import('./sign-in/sign-in-page').then((m) => m.SignInPage),
  },
  {
    path: 'account',
    title: 'Your account · Riseback',
    canActivate: [signedInGuard],
    loadComponent: () => import('./account/account-page').then((m) => m.AccountPage),
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
        path: ':siteId/library',
        title: 'Trap library · Riseback',
        loadComponent: () => import('./library/library-page').then((m) => m.LibraryPage),
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
