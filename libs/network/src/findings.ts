import { jsonPointer } from './mistakes';
import type { NetworkDocument } from './network-document';
import type { NetworkFile, NetworkNode } from './network-file';
import { nodeFinding } from './node-findings';
import { KIND_NAMES } from './override-keys';
import { pipeEnds, type PipeEnds } from './pipe-ends';
import { gaugeFindings, pipeFindings } from './pipe-findings';
import {
  elementsOf,
  groundReached,
  hasBothEnds,
  hasFixedPressure,
  isSource,
  nameOf,
  PipesAtNodes,
  type DrawnElements,
  type TopologyFinding,
} from './topology';
import { vesselsInCircles } from './vessel-circles';

/** A finding with its place in a file (RFC 6901). */
export interface FileFinding extends TopologyFinding {
  readonly pointer: string;
}

/**
 * What stands in the way of a solve, and what else a person should know about the network as drawn; linear in its size.
 *
 * Reach is judged whatever way the arrows point: the flow runs to a receiver all the same, and the solver says where it runs
 * against an arrow. Loops and second ways down are sound: the solver divides the flow between them. Nodes of fixed pressure cut the
 * network; what leaves a flash vessel starts the next part.
 */
export function findings(document: NetworkDocument): TopologyFinding[] {
  const elements = elementsOf(document);
  return elementFindings(elements, pipeEnds(elements));
}

/**
 * {@link findings} of a file, each with its pointer into it.
 * @param ends for callers that have looked them up already
 */
export function fileFindings(file: NetworkFile, ends: PipeEnds = pipeEnds(file)): FileFinding[] {
  const found = elementFindings(file, ends);
  if (found.length === 0) return [];
  const indexes = {
    nodes: indexesOf(file.nodes),
    pipes: indexesOf(file.pipes),
    trapModels: indexesOf(file.trapModels),
    cases: indexesOf(file.cases),
    gauges: indexesOf(file.gauges),
  };
  return found.map((finding) => {
    const { element, key } = finding;
    // no finding is about an override; the whole network's are about its nodes
    if (element === null || element.in === 'overrides') return { ...finding, pointer: '/nodes' };
    const path = [element.in, indexes[element.in].get(element.id) ?? 0];
    return { ...finding, pointer: jsonPointer(key === undefined ? path : [...path, key]) };
  });
}

function elementFindings(elements: DrawnElements, ends: PipeEnds): TopologyFinding[] {
  const { nodes, pipes } = elements;
  const at = new PipesAtNodes(elements, ends);
  const found = wholeFindings(nodes);
  nodes.forEach((node, index) => {
    const finding = nodeFinding(node, index, at);
    if (finding !== undefined) found.push(finding);
  });
  for (const finding of cutOffNodes(nodes, ends)) found.push(finding);
  pipes.forEach((pipe, i) => {
    if (!hasBothEnds(ends, i)) return;
    const [from, to] = [nodes[ends.from[i] as number], nodes[ends.to[i] as number]] as [NetworkNode, NetworkNode];
    for (const finding of pipeFindings(pipe, from, to)) found.push(finding);
  });
  found.push(...vesselLoops(nodes, ends), ...gaugeFindings(elements));
  return found;
}

function wholeFindings(nodes: readonly NetworkNode[]): TopologyFinding[] {
  const found: TopologyFinding[] = [];
  if (!nodes.some(hasFixedPressure)) {
    found.push({
      code: 'noReceiver',
      severity: 'error',
      element: null,
      what: 'The network has no receiver',
      why: 'Back pressure is counted up from where the condensate ends: a receiver, or a flash vessel of given pressure.',
      remedy: 'Place a receiver and lead the return pipe to it.',
    });
  }
  if (nodes.length > 0 && !nodes.some(isSource)) {
    found.push({
      code: 'noSource',
      severity: 'note',
      element: null,
      what: 'Nothing flows in this network',
      why: 'Condensate enters through traps and pumped inlets, and there are none.',
      remedy: 'Place a trap and give its load.',
    });
  }
  return found;
}

function cutOffNodes(nodes: readonly NetworkNode[], ends: PipeEnds): TopologyFinding[] {
  // without any receiver everything is cut off, which one finding says better than many
  if (!nodes.some(hasFixedPressure)) return [];
  const reachesGround = groundReached(nodes, ends);
  return nodes
    .filter((node, index) => !hasFixedPressure(node) && !reachesGround(index))
    .map((node) => {
      const kind = KIND_NAMES[node.kind];
      return {
        code: 'cutOff',
        severity: 'error',
        element: { in: 'nodes', id: node.id },
        what: `${kind.charAt(0).toUpperCase()}${kind.slice(1)} ${nameOf(node)} is cut off`,
        why: 'No receiver or flash vessel can be reached from it, so no pressure stands there.',
        remedy: 'Draw the pipes that lead from it to the return, or delete it.',
      };
    });
}

function vesselLoops(nodes: readonly NetworkNode[], ends: PipeEnds): TopologyFinding[] {
  return vesselsInCircles(nodes, ends).map((vessel) => ({
    code: 'loop',
    severity: 'error',
    element: { in: 'nodes', id: vessel.id },
    what: `The liquid of flash vessel ${nameOf(vessel)} comes back to it`,
    why: 'A vessel that feeds itself fills up: its liquid must end in a receiver.',
    remedy: 'Lead the pipe that drains it to a receiver.',
  }));
}

function indexesOf(list: readonly { readonly id: string }[]): Map<string, number> {
  return new Map(list.map(({ id }, index) => [id, index]));
}
