import type { NetworkFile } from '@riseback/network';
import fc from 'fast-check';
import { networkFile } from '../fixtures/solver/small-networks';

/** What fast-check draws for one node above the receiver and the pipe by which it drains. */
interface Branch {
  /** Picks the node it drains to among those drawn before it. */
  readonly pick: number;
  readonly isTrap: boolean;
  readonly riseM: number;
  readonly stretch: number;
  readonly boreM: number;
  readonly lossCoefficient: number;
  readonly heatLossWM: number;
  readonly loadKgS: number;
  readonly inletBar: number;
  readonly subcoolingK: number;
  readonly againstArrow: boolean;
  /** Shares of length and rise at which the route is bent, if it is. */
  readonly bend?: { readonly length: number; readonly climbM: number } | undefined;
}

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });

const branch: fc.Arbitrary<Branch> = fc.record({
  pick: fc.nat(),
  isTrap: fc.boolean(),
  riseM: number(-4, 8),
  stretch: number(1.05, 6),
  boreM: number(0.02, 0.1),
  lossCoefficient: number(0, 10),
  heatLossWM: fc.oneof(fc.constant(0), number(0, 300)),
  loadKgS: number(0.002, 0.1),
  inletBar: number(1.2, 12),
  subcoolingK: fc.oneof(fc.constant(0), number(0, 40)),
  againstArrow: fc.boolean(),
  bend: fc.option(fc.record({ length: number(0.2, 0.8), climbM: number(0, 1) }), { nil: undefined }),
});

export interface NetworkChoices {
  readonly staticLift?: 'rule' | 'liquidFull';
  readonly dropCredit?: number;
}

/**
 * Random trees of traps and junctions over one receiver, each junction fed by at least one trap. Bores and loads are such that
 * nothing leaves the steam properties; arrows point both ways, except at traps and the receiver.
 */
export function returnNetworks(choices: fc.Arbitrary<NetworkChoices> = fc.constant({})): fc.Arbitrary<NetworkFile> {
  return fc
    .tuple(fc.array(branch, { minLength: 1, maxLength: 14 }), number(0.9, 3), choices)
    .map(([branches, receiverBar, method]) => networkOf(branches, receiverBar, method));
}

function networkOf(branches: readonly Branch[], receiverBar: number, method: NetworkChoices): NetworkFile {
  const nodes: { id: string; kind: string; elevationM: number }[] = [
    { id: 'R', kind: 'receiver', elevationM: 0, ...{ pressurePa: receiverBar * 1e5 } },
  ];
  const pipes: object[] = [];
  const open = ['R'];
  const fed = new Set<string>();
  branches.forEach((drawn, i) => {
    const below = open[drawn.pick % open.length] ?? 'R';
    const id = `${drawn.isTrap ? 'T' : 'J'}${i}`;
    add(drawn, id, below, drawn.isTrap);
    fed.add(below);
    if (!drawn.isTrap) open.push(id);
  });
  // a junction that nothing feeds would be a dead leg: give it a trap
  branches.forEach((drawn, i) => {
    const id = `J${i}`;
    if (!drawn.isTrap && !fed.has(id)) add(drawn, `E${i}`, id, true);
  });
  return networkFile({ method, nodes, pipes });

  function add(drawn: Branch, id: string, below: string, isTrap: boolean): void {
    const floorM = nodes.find((node) => node.id === below)?.elevationM ?? 0;
    const elevationM = floorM - drawn.riseM;
    const trap = { inletPressurePa: drawn.inletBar * 1e5, loadKgS: drawn.loadKgS, subcoolingK: drawn.subcoolingK };
    nodes.push({ id, kind: isTrap ? 'trap' : 'junction', elevationM, ...(isTrap ? trap : {}) });
    const turned = drawn.againstArrow && !isTrap && below !== 'R';
    const sign = turned ? -1 : 1;
    const riseM = sign * (floorM - elevationM);
    const bent = drawn.bend && { climbM: drawn.bend.climbM, length: drawn.bend.length };
    const lengthM = (Math.abs(riseM) + (bent?.climbM ?? 0) * 2 + 1) * drawn.stretch * 2;
    const first = bent && { lengthM: lengthM * bent.length, riseM: riseM * bent.length + bent.climbM };
    pipes.push({
      id: `P-${id}`,
      from: turned ? below : id,
      to: turned ? id : below,
      lengthM,
      insideDiameterM: drawn.boreM,
      lossCoefficient: drawn.lossCoefficient,
      heatLossWM: drawn.heatLossWM,
      ...(first && { route: [first, { lengthM: lengthM - first.lengthM, riseM: riseM - first.riseM }] }),
    });
  }
}
