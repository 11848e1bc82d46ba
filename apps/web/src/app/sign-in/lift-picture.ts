import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The job in one drawing: two traps, a lift over a rack, the vessel; decoration only. */
@Component({
  selector: 'app-lift-picture',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  templateUrl: './lift-picture.svg',
  styles: `
    :host {
      display: flex;
      align-items: end;
      overflow: hidden;
    }
    svg {
      width: 100%;
      min-width: 560px;
      height: auto;
    }
    .ground {
      stroke: var(--rb-ink);
      stroke-width: 1.5;
    }
    .thin {
      fill: none;
      stroke: var(--rb-rule-strong);
      stroke-width: 1;
    }
    .high {
      stroke: var(--rb-p6);
    }
    .middle {
      stroke: var(--rb-p5);
    }
    .low {
      stroke: var(--rb-p4);
    }
    .wash {
      fill: none;
      stroke-width: 14;
    }
    .core {
      fill: none;
      stroke: var(--rb-ink);
      stroke-width: 1.4;
    }
    .core.pale {
      stroke: var(--rb-sheet);
    }
    .symbol {
      fill: var(--rb-sheet);
      stroke: var(--rb-ink);
      stroke-width: 2.2;
    }
    .water {
      fill: var(--rb-p2);
      fill-opacity: 0.45;
    }
    .solid {
      fill: var(--rb-ink);
    }
    text {
      fill: var(--rb-ink);
      font:
        600 15px Inter,
        sans-serif;
    }
    .small {
      fill: var(--rb-ink-2);
      font-weight: 400;
      font-size: 12px;
    }
  `,
})
export class LiftPicture {}
