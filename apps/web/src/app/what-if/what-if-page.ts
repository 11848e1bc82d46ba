import { formatDate } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject, input, LOCALE_ID, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { NetworkStore } from '../networks/network-store';
import { UndoButtons } from '../networks/undo-buttons';
import { nameOf } from '../shared/element-words';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { EffectTable } from './effect-table';
import { TrialForm } from './trial-form';
import { TrialStore } from './trial-store';
import { firstFive, turnedFindingWords, turnWords } from './turns';

/** Try changes: what other sizes, pressures, elevations or loads would do, trap by trap, before anything is changed. */
@Component({
  selector: 'app-what-if-page',
  imports: [EffectTable, MatButton, ProblemBanner, RouterLink, StatusMark, TrialForm, UndoButtons],
  providers: [TrialStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './what-if-page.html',
  styleUrl: './what-if-page.scss',
})
export class WhatIfPage {
  protected readonly store = inject(NetworkStore);
  protected readonly trials = inject(TrialStore);
  private readonly locale = inject(LOCALE_ID);

  /** From the address, as a finding proposes it: which element, what to change there, and how. */
  readonly element = input<string>();
  readonly change = input<string>();
  readonly by = input<string>();

  protected readonly findingWords = turnedFindingWords;
  protected readonly told = signal('');
  protected readonly steps = computed(() => {
    const refused = this.trials.laidOver()?.refused ?? [];
    return this.trials.steps().map((step) => ({
      ...step,
      refusal: refused.find(({ stepId }) => stepId === step.id)?.reasons.join(' ') ?? '',
    }));
  });
  protected readonly keptSince = computed(() => {
    const at = this.trials.keptSince();
    return at === null ? '' : formatDate(at, 'd MMM, HH:mm', this.locale);
  });
  protected readonly overtaken = computed(() => this.trials.laidOver()?.overtaken ?? []);
  protected readonly overtakenWords = computed(() => {
    const names = [...new Set(this.overtaken().map(({ name }) => name))];
    return `${firstFive(names)} ${names.length === 1 ? 'has' : 'have'} other values since you tried yours.`;
  });
  protected readonly goneWords = computed(() => {
    const ids = this.trials.laidOver()?.gone ?? [];
    return ids.length === 0 ? '' : `${firstFive(ids)}: what you tried there is left out.`;
  });
  protected readonly leftOutWords = computed(() => {
    const document = this.store.document();
    const names = this.trials.leftOut().map((id) => {
      const node = document?.nodes.get(id)?.value;
      return node === undefined ? id : nameOf(node);
    });
    if (names.length === 0) return '';
    return `With it ${firstFive(names)} would no longer drain to a receiver through sound pipes, so nothing is computed there.`;
  });
  protected readonly unanswered = computed(() =>
    this.trials.unanswered().map(({ caseId, problem }) => {
      const name = this.store.nameOfCase(caseId);
      return { caseId, problem: name === '' ? problem : { ...problem, title: `${name}: ${problem.title}` } };
    }),
  );
  protected readonly turns = computed(() => turnWords(this.trials.effects()?.turns ?? []));
  protected readonly stale = computed(
    () => this.trials.state() === 'solving' || this.store.solveState().kind !== 'solved',
  );
  protected readonly stateWords = computed(() => {
    if (this.trials.state() === 'solving') return 'Solving what you try';
    if (this.trials.state() === 'nothing' && this.trials.laidOver()?.ops.length === 0)
      return 'What you try is what stands in the network already.';
    if (this.store.solveState().kind === 'solving') return 'The network itself is being solved again.';
    if (this.trials.effects() === null && this.trials.state() === 'solved' && this.unanswered().length === 0)
      return 'The network itself has no result in this case yet to compare with.';
    return '';
  });
  protected readonly whyNotKept = computed(() => {
    if (this.trials.steps().length === 0) return 'Nothing is tried yet.';
    return this.trials.laidOver()?.ops.length === 0 ? 'What is tried changes nothing.' : '';
  });

  protected keep(): void {
    const count = this.trials.laidOver()?.ops.length ?? 0;
    if (this.trials.keep())
      this.told.set(`Kept: ${String(count)} ${count === 1 ? 'value' : 'values'} as one edit. Undo takes it back.`);
    else this.told.set(`Not kept: ${this.store.lastRefusal().join(' ')}`);
  }

  protected drop(): void {
    this.trials.drop();
    this.told.set('Dropped. The network is as it was. Undo brings back what you tried.');
  }

  protected takeOut(stepId: string): void {
    this.trials.takeOut(stepId);
    this.told.set('Taken out');
  }
}
