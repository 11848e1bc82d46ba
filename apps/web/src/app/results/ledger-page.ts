import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal, signal } from '@angular/core';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { type NetworkDocument, toFile } from '@riseback/network';
import { ledger, liftProfile } from '@riseback/solver';
import { NetworkStore } from '../networks/network-store';
import { SessionStore } from '../session/session-store';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { asSolved } from './as-solved';
import { allFindings, findingsOfCases } from './finding-list';
import { FindingsList } from './findings-list/findings-list';
import { bandsAlong, pressureRamp, pressuresOf } from '@riseback/figures';
import { LedgerSheet } from './ledger/ledger-sheet';
import { groupTraps, trapOfElement } from './ledger/trap-groups';
import { TrapList } from './ledger/trap-list';
import { nameOf } from '../shared/element-words';

/** Lift & ledger: the traps by their ways, and the account of the chosen one, or of the one that governs. */
@Component({
  selector: 'app-ledger-page',
  imports: [FindingsList, LedgerSheet, ProblemBanner, RouterLink, TrapList],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './ledger-page.html',
  styleUrl: './ledger-page.scss',
})
export class LedgerPage {
  protected readonly store = inject(NetworkStore);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);

  /** From the address: a trap, or any element that a trap's way goes through. */
  readonly element = input<string>();

  /**
   * The network that the results on screen belong to. Lengths of a newer drawing beside pressures of an older solve would be an
   * account of nothing, so the drawing is taken over only when its results are there.
   */
  private readonly solvedDocument = linkedSignal<
    { readonly document: NetworkDocument | null; readonly solved: boolean },
    NetworkDocument | null
  >({
    source: () => ({ document: this.store.document(), solved: this.store.solveState().kind === 'solved' }),
    computation: ({ document, solved }, previous) => (solved ? document : (previous?.value ?? null)),
  });

  protected readonly view = computed(() => {
    const document = this.solvedDocument();
    const result = this.store.result();
    if (document === null || result?.converged !== true) return null;
    return { document, result, grouped: groupTraps(document, result, this.store.units()) };
  });
  protected readonly ramp = computed(() =>
    pressureRamp(pressuresOf(this.store.outcomes().values()), this.store.units()),
  );

  /** The chosen trap; without a choice, the one that governs; null where the choice has no account. */
  protected readonly item = computed(() => {
    const view = this.view();
    if (view === null) return null;
    const wanted = this.element() ?? '';
    return wanted === '' ? view.grouped.governing : trapOfElement(view.document, view.grouped, wanted);
  });
  protected readonly account = computed(() => {
    const view = this.view();
    const item = this.item();
    if (view === null || item === null) return null;
    // of one case throughout: the worst of all joins cases, whose numbers would not add up
    const result = this.store.showsWorst() ? this.store.resultAt(item.id) : view.result;
    if (result === null) return null;
    const [file, solved] = [toFile(view.document), asSolved(result)];
    return {
      item,
      document: view.document,
      entries: ledger(file, solved, item.id),
      points: liftProfile(file, solved, item.id),
      alongWay: bandsAlong(file, solved, item.result),
      nodeResult: result.nodes.find(({ id }) => id === item.id),
      caseName: this.store.showsWorst() ? this.store.nameOfCase(this.store.caseOf(item.id)) : this.store.caseName(),
    };
  });

  protected readonly hasTraps = computed(() =>
    [...(this.store.document()?.nodes.values() ?? [])].some(({ value }) => value.kind === 'trap'),
  );
  /** Why the newest state could not be solved at all. */
  protected readonly problem = computed(() => {
    const state = this.store.solveState();
    return state.kind === 'failed' ? state.problem : null;
  });
  private readonly findings = computed(() => {
    const document = this.store.document();
    if (document === null) return [];
    const sources = { document, topology: this.store.topology(), units: this.store.units() };
    return this.store.showsWorst()
      ? findingsOfCases({ ...sources, outcomes: this.store.caseOutcomes() })
      : allFindings({ ...sources, outcome: this.store.outcome() });
  });
  /** What stands against this case as a whole: it asks for what is not computed, or has no solution. */
  protected readonly unanswered = computed(() => {
    const reasons = this.findings().filter(({ code }) => code === 'refused' || code === 'noSolution');
    return reasons.length === 0 ? null : reasons;
  });
  /** There will be no list of traps; while it is only to come, its room is kept, so that nothing moves when it does. */
  protected readonly alone = computed(
    () => this.view() === null && (this.problem() !== null || this.unanswered() !== null || !this.hasTraps()),
  );
  /** What has no result, as the beginning of a sentence. */
  protected readonly whole = computed(() => {
    if (this.store.showsWorst()) return 'No case has a result; the worst of all has';
    const name = this.store.caseName();
    return `${name === '' ? 'This network' : `Case “${name}”`} has`;
  });
  /** What an element without an account has against it. */
  protected readonly ofElement = computed(() => {
    const document = this.store.document();
    const id = this.element() ?? '';
    const element = document?.nodes.get(id)?.value ?? document?.pipes.get(id)?.value;
    return {
      name: element === undefined ? '' : nameOf(element),
      findings: this.findings().filter((finding) => finding.element?.id === id),
    };
  });
  protected readonly staleReason = computed(() => {
    switch (this.store.solveState().kind) {
      case 'solved':
        return '';
      case 'solving':
        return 'The network has changed and is being solved again; these numbers belong to what stood before.';
      case 'stale':
        return 'The last change is not saved, so it is not solved either; these numbers belong to what stood before.';
      case 'failed':
        return 'The last change could not be solved; these numbers belong to what stood before.';
    }
  });
  protected readonly nameOfCase = computed(() =>
    this.store.showsWorst() ? (caseId: string) => this.store.nameOfCase(caseId) : undefined,
  );
  protected readonly solvedAt = computed(() => {
    const finished = this.store.finished();
    if (finished === null) return '';
    const format = new Intl.DateTimeFormat('en-GB', {
      dateStyle: 'medium',
      timeStyle: 'short',
      timeZone: this.session.timeZone(),
    });
    return format.format(new Date(finished.finishedAt));
  });

  protected readonly told = signal('');

  protected open(elementId: string): void {
    void this.router.navigate([], { queryParams: { element: elementId }, queryParamsHandling: 'merge' });
  }

  protected showOnDrawing(elementId: string): void {
    void this.router.navigate(['../drawing'], {
      relativeTo: this.route,
      queryParams: { element: elementId },
      queryParamsHandling: 'merge',
    });
  }
}
