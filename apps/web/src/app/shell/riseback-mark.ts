import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The product's mark: a riser with the steps of its staff. */
@Component({
  selector: 'app-riseback-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg viewBox="0 0 24 20" width="24" height="20" aria-hidden="true" focusable="false">
      <path class="riser" d="M3 2h9v15h10" />
      <path class="steps" d="M2 7.2h6.6M2 12.2h6.6M2 17.2h6.6" />
    </svg>
    <span>Riseback</span>
  `,
  styles: `
    :host {
      display: inline-flex;
      align-items: center;
      gap: 8px;
      color: var(--rb-ink);
      font:
        600 15px/20px Inter,
        sans-serif;
    }
    path {
      fill: none;
      stroke-width: 2.4;
    }
    .riser {
      stroke: currentcolor;
    }
    .steps {
      stroke: var(--rb-copper-line);
    }
  `,
})
export class RisebackMark {}
