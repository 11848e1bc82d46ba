import type { NodeResult, PipeResult, TrapCheck, TrapResult, Verdict } from '@riseback/contracts';
import type { NetworkNode, PipeRun } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { checkName } from '../../results/finding-words';
import { KIND_WORDS, nameOf } from '../../shared/element-words';

export interface NodeFacts {
  readonly trap: TrapResult | undefined;
  readonly result: NodeResult | undefined;
  /** Verdicts of warnings about this element, with their codes. */
  readonly warnings: readonly { readonly code: string; readonly verdict: Verdict }[];
  readonly selected: boolean;
  /** The case that the result is of, where it is not the same for all elements. */
  readonly caseName?: string;
}

/** What a screen reader says of a node: "TR-104, trap, elevation 4 ft, 31.2 psig behind it, differential fails, selected". */
export function nodeName(node: NetworkNode, facts: NodeFacts, units: DisplayUnits): string {
  const { trap, result, warnings, selected, caseName } = facts;
  return [
    nameOf(node),
    KIND_WORDS[node.kind],
    `elevation ${formatQuantity(node.elevationM, 'length', units, { withUnit: true })}`,
    pressureWords(node, trap, result, units),
    ...findingWords([...(trap?.checks ?? []), ...warnings]),
    caseWords(caseName),
    selected ? 'selected' : '',
  ]
    .filter((part) => part !== '')
    .join(', ');
}

export interface PipeFacts {
  readonly from: NetworkNode | undefined;
  readonly to: NetworkNode | undefined;
  readonly result: PipeResult | undefined;
  readonly warnings: readonly { readonly code: string; readonly verdict: Verdict }[];
  readonly selected: boolean;
  /** The case that the result is of, where it is not the same for all elements. */
  readonly caseName?: string;
}

/** "CR-15, pipe from TR-104 to J3, 12 ft of 1 in schedule 80, 31.2 to 30.9 psig, velocity fails". */
export function pipeName(pipe: PipeRun, facts: PipeFacts, units: DisplayUnits): string {
  const { from, to, result, warnings, selected, caseName } = facts;
  const ends = `pipe from ${from === undefined ? pipe.from : nameOf(from)} to ${to === undefined ? pipe.to : nameOf(to)}`;
  return [
    nameOf(pipe),
    ends,
    `${formatQuantity(pipe.lengthM, 'length', units, { withUnit: true })} of ${sizeWords(pipe, units)}`,
    result === undefined
      ? 'not solved'
      : `${formatQuantity(result.upstreamPressurePa, 'pressure', units)} to ${formatQuantity(result.downstreamPressurePa, 'pressure', units, { withUnit: true })}`,
    ...(result !== undefined && result.massFlowKgS < 0 ? ['flows against its arrow'] : []),
    ...findingWords(warnings),
    caseWords(caseName),
    selected ? 'selected' : '',
  ]
    .filter((part) => part !== '')
    .join(', ');
}

/** "1-1/2 in schedule 80", or the bore where the pipe has no nominal size. */
export function sizeWords({ size, insideDiameterM }: PipeRun, units: DisplayUnits): string {
  if (size !== undefined) return `${size.nps} in schedule ${size.schedule}`;
  return insideDiameterM === undefined
    ? 'no size'
    : `${formatQuantity(insideDiameterM, 'diameter', units, { withUnit: true })} bore`;
}

function pressureWords(
  node: NetworkNode,
  trap: TrapResult | undefined,
  result: NodeResult | undefined,
  units: DisplayUnits,
): string {
  if (trap !== undefined)
    return `${formatQuantity(trap.backPressurePa, 'pressure', units, { withUnit: true })} behind it`;
  if (result !== undefined) return formatQuantity(result.pressurePa, 'pressure', units, { withUnit: true });
  return node.kind === 'trap' ? 'not solved' : '';
}

function caseWords(caseName = ''): string {
  return caseName === '' ? '' : `in case ${caseName}`;
}

/** Failing checks before watched ones, each named once. */
function findingWords(findings: readonly Pick<TrapCheck, 'code' | 'verdict'>[]): string[] {
  const named = (verdict: Verdict, word: string) =>
    [...new Set(findings.filter((finding) => finding.verdict === verdict).map(({ code }) => code))].map(
      (code) => `${checkName(code).toLowerCase()} ${word}`,
    );
  return [...named('fail', 'fails'), ...named('watch', 'to be watched')];
}
