import { inject, Injectable, signal } from '@angular/core';
import { type CanActivateFn, RedirectCommand, Router } from '@angular/router';

/** The token of the link that led here, in this tab's memory and nowhere else. */
@Injectable({ providedIn: 'root' })
export class LinkToken {
  private readonly held = signal<string | null>(null);
  readonly value = this.held.asReadonly();

  hold(token: string | null): void {
    this.held.set(token);
  }
}

/**
 * Takes the token out of the address bar before the page stands. It comes in the fragment, which browsers send to no
 * server; here it also leaves the history, so that nobody finds it there later.
 */
export const takeToken: CanActivateFn = (_route, { url }) => {
  const router = inject(Router);
  const { fragment } = router.parseUrl(url);
  if (fragment === null) return true;
  inject(LinkToken).hold(fragment);
  const [path = '/'] = url.split('#');
  return new RedirectCommand(router.parseUrl(path), { replaceUrl: true });
};
