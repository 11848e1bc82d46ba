import {
  findings,
  fromFile,
  type NetworkFile,
  type NetworkNode,
  type PipeRun,
  type TopologyFinding,
} from '@riseback/network';
import type { CaseOutcome } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';

/** What the tables of one state of a network are filled from. */
export interface TableSource {
  readonly file: NetworkFile;
  readonly outcomes: readonly CaseOutcome[];
  readonly units: DisplayUnits;
  readonly nodes: ReadonlyMap<string, NetworkNode>;
  readonly pipes: ReadonlyMap<string, PipeRun>;
  /** Of the network as drawn, whatever the case. */
  readonly topology: readonly TopologyFinding[];
}

export function tableSource(
  file: NetworkFile,
  outcomes: readonly CaseOutcome[],
  system: DisplayUnits['system'],
): TableSource {
  return {
    file,
    outcomes,
    units: { system, atmosphericPressurePa: file.site.atmosphericPressurePa },
    nodes: new Map(file.nodes.map((node) => [node.id, node])),
    pipes: new Map(file.pipes.map((pipe) => [pipe.id, pipe])),
    topology: findings(fromFile(file)),
  };
}

/** What the plant calls it: the tag, else the id. */
export function nameOfElement({ nodes, pipes }: Pick<TableSource, 'nodes' | 'pipes'>, id: string): string {
  return nodes.get(id)?.tag ?? pipes.get(id)?.tag ?? id;
}

/** The plain network has neither id nor name. */
export function caseNameOf({ file }: Pick<TableSource, 'file'>, caseId: string): string {
  if (caseId === '') return 'As drawn';
  return file.cases.find(({ id }) => id === caseId)?.name ?? caseId;
}
