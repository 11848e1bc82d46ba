import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Problem } from '@riseback/contracts';
import { StatusMark } from '../status-mark/status-mark';

/** What went wrong and what to do, where the content would have stood. */
@Component({
  selector: 'app-problem-banner',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'alert' },
  template: `
    <app-status-mark status="fail" [word]="problem().title" />
    @if (problem().detail; as detail) {
      <p>{{ detail }}</p>
    }
    @for (error of problem().errors ?? []; track $index) {
      <p class="place">
        @if (error.pointer) {
          <code>{{ error.pointer }}</code>
        }
        {{ error.detail }}
      </p>
    }
    <ng-content />
    @if (canRetry()) {
      <p><button matButton="outlined" type="button" (click)="retried.emit()">Try again</button></p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 4px;
      padding: 12px 16px;
      border: 1px solid var(--rb-fail);
      background: var(--rb-fail-wash);
    }
    .place {
      overflow-wrap: anywhere;
    }
    code {
      font:
        500 12px/16px ui-monospace,
        monospace;
    }
  `,
})
export class ProblemBanner {
  readonly problem = input.required<Problem>();
  /** Whoever says so asks again when told. */
  readonly canRetry = input(false);
  readonly retried = output();
}
