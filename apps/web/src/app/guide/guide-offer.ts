import { ChangeDetectionStrategy, Component, DestroyRef, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Guide } from './guide';

/** Asks a person once on this device whether to be shown round. */
@Component({
  selector: 'app-guide-offer',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (offered()) {
      <section aria-labelledby="guide-offer-title">
        <div>
          <h2 id="guide-offer-title">First time here?</h2>
          <p>Six steps through a solved network show how to read it. Two minutes; you can stop at any of them.</p>
          @if (guide.refusal(); as why) {
            <p role="alert">{{ why }}</p>
          }
        </div>
        <p class="actions">
          <button matButton="outlined" type="button" (click)="guide.begin()">Show me round</button>
          <button matButton type="button" (click)="notNow()">Not now</button>
        </p>
      </section>
    }
  `,
  styles: `
    section {
      display: flex;
      flex-wrap: wrap;
      gap: 12px 24px;
      align-items: center;
      justify-content: space-between;
      padding: 16px;
      border: 1px dashed var(--rb-rule-strong);
      background: var(--rb-panel);
    }

    div {
      flex: 1 1 300px;
    }

    .actions {
      display: flex;
      gap: 8px;
    }

    @media print {
      section {
        display: none;
      }
    }
  `,
})
export class GuideOffer {
  protected readonly guide = inject(Guide);

  protected readonly offered = signal(this.guide.offersItself());

  constructor() {
    inject(DestroyRef).onDestroy(() => {
      if (this.offered()) this.guide.remember();
    });
  }

  protected notNow(): void {
    this.guide.remember();
    this.offered.set(false);
  }
}
