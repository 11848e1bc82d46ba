import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  Injector,
  input,
  linkedSignal,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { inOrder } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { nameOf } from '../shared/element-words';
import { type Choice, ChoiceField } from '../shared/fields/choice-field';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { sizesFor } from './next-size';
import { candidatesOf, SUBJECT_FACTS, SUBJECTS, type Subject, type Way, WAYS } from './trial-subjects';
import { TrialStore } from './trial-store';

/** More rows than these are found by typing, not by scrolling. */
const LISTED_AT_MOST = 200;
const NONE: ReadonlySet<string> = new Set();

/** Asks what to try: of what, at which elements, and how. */
@Component({
  selector: 'app-trial-form',
  imports: [ChoiceField, MatButton, QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './trial-form.html',
  styleUrl: './trial-form.scss',
})
export class TrialForm {
  protected readonly store = inject(NetworkStore);
  private readonly trials = inject(TrialStore);
  private readonly injector = inject(Injector);

  /** What a finding or a link proposes: the subject, the way, and the element ticked to begin with. */
  readonly wantedSubject = input<string>();
  readonly wantedWay = input<string>();
  readonly wantedElement = input<string>();
  readonly tried = output();

  private readonly quantityField = viewChild(QuantityField);
  private readonly goButton = viewChild.required<unknown, ElementRef<HTMLButtonElement>>('go', { read: ElementRef });

  protected readonly none = NONE;
  protected readonly subjects = SUBJECTS.map((subject) => ({ subject, words: SUBJECT_FACTS[subject].words }));
  protected readonly subject = linkedSignal<Subject>(
    () => SUBJECTS.find((subject) => subject === this.wantedSubject()) ?? 'size',
  );
  protected readonly facts = computed(() => SUBJECT_FACTS[this.subject()]);
  protected readonly search = signal('');
  protected readonly ticked = signal<ReadonlySet<string>>(NONE);
  protected readonly complaint = signal('');
  protected readonly nps = signal<string | undefined>(undefined);

  /** As they stand with what is tried already. */
  private readonly document = computed(() => this.trials.laidOver()?.document ?? null);
  protected readonly candidates = computed(() => {
    const document = this.document();
    return document === null ? [] : candidatesOf(document, this.subject(), this.store.units(), this.store.caseId());
  });
  protected readonly shown = computed(() => {
    const wanted = this.search().trim().toLowerCase();
    return this.candidates().filter(({ name, where, value }) =>
      `${name} ${where} ${value}`.toLowerCase().includes(wanted),
    );
  });
  protected readonly listed = computed(() => this.shown().slice(0, LISTED_AT_MOST));
  protected readonly countWords = computed(() => {
    const count = this.ticked().size;
    return count === 0 ? 'None ticked' : `${String(count)} of ${String(this.candidates().length)} ticked`;
  });
  /** Each trap with the pipes between it and its receiver. */
  protected readonly ways = computed(() => {
    const document = this.store.document();
    const results = this.store.trapResults();
    if (document === null) return [];
    return inOrder(document.nodes).flatMap(([id, { value }]) => {
      const pipes = results.get(id)?.walk ?? [];
      return pipes.length === 0 ? [] : [{ id, name: nameOf(value), pipes }];
    });
  });

  protected readonly howChoices = computed((): Choice[] =>
    this.facts().ways.map(({ way, words }) => ({ value: way, words })),
  );
  protected readonly how = linkedSignal<Subject, Way>({
    source: this.subject,
    computation: (subject) => {
      const { ways } = SUBJECT_FACTS[subject];
      const wanted = untracked(() => ways.find(({ way }) => way === this.wantedWay()));
      return (wanted ?? ways[0])?.way ?? 'set';
    },
  });
  protected readonly asks = computed(() => this.facts().ways.find(({ way }) => way === this.how())?.asks ?? null);
  /** A number fits only what it was typed for. */
  protected readonly amount = linkedSignal<string, number | undefined>({
    source: () => `${this.subject()}/${this.how()}`,
    computation: () => undefined,
  });
  protected readonly sizes = computed((): Choice[] => {
    const [first] = this.ticked();
    const pipe = first === undefined ? undefined : this.document()?.pipes.get(first)?.value;
    return sizesFor(pipe ?? {}).map(({ nps, dn }) => ({ value: nps, words: `${nps} in (DN ${String(dn)})` }));
  });

  /** The element that was ticked since the address named it: once, so that it can be unticked. */
  private proposed = '';

  constructor() {
    effect(() => {
      const [element, subject] = [this.wantedElement(), this.wantedSubject()];
      // a trap stands for its way, which is known once there are results
      const way = this.ways().find(({ id }) => id === element)?.pipes;
      untracked(() => {
        if (element === undefined || this.proposed === element) return;
        const there = this.candidates().some(({ id }) => id === element)
          ? [element]
          : this.subject() === 'size'
            ? way
            : undefined;
        if (there === undefined) return;
        this.proposed = element;
        this.ticked.set(new Set(there));
        // with a whole wish in the address nothing is left but to try it
        if (subject !== undefined)
          afterNextRender(() => this.goButton().nativeElement.focus(), { injector: this.injector });
      });
    });
  }

  protected choose(subject: Subject): void {
    this.subject.set(subject);
    this.ticked.set(NONE);
    this.search.set('');
    this.complaint.set('');
  }

  protected chooseHow(way: string | undefined): void {
    this.how.set(WAYS.find((one) => one === way) ?? this.how());
    this.complaint.set('');
  }

  protected tick(id: string): void {
    this.ticked.update((before) => {
      const after = new Set(before);
      if (!after.delete(id)) after.add(id);
      return after;
    });
    this.complaint.set('');
  }

  protected tickShown(): void {
    this.ticked.update((before) => new Set([...before, ...this.shown().map(({ id }) => id)]));
  }

  protected tickWay(trapId: string): void {
    const pipes = this.ways().find(({ id }) => id === trapId)?.pipes ?? [];
    this.ticked.update((before) => new Set([...before, ...pipes]));
  }

  protected submit(event: Event): void {
    event.preventDefault();
    const field = this.quantityField();
    if (field !== undefined && !field.commit()) {
      field.focus();
      return;
    }
    const there = this.candidates().filter(({ id }) => this.ticked().has(id));
    const refusal = this.trials.add({
      subject: this.subject(),
      way: this.how(),
      ids: there.map(({ id }) => id),
      amount: this.amount(),
      nps: this.nps(),
    });
    this.complaint.set(refusal);
    if (refusal === '') this.tried.emit();
  }
}
