import { HttpErrorResponse } from '@angular/common/http';
import { inject } from '@angular/core';
import { type CanActivateFn, RedirectCommand, Router } from '@angular/router';
import { SessionStore } from './session-store';

/** Sends those who are not signed in to the sign-in page, and back afterwards; says so when the server cannot tell. */
export const signedInGuard: CanActivateFn = async (_route, { url }) => {
  const router = inject(Router);
  const session = inject(SessionStore);
  try {
    if ((await session.restore()) !== null) return true;
  } catch (error) {
    if (!(error instanceof HttpErrorResponse)) throw error;
    return new RedirectCommand(router.createUrlTree(['/unreachable'], { queryParams: { return: url } }), {
      // the address stays, so that loading the page again asks for it again
      skipLocationChange: true,
    });
  }
  return new RedirectCommand(router.createUrlTree(['/sign-in'], { queryParams: { return: url } }));
};
