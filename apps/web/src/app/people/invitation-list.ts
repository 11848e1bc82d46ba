import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Invitation } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { StatusMark } from '../shared/status-mark/status-mark';
import { roleName } from './role-words';

/** Invitations that nobody has accepted yet. */
@Component({
  selector: 'app-invitation-list',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul>
      @for (row of rows(); track row.invitation.id) {
        <li>
          <span class="cell">
            <strong>{{ row.invitation.email }}</strong>
            <span>as {{ row.role }}</span>
          </span>
          <span class="cell">
            <span>{{ row.made }}</span>
            @if (row.invitation.expired) {
              <app-status-mark status="watch" [word]="row.ends" />
            } @else {
              <span>{{ row.ends }}</span>
            }
          </span>
          <span class="acts">
            <button matButton="outlined" type="button" (click)="sentAgain.emit(row.invitation)">
              Send again<span class="rb-visually-hidden"> to {{ row.invitation.email }}</span>
            </button>
            <button matButton="outlined" type="button" (click)="withdrawn.emit(row.invitation)">
              Withdraw<span class="rb-visually-hidden"> the invitation of {{ row.invitation.email }}</span>
            </button>
          </span>
        </li>
      } @empty {
        <li class="none">Nobody is being waited for. Who accepts an invitation moves up to the people.</li>
      }
    </ul>
  `,
  styleUrl: './invitation-list.scss',
})
export class InvitationList {
  readonly invitations = input.required<readonly Invitation[]>();
  readonly timeZone = input.required<string>();

  readonly sentAgain = output<Invitation>();
  readonly withdrawn = output<Invitation>();

  protected readonly rows = computed(() =>
    this.invitations().map((invitation) => ({
      invitation,
      role: roleName(invitation.role).toLowerCase(),
      made: `Sent ${timeWords(invitation.madeAt, this.timeZone())}, by ${invitation.madeByName}`,
      ends: `${invitation.expired ? 'Ran out' : 'Good until'} ${timeWords(invitation.expiresAt, this.timeZone())}`,
    })),
  );
}
