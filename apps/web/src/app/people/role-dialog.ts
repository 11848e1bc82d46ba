import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import { type Role, ROLES, type SitePerson } from '@riseback/contracts';
import { roleChangeLines, roleMeaning, roleName } from './role-words';

/** Another role for somebody: what each means, and what the change gives and takes. Closes with the role to give. */
@Component({
  selector: 'app-role-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>Role of {{ person.name }}</h2>
    <mat-dialog-content>
      <fieldset>
        <legend class="rb-visually-hidden">Role</legend>
        @for (choice of choices; track choice.role) {
          <label [class.chosen]="choice.role === chosen()">
            <input
              type="radio"
              name="role"
              [value]="choice.role"
              [checked]="choice.role === chosen()"
              (change)="chosen.set(choice.role)"
            />
            <strong>{{ choice.name }}</strong>
            <span>{{ choice.meaning }}</span>
          </label>
        }
      </fieldset>
      <div class="follows" aria-live="polite">
        @for (line of follows(); track $index) {
          <p>{{ line }}</p>
        } @empty {
          <p>This is the present role.</p>
        }
      </div>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton type="button" mat-dialog-close>Cancel</button>
      <button matButton="filled" type="button" [disabled]="chosen() === person.role" (click)="give()">
        Give the role
      </button>
    </mat-dialog-actions>
  `,
  styleUrl: './role-dialog.scss',
})
export class RoleDialog {
  protected readonly person = inject<SitePerson>(MAT_DIALOG_DATA);
  private readonly dialog = inject<MatDialogRef<RoleDialog, Role>>(MatDialogRef);

  protected readonly choices = ROLES.map((role) => ({ role, name: roleName(role), meaning: roleMeaning(role) }));
  protected readonly chosen = signal<Role>(this.person.role);
  protected readonly follows = computed(() => {
    if (this.chosen() === this.person.role) return [];
    return [
      ...roleChangeLines(this.person.role, this.chosen()),
      `${this.person.name} is signed out everywhere and signs in anew with the new role.`,
    ];
  });

  protected give(): void {
    this.dialog.close(this.chosen());
  }
}
