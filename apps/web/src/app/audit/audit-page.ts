import { DatePipe } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, effect, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { ChoiceField } from '../shared/fields/choice-field';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { AppBar } from '../shell/app-bar';
import { AuditStore } from './audit-store';
import { actionWords, detailWords } from './audit-words';

const DAY_MS = 86_400_000;

/** Who did what at a site, for its administrators. */
@Component({
  selector: 'app-audit-page',
  imports: [AppBar, ChoiceField, DatePipe, MatButton, ProblemBanner, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [AuditStore],
  templateUrl: './audit-page.html',
  styleUrl: './audit-page.scss',
})
export class AuditPage {
  protected readonly store = inject(AuditStore);

  readonly siteId = input.required<string>();

  /** Kept from the last answer, so that the choices do not go away while another filter loads. */
  private known: { actions: readonly string[]; people: readonly { id: string; name: string }[] } = {
    actions: [],
    people: [],
  };
  private readonly choices = computed(() => {
    const first = this.store.first();
    if (first.status === 'ready' && first.value.choices !== undefined) this.known = first.value.choices;
    return this.known;
  });
  protected readonly actions = computed(() =>
    this.choices().actions.map((action) => ({ value: action, words: actionWords(action) })),
  );
  protected readonly people = computed(() => this.choices().people.map(({ id, name }) => ({ value: id, words: name })));
  protected readonly actionWords = actionWords;
  protected readonly detailWords = detailWords;

  constructor() {
    effect(() => this.store.siteId.set(this.siteId()));
  }

  /** Whole days of UTC, as the times are shown and exported. */
  protected fromDay(day: string): void {
    this.store.change({ from: day === '' ? undefined : `${day}T00:00:00.000Z` });
  }

  protected toDay(day: string): void {
    this.store.change({
      to: day === '' ? undefined : new Date(Date.parse(`${day}T00:00:00.000Z`) + DAY_MS).toISOString(),
    });
  }
}
