import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { badness, type CommentSubject } from '@riseback/contracts';
import { compareNetworks, compareResults, countChanges } from '@riseback/revisions';
import { type DisplayUnits, displayUnit } from '@riseback/units';
import { SessionStore } from '../../session/session-store';
import { nameOf } from '../../shared/element-words';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { turnedFindingWords, turnsOf, turnWords } from '../../what-if/turns';
import type { RevisionSide } from '../revision-side';
import { compareSentence } from './compare-sentence';
import { caseNames, caseNotes, caseOptions, WORST_OF_BOTH } from './compared-cases';
import { EffectList } from './effect-list';
import { type ComparedQuantity, effectRows, oneSidedWords } from './effect-rows';
import { InputList } from './input-list';
import { inputRows } from './input-rows';

/** Two revisions, or one and the network as it is now: what was changed, and what it did to every trap. */
@Component({
  selector: 'app-revision-compare',
  imports: [EffectList, InputList, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './revision-compare.html',
  styleUrl: './revision-compare.scss',
})
export class RevisionCompare {
  private readonly session = inject(SessionStore);

  readonly before = input.required<RevisionSide>();
  readonly after = input.required<RevisionSide>();
  /** Numbers of the open comments on an element, by its id. */
  readonly commentsOf = input<ReadonlyMap<string, readonly number[]>>(new Map());
  readonly mayComment = input(true);
  readonly commentOn = output<CommentSubject>();
  readonly elementChosen = output<string>();

  protected readonly changedOnly = signal(true);
  protected readonly quantity = signal<ComparedQuantity>('backPressurePa');
  private readonly wantedCase = signal(WORST_OF_BOTH);

  protected readonly units = computed((): DisplayUnits => ({
    system: this.session.unitSystem(),
    atmosphericPressurePa: this.after().file.site.atmosphericPressurePa,
  }));
  protected readonly titles = computed(() => ({
    pressure: displayUnit('pressure', this.units().system),
    difference: displayUnit('pressureDifference', this.units().system),
  }));
  protected readonly labels = computed(() => ({ before: this.before().label, after: this.after().label }));

  protected readonly network = computed(() => compareNetworks(this.before().file, this.after().file));
  private readonly results = computed(() => compareResults(this.before().results, this.after().results));
  /** Of which of the two there is no result at all yet. */
  protected readonly awaited = computed(() =>
    [this.before(), this.after()].filter(({ results }) => results.length === 0).map(({ label }) => label),
  );

  private readonly nameOfCase = computed(() => caseNames(this.before().file, this.after().file));
  protected readonly options = computed(() => caseOptions(this.results(), this.nameOfCase()));
  protected readonly caseId = computed(() => {
    const ids = this.options().map(({ id }) => id);
    return ids.includes(this.wantedCase()) ? this.wantedCase() : (ids[0] ?? '');
  });
  private readonly showsWorst = computed(() => this.caseId() === WORST_OF_BOTH);
  private readonly effects = computed(() => {
    const { cases, worst } = this.results();
    return cases.find(({ caseId }) => !this.showsWorst() && caseId === this.caseId()) ?? worst;
  });
  protected readonly notes = computed(() => {
    const { cases } = this.results();
    const some = this.showsWorst() ? cases : cases.filter(({ caseId }) => caseId === this.caseId());
    return this.awaited().length > 0 ? [] : caseNotes(some, this.nameOfCase(), this.labels());
  });

  /** Where only one of the two has its bands, a verdict may be turned by that alone. */
  protected readonly bandsDiffer = computed(
    () => this.awaited().length === 0 && hasBands(this.before()) !== hasBands(this.after()),
  );

  protected readonly sentence = computed(() => compareSentence(this.network(), this.effects().traps, this.units()));
  private readonly allInputs = computed(() =>
    inputRows(
      this.network(),
      { before: this.before().file, after: this.after().file },
      this.units().system,
      this.commentsOf(),
    ),
  );
  protected readonly inputs = computed(() =>
    this.allInputs().filter(({ drawingOnly }) => !drawingOnly || !this.changedOnly()),
  );
  /** Said where they are left out of the list. */
  protected readonly drawingOnly = computed(() => countChanges(this.network()).drawingOnly);
  protected readonly reordered = computed(() => this.network().reordered.length > 0);

  protected readonly rows = computed(() =>
    effectRows(this.effects(), {
      before: this.before().file,
      after: this.after().file,
      quantity: this.quantity(),
      units: this.units(),
      commentsOf: this.commentsOf(),
      caseId: this.showsWorst() ? null : this.caseId(),
      caseName: this.nameOfCase(),
    }),
  );
  protected readonly shownRows = computed(() =>
    this.changedOnly() ? this.rows().filter((row) => row.moved) : this.rows(),
  );
  protected readonly turns = computed(() =>
    [
      turnWords(turnsOf(this.rows().map(({ from, to, turned }) => ({ before: from, after: to, turned })))),
      oneSidedWords(this.rows(), this.labels()),
    ].join(' '),
  );
  private readonly findings = computed(() => {
    const names = new Map<string, string>();
    for (const { file } of [this.before(), this.after()]) {
      for (const element of [...file.nodes, ...file.pipes]) names.set(element.id, nameOf(element));
    }
    return this.effects().findings.map((finding) => ({
      ...finding,
      name: names.get(finding.element) ?? (finding.element === '' ? 'the network' : finding.element),
    }));
  });
  protected readonly eased = computed(() =>
    turnedFindingWords(this.findings().filter(({ from, to }) => badness(to) < badness(from))),
  );
  protected readonly worsened = computed(() =>
    turnedFindingWords(this.findings().filter(({ from, to }) => badness(to) > badness(from))),
  );

  protected chooseCase(caseId: string): void {
    this.wantedCase.set(caseId);
  }

  protected chooseQuantity(quantity: string): void {
    this.quantity.set(quantity === 'differentialPa' ? 'differentialPa' : 'backPressurePa');
  }
}

function hasBands({ results }: RevisionSide): boolean {
  return results.some(
    (outcome) => outcome.status === 'solved' && outcome.result.traps.some(({ spread }) => spread !== undefined),
  );
}
