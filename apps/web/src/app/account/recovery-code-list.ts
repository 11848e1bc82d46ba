import { DOCUMENT } from '@angular/common';
import { ChangeDetectionStrategy, Component, inject, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';

/** Recovery codes, shown this once: to copy, to save, to write down. */
@Component({
  selector: 'app-recovery-code-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h3 tabindex="-1" #head>Recovery codes</h3>
    <p>
      For when you have lost your authenticator: each lets you in once. They are shown this once; keep them where your
      password is not.
    </p>
    <ol>
      @for (code of codes(); track code) {
        <li>
          <code>{{ code }}</code>
        </li>
      }
    </ol>
    <div class="actions">
      <button matButton="outlined" type="button" (click)="copy()">Copy</button>
      <button matButton="outlined" type="button" (click)="save()">Save as a text file</button>
      <button matButton="filled" type="button" (click)="kept.emit()">I have kept them</button>
    </div>
    <p class="said" role="status">{{ said() }}</p>
  `,
  styleUrl: './account-panel.scss',
})
export class RecoveryCodeList {
  private readonly document = inject(DOCUMENT);

  readonly codes = input.required<readonly string[]>();
  readonly kept = output();

  protected readonly said = signal('');

  protected async copy(): Promise<void> {
    try {
      await this.document.defaultView?.navigator.clipboard.writeText(this.codes().join('\n'));
      this.said.set('Copied.');
    } catch {
      this.said.set('This browser does not let pages copy. Select the codes and copy them yourself.');
    }
  }

  protected save(): void {
    const url = URL.createObjectURL(new Blob([`${this.codes().join('\n')}\n`], { type: 'text/plain' }));
    const link = this.document.createElement('a');
    link.href = url;
    link.download = 'riseback-recovery-codes.txt';
    link.click();
    URL.revokeObjectURL(url);
    this.said.set('Saved.');
  }
}
