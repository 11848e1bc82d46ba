import { ChangeDetectionStrategy, Component, effect, inject, input, signal } from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import { RouterLink } from '@angular/router';
import type { Invitation, Role, SitePerson } from '@riseback/contracts';
import { firstValueFrom } from 'rxjs';
import type { Outcome } from '../shared/outcome';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AppBar } from '../shell/app-bar';
import { ConfirmDialog, type Question } from './confirm-dialog';
import { InvitationList } from './invitation-list';
import { InviteForm } from './invite-form';
import { PeopleStore } from './people-store';
import type { PersonAct } from './person-acts';
import { PersonList } from './person-list';
import { RoleDialog } from './role-dialog';
import { RoleTable } from './role-table';
import { roleName } from './role-words';

/** Who is at a site, in which role, and who is invited; for its administrators. */
@Component({
  selector: 'app-people-page',
  imports: [AppBar, InvitationList, InviteForm, PersonList, ProblemBanner, RoleTable, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [PeopleStore],
  templateUrl: './people-page.html',
  styleUrl: './people-page.scss',
})
export class PeoplePage {
  private readonly dialog = inject(MatDialog);
  protected readonly store = inject(PeopleStore);

  readonly siteId = input.required<string>();

  /** What the last command did, or why it did not. */
  protected readonly said = signal('');
  protected readonly refusal = signal('');

  constructor() {
    effect(() => this.store.siteId.set(this.siteId()));
  }

  protected async changeRole(person: SitePerson): Promise<void> {
    const opened = this.dialog.open<RoleDialog, SitePerson, Role>(RoleDialog, { data: person, width: '560px' });
    const role = await firstValueFrom(opened.afterClosed());
    if (role === undefined) return;
    this.tell(await this.store.changeRole(person, role), `${person.name} is ${roleName(role).toLowerCase()} now.`);
  }

  protected async act(person: SitePerson, { what, question, done }: PersonAct): Promise<void> {
    if (!(await this.agreed(question))) return;
    const outcome = await (what === 'taking-away' ? this.store.takeRole(person) : this.store.act(person, what));
    this.tell(outcome, done);
  }

  protected async sendAgain(invitation: Invitation): Promise<void> {
    this.tell(
      await this.store.sendAgain(invitation),
      `A new invitation is on its way to ${invitation.email}; the one before no longer counts.`,
    );
  }

  protected async withdraw(invitation: Invitation): Promise<void> {
    const agreed = await this.agreed({
      title: `Withdraw the invitation of ${invitation.email}?`,
      lines: ['The link in the mail no longer lets in, and says so.'],
      act: 'Withdraw',
    });
    if (!agreed) return;
    this.tell(await this.store.withdraw(invitation), `The invitation of ${invitation.email} is withdrawn.`);
  }

  protected sent(words: string): void {
    this.refusal.set('');
    this.said.set(words);
  }

  private async agreed(data: Question): Promise<boolean> {
    const opened = this.dialog.open<ConfirmDialog, Question, boolean>(ConfirmDialog, { data, width: '480px' });
    return (await firstValueFrom(opened.afterClosed())) === true;
  }

  private tell(outcome: Outcome<void>, done: string): void {
    const refused = 'problem' in outcome;
    this.said.set(refused ? '' : done);
    this.refusal.set(refused ? (outcome.problem.detail ?? outcome.problem.title) : '');
  }
}
