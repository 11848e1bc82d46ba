import { inject } from '@angular/core';
import { type CanActivateFn, RedirectCommand, Router } from '@angular/router';
import { SessionStore } from './session-store';

/** Sends those who are not signed in to the sign-in page, and back afterwards. */
export const signedInGuard: CanActivateFn = async (_route, { url }) => {
  const router = inject(Router);
  const person = await inject(SessionStore).restore();
  if (person !== null) return true;
  return new RedirectCommand(router.createUrlTree(['/sign-in'], { queryParams: { return: url } }));
};
