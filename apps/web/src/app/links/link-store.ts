import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { InvitationAcceptance, LinkTold, ResetCompletion } from '@riseback/contracts';
import { of, switchMap } from 'rxjs';
import { type Load, LOADING, loads } from '../shared/load';
import { type Outcome, outcomeOf } from '../shared/outcome';
import { LinkApi } from './link-api';
import { LinkToken } from './link-token';

/** The link that led to a page: what it is for, and its one use. */
@Injectable()
export class LinkStore {
  private readonly api = inject(LinkApi);
  private readonly token = inject(LinkToken);

  private readonly asked = signal(0);
  private readonly query = computed(() => ({ token: this.token.value(), asked: this.asked() }));
  /** Null without a link, as after loading the page anew: the token is kept nowhere. */
  readonly told = toSignal<Load<LinkTold> | null, Load<LinkTold> | null>(
    toObservable(this.query).pipe(switchMap(({ token }) => (token === null ? of(null) : loads(this.api.ask(token))))),
    { initialValue: this.token.value() === null ? null : LOADING },
  );

  ask(): void {
    this.asked.update((count) => count + 1);
  }

  accept(acceptance: Omit<InvitationAcceptance, 'token'>): Promise<Outcome<void>> {
    return outcomeOf(this.api.accept({ ...acceptance, token: this.token.value() ?? '' }));
  }

  completeReset(completion: Omit<ResetCompletion, 'token'>): Promise<Outcome<void>> {
    return outcomeOf(this.api.completeReset({ ...completion, token: this.token.value() ?? '' }));
  }

  /** Once it has been used and the page says so: without a link there is no form either. */
  forget(): void {
    this.token.hold(null);
  }
}
