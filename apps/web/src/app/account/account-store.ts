import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type {
  CodesBegun,
  CodesProof,
  CodesState,
  OwnSession,
  PasswordChange,
  ProfileChange,
} from '@riseback/contracts';
import { forkJoin, type Observable, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, loads, LOADING } from '../shared/load';
import { type Outcome, outcomeOf } from '../shared/outcome';
import { toProblem } from '../shared/problem';
import { AccountApi } from './account-api';

export interface Account {
  readonly sessions: readonly OwnSession[];
  readonly codes: CodesState;
}

/** One's own account, and what one may do to it. Every command answers with what came of it and brings the page up to date. */
@Injectable()
export class AccountStore {
  private readonly api = inject(AccountApi);
  private readonly session = inject(SessionStore);

  private readonly revision = signal(0);
  private readonly load = toSignal<Load<Account>, Load<Account>>(
    toObservable(this.revision).pipe(
      switchMap(() => loads(forkJoin({ sessions: this.api.sessions(), codes: this.api.codes() }))),
    ),
    { initialValue: LOADING },
  );
  /** Kept while it is read anew, so that the page does not flicker. */
  private last: Account | null = null;

  readonly person = this.session.person;
  readonly account = computed(() => {
    const load = this.load();
    if (load.status === 'ready') this.last = load.value;
    return load.status === 'failed' ? null : this.last;
  });
  readonly problem = computed(() => {
    const load = this.load();
    return load.status === 'failed' ? load.problem : null;
  });

  reload(): void {
    this.revision.update((n) => n + 1);
  }

  async changeProfile(change: ProfileChange): Promise<Outcome<void>> {
    try {
      return { value: await this.session.changeProfile(change) };
    } catch (error) {
      return { problem: toProblem(error) };
    }
  }

  changePassword(change: PasswordChange): Promise<Outcome<unknown>> {
    return this.run(this.api.changePassword(change));
  }

  endSession(id: string): Promise<Outcome<unknown>> {
    return this.run(this.api.endSession(id));
  }

  endOtherSessions(): Promise<Outcome<{ ended: number }>> {
    return this.run(this.api.endOtherSessions());
  }

  beginCodes(password: string): Promise<Outcome<CodesBegun>> {
    return this.run(this.api.beginCodes(password));
  }

  confirmCodes(code: string): Promise<Outcome<{ recoveryCodes: string[] }>> {
    return this.run(this.api.confirmCodes(code));
  }

  renewRecoveryCodes(proof: CodesProof): Promise<Outcome<{ recoveryCodes: string[] }>> {
    return this.run(this.api.renewRecoveryCodes(proof));
  }

  turnCodesOff(proof: CodesProof): Promise<Outcome<unknown>> {
    return this.run(this.api.turnCodesOff(proof));
  }

  private async run<T>(command: Observable<T>): Promise<Outcome<T>> {
    const outcome = await outcomeOf(command);
    if ('value' in outcome) this.reload();
    return outcome;
  }
}
