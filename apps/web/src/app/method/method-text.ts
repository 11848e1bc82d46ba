import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { Formula } from './formula/formula';

/** Running text with equations in it, which stand between backquotes. */
@Component({
  selector: 'app-method-text',
  imports: [Formula],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `@for (part of parts(); track $index) {
    @if ($odd) {
      <app-formula [text]="part" />
    } @else {
      <ng-container>{{ part }}</ng-container>
    }
  }`,
})
export class MethodText {
  readonly text = input.required<string>();

  protected readonly parts = computed(() => this.text().split('`'));
}
