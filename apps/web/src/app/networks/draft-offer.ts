import { formatDate } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject, LOCALE_ID } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { StatusMark } from '../shared/status-mark/status-mark';
import { DraftKeeper, type OfferedDraft } from './draft-keeper';

/** Offers work that a closed or crashed tab left unsaved on this device: what it was and when. */
@Component({
  selector: 'app-draft-offer',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @for (offer of offers(); track offer.key) {
      <div class="rb-notice watch" role="status">
        <app-status-mark status="watch" word="Not saved" />
        <p>{{ offer.words }}</p>
        <button matButton="outlined" type="button" (click)="bringIn(offer.source)">Bring them in</button>
        <button matButton type="button" (click)="leaveOut(offer.source)">Leave them out</button>
      </div>
    }
    @if (keeper.problem(); as problem) {
      <div class="rb-notice watch" role="alert">
        <app-status-mark status="watch" word="Drafts" />
        <p>{{ problem }}</p>
      </div>
    }
  `,
  styleUrl: './notice.scss',
})
export class DraftOffer {
  protected readonly keeper = inject(DraftKeeper);
  private readonly locale = inject(LOCALE_ID);

  protected readonly offers = computed(() =>
    this.keeper.offered().map((source) => ({ source, key: source.key.join('/'), words: this.wordsOf(source) })),
  );

  protected bringIn(offer: OfferedDraft): void {
    void this.keeper.bringIn(offer);
  }

  protected leaveOut(offer: OfferedDraft): void {
    void this.keeper.leaveOut(offer);
  }

  private wordsOf({ draft }: OfferedDraft): string {
    const labels = [
      ...draft.pending.map(({ label }) => label),
      ...draft.conflicts.map(({ name }) => `own value at ${name}`),
    ];
    const shown = labels.slice(0, 3).join(', ') + (labels.length > 3 ? ` and ${String(labels.length - 3)} more` : '');
    const when = formatDate(draft.at, 'd MMM, HH:mm', this.locale);
    return `Edits of ${when} on this device did not reach the server: ${shown}.`;
  }
}
