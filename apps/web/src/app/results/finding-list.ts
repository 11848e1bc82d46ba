import type { CaseOutcome, Problem, SolveResult } from '@riseback/contracts';
import {
  type CollectionName,
  compareIds,
  inOrder,
  type NetworkDocument,
  type Position,
  type TopologyFinding,
} from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { COINCIDENCE_WORDS } from '../networks/method-words';
import { findingWords } from './finding-words';

export type FindingSeverity = 'fail' | 'watch' | 'note';
export interface FindingElement {
  readonly in: CollectionName;
  readonly id: string;
}

/** Something that a person should know, whatever found it: a check, the solver, the network's shape, a refused case. */
export interface Finding {
  /** Unique in its list, the same from one solve to the next. */
  readonly id: string;
  readonly severity: FindingSeverity;
  /** Where it can be mended; null where the network as a whole is meant. */
  readonly element: FindingElement | null;
  /** What the plant calls the element: its tag, else its id; '' for the whole. */
  readonly tag: string;
  /** Where it lies on the drawing; a pipe where it begins. */
  readonly position: Position | null;
  readonly code: string;
  readonly what: string;
  readonly why?: string;
  readonly remedy?: string;
  /** The cases it was found in, where the findings of several stand together; not set where it holds in whatever case. */
  readonly cases?: readonly string[];
}

export interface FindingSources {
  readonly document: NetworkDocument;
  readonly topology: readonly TopologyFinding[];
  /** The chosen case's; null while there is none. */
  readonly outcome: CaseOutcome | null;
  readonly units: DisplayUnits;
}

const ORDER: Readonly<Record<FindingSeverity, number>> = { fail: 0, watch: 1, note: 2 };

/** Every finding of a case, worst first; equal ones by tag, as a person counts (TR-9 before TR-10). */
export function allFindings(sources: FindingSources): Finding[] {
  const { document, topology, outcome } = sources;
  const drawn = topology.map((finding) => ofTopology(document, finding));
  const found = outcome === null ? [] : foundIn(sources, drawn, outcome);
  return numbered([...drawn, ...found].sort(worstFirst));
}

/**
 * The findings of all cases, worst first. One thing at one element stands together whatever the case, by its worst; where the cases
 * say the same of it in the same words, they share one entry.
 */
export function findingsOfCases(
  sources: Omit<FindingSources, 'outcome'> & { readonly outcomes: readonly CaseOutcome[] },
): Finding[] {
  const { document, topology, outcomes } = sources;
  const drawn = topology.map((finding) => ofTopology(document, finding));
  const shared = new Map<string, Unnumbered & { cases: string[] }>();
  for (const outcome of outcomes) {
    for (const finding of foundIn(sources, drawn, outcome)) {
      const { severity, what, remedy } = finding;
      const key = JSON.stringify([subjectOf(finding), severity, what, remedy]);
      const before = shared.get(key);
      if (before === undefined) shared.set(key, { ...finding, cases: [outcome.caseId] });
      else before.cases.push(outcome.caseId);
    }
  }
  const bySubject = new Map<string, Unnumbered[]>();
  for (const finding of shared.values()) {
    const subject = subjectOf(finding);
    bySubject.set(subject, [...(bySubject.get(subject) ?? []), finding]);
  }
  const groups = [
    ...drawn.map((finding) => [finding]),
    ...[...bySubject.values()].map((group) => group.sort(worstFirst)),
  ];
  return numbered(groups.sort(([a], [b]) => (a === undefined || b === undefined ? 0 : worstFirst(a, b))).flat());
}

const BY_TAG = new Intl.Collator('en', { numeric: true });
type Unnumbered = Omit<Finding, 'id'>;

function worstFirst(a: Unnumbered, b: Unnumbered): number {
  return (
    ORDER[a.severity] - ORDER[b.severity] ||
    BY_TAG.compare(a.tag, b.tag) ||
    compareIds(a.element?.id ?? '', b.element?.id ?? '')
  );
}

/** What was found in one case, with what its solve left out unless the drawing or the case already says why. */
function foundIn(
  { document, units }: Pick<FindingSources, 'document' | 'units'>,
  drawn: readonly Unnumbered[],
  outcome: CaseOutcome,
): Unnumbered[] {
  const found = ofOutcome(document, outcome, units);
  if (outcome.status === 'refused') return found;
  const covered = new Set([...drawn, ...found].map(({ element }) => element?.id));
  return [...found, ...leftOut(document, outcome.result, covered)];
}

/** What a finding is about, in whatever case: one code at one element. */
function subjectOf({ element, code }: Unnumbered): string {
  return `${element === null ? 'network' : `${element.in}/${element.id}`}/${code}`;
}

/** Two findings of one code at one element get different ids. */
function numbered(findings: readonly Unnumbered[]): Finding[] {
  const seen = new Map<string, number>();
  return findings.map((finding) => {
    const id = subjectOf(finding);
    const count = (seen.get(id) ?? 0) + 1;
    seen.set(id, count);
    return { id: count === 1 ? id : `${id}/${count.toString()}`, ...finding };
  });
}

function ofTopology(document: NetworkDocument, finding: TopologyFinding): Unnumbered {
  const { severity, element, code, what, why, remedy } = finding;
  return { ...at(document, element), severity: severity === 'error' ? 'fail' : 'note', code, what, why, remedy };
}

function ofOutcome(document: NetworkDocument, outcome: CaseOutcome, units: DisplayUnits): Unnumbered[] {
  if (outcome.status === 'refused') return ofProblem(document, outcome.problem, 'refused');
  const { result } = outcome;
  return [
    ...(result.converged ? [] : ofProblem(document, result.problem, 'noSolution')),
    ...result.traps.flatMap(({ id, checks }) =>
      checks.flatMap(({ verdict, code, text, remedy }) =>
        verdict === 'pass' ? [] : [ofCheck(document, { in: 'nodes', id }, verdict, code, text, remedy, units)],
      ),
    ),
    ...result.warnings.map(({ verdict, code, element, text, remedy }) =>
      ofCheck(document, elementOf(document, element), verdict, code, text, remedy, units),
    ),
  ];
}

type Text = Parameters<typeof findingWords>[0];

function ofCheck(
  document: NetworkDocument,
  element: FindingElement | null,
  severity: 'fail' | 'watch',
  code: string,
  text: Text,
  remedy: Text | undefined,
  units: DisplayUnits,
): Unnumbered {
  return {
    ...at(document, element),
    severity,
    code,
    what: findingWords(text, units),
    ...(remedy === undefined ? {} : { remedy: findingWords(remedy, units) }),
  };
}

/** Each mistake that a refusal names; its title where it names none. */
function ofProblem(document: NetworkDocument, problem: Problem | undefined, code: string): Unnumbered[] {
  const title = problem?.title ?? 'The network has no solution';
  const errors = problem?.errors ?? [];
  if (errors.length === 0) {
    return [{ ...at(document, null), severity: 'fail', code, what: problem?.detail ?? title }];
  }
  return errors.map(({ pointer, detail }) => ({
    ...at(document, pointedAt(document, pointer)),
    severity: 'fail',
    code,
    what: `${detail.charAt(0).toUpperCase()}${detail.slice(1)}`,
    ...(code === 'refused' ? { remedy: remedyAt(pointer) } : {}),
  }));
}

/** The method is every case's; anything else may be one case's alone. */
function remedyAt(pointer: string): string {
  return pointer === '/method/coincidence'
    ? `Choose “${COINCIDENCE_WORDS.average}” or “${COINCIDENCE_WORDS.ownPeak}” for intermittent traps.`
    : 'Change what is named here, or look at another case.';
}

/** The element of a pointer into the network's file, whose lists stand in the document's order. */
function pointedAt(document: NetworkDocument, pointer: string): FindingElement | null {
  const [, list, index, inside, overrideIndex] = pointer.split('/');
  if (list === 'cases' && inside === 'overrides') {
    const caseId = inOrder(document.cases)[Number(index)]?.[0];
    const ofCase = inOrder(document.overrides).filter(([id]) => id.startsWith(`${caseId ?? ''}/`));
    const node = ofCase[Number(overrideIndex)]?.[1].value.node;
    return node === undefined ? null : { in: 'nodes', id: node };
  }
  if (list !== 'nodes' && list !== 'pipes') return null;
  const id = inOrder<unknown>(document[list])[Number(index)]?.[0];
  return index === undefined || id === undefined ? null : { in: list, id };
}

/** Traps and pumped inlets that got no numbers, each by name, and how much else; what has its own finding says why there. */
function leftOut(
  document: NetworkDocument,
  result: SolveResult,
  covered: ReadonlySet<string | undefined>,
): Unnumbered[] {
  const silent = (result.leftOut ?? []).filter((id) => !covered.has(id));
  const sources = silent.filter((id) => {
    const kind = document.nodes.get(id)?.value.kind;
    return kind === 'trap' || kind === 'pumpedInlet';
  });
  const others = silent.filter((id) => !sources.includes(id) && elementOf(document, id) !== null);
  const [first] = others;
  const found = sources.map((id): Unnumbered => ({
    ...at(document, elementOf(document, id)),
    severity: 'watch',
    code: 'leftOut',
    what: 'Left out of the solve: nothing leads from it to a receiver that can be computed.',
    remedy: 'Mend the findings on its way, then it is solved with the rest.',
  }));
  if (first === undefined) return found;
  const tags = others.map((id) => at(document, elementOf(document, id)).tag);
  const more = tags.length > 6 ? ` and ${(tags.length - 6).toString()} more` : '';
  return [
    ...found,
    {
      ...at(document, elementOf(document, first)),
      severity: 'note',
      code: 'leftOut',
      what: `Left out of the solve: ${tags.slice(0, 6).join(', ')}${more}.`,
      remedy: 'Join them to the return, or delete them.',
    },
  ];
}

/** Solver findings name an element by id alone; ids are unique over nodes and pipes together. */
function elementOf(document: NetworkDocument, id: string): FindingElement | null {
  if (document.nodes.has(id)) return { in: 'nodes', id };
  return document.pipes.has(id) ? { in: 'pipes', id } : null;
}

function at(document: NetworkDocument, element: FindingElement | null): Pick<Finding, 'element' | 'tag' | 'position'> {
  if (element === null) return { element, tag: '', position: null };
  const { id } = element;
  switch (element.in) {
    case 'nodes': {
      const node = document.nodes.get(id)?.value;
      return { element, tag: node?.tag ?? id, position: node?.position ?? null };
    }
    case 'pipes': {
      const pipe = document.pipes.get(id)?.value;
      return { element, tag: pipe?.tag ?? id, position: positionOf(document, pipe?.from) };
    }
    case 'gauges': {
      const gauge = document.gauges.get(id)?.value;
      const node = gauge?.node ?? document.pipes.get(gauge?.pipe ?? '')?.value.from;
      return { element, tag: gauge?.tag ?? id, position: positionOf(document, node) };
    }
    case 'trapModels':
    case 'cases':
      return { element, tag: document[element.in].get(id)?.value.name ?? id, position: null };
    case 'overrides':
      return { element, tag: id, position: null };
  }
}

function positionOf(document: NetworkDocument, node: string | undefined): Position | null {
  return node === undefined ? null : (document.nodes.get(node)?.value.position ?? null);
}
