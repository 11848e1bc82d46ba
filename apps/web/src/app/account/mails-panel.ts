import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { DECLINABLE_MAILS, type DeclinableMail } from '@riseback/contracts';
import { AccountStore } from './account-store';

const WORDS: Readonly<Record<DeclinableMail, string>> = {
  submitted: 'A revision waits for my review',
  returned: 'A revision of mine was returned',
  approved: 'A revision of mine was approved',
  mention: 'Somebody names me in a comment',
  comment: 'Somebody comments on a revision of mine',
};

/** Which mails one gets; each tick counts at once. */
@Component({
  selector: 'app-mails-panel',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <p class="aside">They go to {{ store.person()?.email }}. Invitations and new passwords always come.</p>
    <fieldset>
      <legend class="rb-visually-hidden">Mails when</legend>
      @for (mail of mails(); track mail.purpose) {
        <label>
          <input #box type="checkbox" [checked]="mail.wanted" (change)="choose(mail.purpose, box)" />
          {{ mail.words }}
        </label>
      }
    </fieldset>
    <p class="said" role="status">{{ said() }}</p>
  `,
  styleUrls: ['./account-panel.scss', './mails-panel.scss'],
})
export class MailsPanel {
  protected readonly store = inject(AccountStore);

  protected readonly said = signal('');
  protected readonly mails = computed(() => {
    const unwanted = this.store.person()?.unwantedMails ?? [];
    return DECLINABLE_MAILS.map((purpose) => ({
      purpose,
      words: WORDS[purpose],
      wanted: !unwanted.includes(purpose),
    }));
  });

  protected async choose(purpose: DeclinableMail, box: HTMLInputElement): Promise<void> {
    const others = (this.store.person()?.unwantedMails ?? []).filter((other) => other !== purpose);
    const outcome = await this.store.changeProfile({ unwantedMails: box.checked ? others : [...others, purpose] });
    if ('value' in outcome) {
      this.said.set('Kept.');
      return;
    }
    // what is ticked is what the server has
    box.checked = !box.checked;
    this.said.set(`Not kept: ${outcome.problem.detail ?? outcome.problem.title}`);
  }
}
