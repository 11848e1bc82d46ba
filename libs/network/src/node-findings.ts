import { KIND_NAMES } from './override-keys';
import type { FlashVessel, NetworkNode, PipeRun, Receiver } from './network-file';
import { nameOf, type PipesAtNodes, type TopologyFinding } from './topology';

/** How many pipes may leave and enter a node, by its kind. A source without any pipe is cut off, which says enough. */
export function nodeFinding(node: NetworkNode, index: number, at: PipesAtNodes): TopologyFinding | undefined {
  const leaving = at.leavingCount(index);
  switch (node.kind) {
    case 'trap':
    case 'pumpedInlet':
      if (at.enteringCount(index) === 0 && leaving <= 1) return undefined;
      return sourcePipes(node, at.leaving(index), at.entering(index));
    case 'receiver':
      return leaving === 0 ? undefined : receiverPipes(node, at.leaving(index));
    case 'flashVessel':
      return leaving === 1 ? undefined : vesselPipes(node, at.leaving(index));
    case 'junction':
      return undefined;
  }
}

function sourcePipes(node: NetworkNode, leaving: readonly PipeRun[], entering: readonly PipeRun[]): TopologyFinding {
  const name = `${capital(KIND_NAMES[node.kind])} ${nameOf(node)}`;
  const backwards = entering.length > 0;
  return {
    ...error(node, 'trapPipes'),
    what: backwards
      ? `${name} has ${named(entering)} leading into it`
      : `${name} has ${leaving.length} pipes leading from it: ${list(leaving)}`,
    why: `Condensate leaves a ${KIND_NAMES[node.kind]} through exactly one pipe, and none comes back into it.`,
    remedy:
      backwards && leaving.length === 0
        ? `Turn ${list(entering)} round, so that it leads away.`
        : 'Keep the one pipe that leads away; let others start at a junction behind it.',
  };
}

function receiverPipes(node: Receiver, leaving: readonly PipeRun[]): TopologyFinding {
  return {
    ...error(node, 'receiverPipes'),
    what: `Receiver ${nameOf(node)} has ${named(leaving)} leading from it`,
    why: 'Condensate ends its way in a receiver; what is pumped on from there is another network.',
    remedy: `Turn ${list(leaving)} round, or start a network of its own with a pumped inlet there.`,
  };
}

function vesselPipes(node: FlashVessel, leaving: readonly PipeRun[]): TopologyFinding {
  const none = leaving.length === 0;
  return {
    ...error(node, 'vesselPipes'),
    what: none
      ? `Flash vessel ${nameOf(node)} has no pipe leading from it`
      : `Flash vessel ${nameOf(node)} has ${leaving.length} pipes leading from it: ${list(leaving)}`,
    why: 'The liquid of a flash vessel leaves through exactly one pipe.',
    remedy: none
      ? 'Draw the pipe that drains it towards the receiver, starting at the vessel.'
      : 'Keep the one that drains it; turn pipes round that feed it.',
  };
}

function error(
  node: NetworkNode,
  code: TopologyFinding['code'],
): Pick<TopologyFinding, 'code' | 'severity' | 'element'> {
  return { code, severity: 'error', element: { in: 'nodes', id: node.id } };
}

function named(pipes: readonly PipeRun[]): string {
  return `${pipes.length === 1 ? 'pipe' : 'pipes'} ${list(pipes)}`;
}

function list(pipes: readonly PipeRun[]): string {
  const shown = pipes.slice(0, 5).map(nameOf).join(', ');
  return pipes.length > 5 ? `${shown} and ${pipes.length - 5} more` : shown;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
