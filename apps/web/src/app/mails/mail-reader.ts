import { ChangeDetectionStrategy, Component, computed, DOCUMENT, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReceivedMailContent } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { plainName, saveFile } from '../shared/save-file';
import { textPieces } from './mail-text';

/** One mail as its recipient reads it: the text. The HTML beside it is saved and not shown, so that nothing of a mail runs or loads here. */
@Component({
  selector: 'app-mail-reader',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h3>{{ mail().subject }}</h3>
    <dl>
      <dt>From</dt>
      <dd>{{ mail().from }}</dd>
      <dt>To</dt>
      <dd>{{ mail().to }}</dd>
      <dt>Came in</dt>
      <dd>{{ came() }}</dd>
      <dt>Message-ID</dt>
      <dd>{{ mail().messageId }}</dd>
    </dl>
    <p class="text">
      @for (piece of pieces(); track $index) {
        @if (piece.href; as href) {
          <a [href]="href" target="_blank" rel="noopener">{{ piece.text }}</a>
        } @else {
          <span>{{ piece.text }}</span>
        }
      }
    </p>
    @if (mail().html !== '') {
      <button matButton="outlined" type="button" (click)="saveHtml()">Save the HTML of this mail</button>
    }
  `,
  styleUrl: './mail-reader.scss',
})
export class MailReader {
  private readonly document = inject(DOCUMENT);

  readonly mail = input.required<ReceivedMailContent>();
  readonly timeZone = input.required<string>();

  protected readonly pieces = computed(() => textPieces(this.mail().text, this.document.location.origin));
  protected readonly came = computed(() => {
    const { receivedAt, times } = this.mail();
    const at = timeWords(receivedAt, this.timeZone());
    return times === 1 ? `${at}, once` : `${at}, ${String(times)} times by now`;
  });

  protected saveHtml(): void {
    const { subject, html } = this.mail();
    saveFile(`${plainName(subject, 'mail')}.html`, new Blob([html], { type: 'text/html' }));
  }
}
