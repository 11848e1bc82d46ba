import { ChangeDetectionStrategy, Component, computed, effect, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { timeWords } from '../account/time-words';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AppBar } from '../shell/app-bar';
import { MailReader } from './mail-reader';
import { purposeWords, stateWords } from './mail-words';
import { MailsStore } from './mails-store';

/** What the program wrote to whom and how it fared; where no real mail is sent, also the mails themselves. */
@Component({
  selector: 'app-mails-page',
  imports: [AppBar, MailReader, MatButton, ProblemBanner, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [MailsStore],
  templateUrl: './mails-page.html',
  styleUrl: './mails-page.scss',
})
export class MailsPage {
  protected readonly store = inject(MailsStore);

  readonly siteId = input.required<string>();
  /** The received mail to read, from the query. */
  readonly mail = input<string>();

  private readonly lists = computed(() => {
    const shown = this.store.shown();
    return shown.status === 'ready' ? shown.value.lists : undefined;
  });
  protected readonly outbox = computed(() =>
    (this.lists()?.outbox ?? []).map((mail) => ({
      id: mail.id,
      purpose: purposeWords(mail.purpose),
      to: mail.recipientName ?? mail.email,
      email: mail.recipientName === undefined ? '' : mail.email,
      written: timeWords(mail.createdAt, this.store.timeZone()),
      state: stateWords(mail, this.store.timeZone()),
    })),
  );
  protected readonly received = computed(() =>
    this.lists()?.received?.map((mail) => ({
      ...mail,
      when: timeWords(mail.receivedAt, this.store.timeZone()),
      repeated: mail.times > 1 ? `, ${String(mail.times)} times` : '',
    })),
  );
  /** Said aloud; the mail itself is read at the reader's own pace. */
  protected readonly opened = computed(() => {
    const open = this.store.open();
    return open?.status === 'ready' ? `Open below: ${open.value.subject}` : '';
  });

  constructor() {
    effect(() => this.store.siteId.set(this.siteId()));
    effect(() => this.store.openId.set(this.mail() ?? ''));
  }
}
