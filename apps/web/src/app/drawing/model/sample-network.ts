import {
  emptyDocument,
  type NetworkDocument,
  type NetworkNode,
  type PipeRun,
  type Position,
  withTrapDefaults,
} from '@riseback/network';

const PIPE = {
  lengthM: 6,
  size: { nps: '1', schedule: '40' },
  roughnessM: 4.57e-5,
  fittings: [],
  lossCoefficient: 0,
  heatLossWM: 0,
  checkValve: false,
};

export function sampleTrap(id: string, position: Position, tag?: string): NetworkNode {
  return withTrapDefaults({
    id,
    kind: 'trap',
    ...(tag === undefined ? {} : { tag }),
    elevationM: 1.2192,
    position,
    inletPressurePa: 618_000,
    loadKgS: 0.05,
  });
}

export function samplePipe(id: string, from: string, to: string, more: Partial<PipeRun> = {}): PipeRun {
  return { ...PIPE, id, from, to, ...more };
}

export function documentOf(nodes: readonly NetworkNode[], pipes: readonly PipeRun[] = []): NetworkDocument {
  return {
    ...emptyDocument('Sample'),
    nodes: new Map(nodes.map((value, ordinal) => [value.id, { ordinal, value }])),
    pipes: new Map(pipes.map((value, ordinal) => [value.id, { ordinal, value }])),
  };
}

/**
 * Two traps over a header that rises to a receiver:
 *
 *     T1 (0,0)    T2 (200,0)
 *      L1          L2
 *     J1 (0,100)─L3─J2 (200,100)─L4─R1 (400,100)
 */
export function sampleDocument(): NetworkDocument {
  return documentOf(
    [
      sampleTrap('T1', { x: 0, y: 0 }, 'TR-101'),
      sampleTrap('T2', { x: 200, y: 0 }, 'TR-102'),
      { id: 'J1', kind: 'junction', elevationM: 1, position: { x: 0, y: 100 } },
      { id: 'J2', kind: 'junction', elevationM: 1, position: { x: 200, y: 100 } },
      { id: 'R1', kind: 'receiver', tag: 'R-1', elevationM: 4, vented: true, position: { x: 400, y: 100 } },
    ],
    [
      samplePipe('L1', 'T1', 'J1', { tag: 'CR-1' }),
      samplePipe('L2', 'T2', 'J2', { tag: 'CR-2' }),
      samplePipe('L3', 'J1', 'J2'),
      samplePipe('L4', 'J2', 'R1'),
    ],
  );
}
