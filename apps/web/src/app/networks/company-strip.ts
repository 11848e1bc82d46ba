import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { Company } from './company';

/** Who else has the network open and what they look at; says politely what they change. */
@Component({
  selector: 'app-company-strip',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (company.others().length > 0) {
      <p class="others">
        <span class="head">Also here</span>
        @for (other of company.others(); track other.personId) {
          <span
            ><strong>{{ other.name }}</strong
            >{{ other.selected.length > 0 ? ' at ' + other.selected.join(', ') : '' }}</span
          >
        }
        <span class="said" aria-hidden="true">{{ company.said() }}</span>
      </p>
    }
    <p class="rb-visually-hidden" role="status" aria-live="polite">{{ company.said() }}</p>
  `,
  styles: `
    .others {
      display: flex;
      flex-wrap: wrap;
      gap: 2px 14px;
      padding: 3px 14px;
      border-bottom: 1px solid var(--rb-rule);
      background: var(--rb-panel);
      font:
        400 12px/18px Inter,
        sans-serif;
    }
    .head,
    .said {
      color: var(--rb-ink-2);
    }
    .said {
      margin-left: auto;
    }
    @media (width < 720px) {
      .said {
        display: none;
      }
    }
  `,
})
export class CompanyStrip {
  protected readonly company = inject(Company);
}
