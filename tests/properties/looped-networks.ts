import type { NetworkFile } from '@riseback/network';
import fc from 'fast-check';
import { networkFile } from '../fixtures/solver/small-networks';

/** How far the random numbers reach. */
export interface Reach {
  readonly maximumJunctions: number;
  readonly loadKgS: readonly [number, number];
  readonly boreM: readonly [number, number];
  readonly lengthM: readonly [number, number];
  readonly riseM: number;
  /** Between the receivers of one network, as a share of the first one's pressure. */
  readonly receiverSpread: number;
}

/** What plants have. */
export const USUAL: Reach = {
  maximumJunctions: 12,
  loadKgS: [0.002, 0.2],
  boreM: [0.03, 0.15],
  lengthM: [2, 80],
  riseM: 3,
  receiverSpread: 0.02,
};
/** Far beyond. */
export const EXTREME: Reach = {
  maximumJunctions: 20,
  loadKgS: [1e-7, 50],
  boreM: [0.005, 0.6],
  lengthM: [0.5, 5000],
  riseM: 30,
  receiverSpread: 0.5,
};

const number = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
/** Evenly over the decades. */
const scale = ([min, max]: readonly [number, number]): fc.Arbitrary<number> =>
  number(Math.log(min), Math.log(max)).map(Math.exp);

interface DrawnPipe {
  readonly pick: number;
  readonly boreM: number;
  readonly lengthM: number;
  readonly turned: boolean;
  readonly checkValve: boolean;
  readonly heatLossWM: number;
  readonly lossCoefficient: number;
}
interface DrawnSource {
  readonly pick: number;
  readonly loadKgS: number;
  readonly inletBar: number;
  readonly subcoolingK: number;
  readonly pumped: boolean;
}

/**
 * Random networks with several ways down: junctions joined to a tree, more pipes between them, one to three receivers and up to
 * two vessels, traps and pumped inlets anywhere, arrows and check valves either way.
 */
export function loopedNetworks(reach: Reach): fc.Arbitrary<NetworkFile> {
  const pipe: fc.Arbitrary<DrawnPipe> = fc.record({
    pick: fc.nat(),
    boreM: scale(reach.boreM),
    lengthM: scale(reach.lengthM),
    turned: fc.boolean(),
    checkValve: fc.nat(9).map((roll) => roll === 0),
    heatLossWM: fc.oneof(fc.constant(0), number(0, 300)),
    lossCoefficient: fc.oneof(fc.constant(0), number(0, 10)),
  });
  const source: fc.Arbitrary<DrawnSource> = fc.record({
    pick: fc.nat(),
    loadKgS: fc.oneof({ weight: 9, arbitrary: scale(reach.loadKgS) }, { weight: 1, arbitrary: fc.constant(0) }),
    inletBar: number(1.5, 12),
    subcoolingK: fc.oneof(fc.constant(0), number(0, 60)),
    pumped: fc.nat(7).map((roll) => roll === 0),
  });
  const junction = fc.record({ elevationM: fc.oneof(fc.constant(0), number(-reach.riseM, reach.riseM)), pipe });
  return fc
    .record({
      junctions: fc.array(junction, { minLength: 1, maxLength: reach.maximumJunctions }),
      chords: fc.array(fc.record({ pipe, otherPick: fc.nat() }), { maxLength: 8 }),
      receivers: fc.array(
        fc.record({
          pipe,
          share: fc.oneof(
            { weight: 3, arbitrary: fc.constant(1) },
            { weight: 1, arbitrary: number(1, 1 + reach.receiverSpread) },
          ),
          valved: fc.boolean(),
        }),
        {
          minLength: 1,
          maxLength: 3,
        },
      ),
      vessels: fc.array(fc.record({ inPipe: pipe, outPipe: pipe, share: number(1, 1.2), apart: fc.boolean() }), {
        maxLength: 2,
      }),
      sources: fc.array(fc.record({ source, pipe }), { minLength: 1, maxLength: 10 }),
      receiverBar: number(0.9, 2),
      method: fc.record({
        staticLift: fc.constantFrom('rule', 'liquidFull', 'twoPhase'),
        dropCredit: fc.constantFrom(0, 0, 0.5, 1),
        friction: fc.constantFrom('flashVapour', 'flashVapour', 'homogeneous', 'byPattern', 'mullerSteinhagenHeck'),
      }),
    })
    .map(({ junctions, chords, receivers, vessels, sources, receiverBar, method }) => {
      const elevations = new Map<string, number>();
      const nodes: object[] = [];
      const pipes: object[] = [];
      const node = (id: string, kind: string, elevationM: number, more: object = {}): void => {
        elevations.set(id, elevationM);
        nodes.push({ id, kind, elevationM, ...more });
      };
      const lay = (id: string, from: string, to: string, drawn: DrawnPipe, free: boolean): void => {
        if (from === to) return;
        const rise = Math.abs((elevations.get(to) ?? 0) - (elevations.get(from) ?? 0));
        const turned = free && drawn.turned;
        pipes.push({
          id,
          from: turned ? to : from,
          to: turned ? from : to,
          lengthM: drawn.lengthM + rise,
          insideDiameterM: drawn.boreM,
          checkValve: drawn.checkValve,
          heatLossWM: drawn.heatLossWM,
          lossCoefficient: drawn.lossCoefficient,
          roughnessM: Math.min(4.57e-5, drawn.boreM / 50),
        });
      };
      const at = (pick: number): string => `J${String(pick % junctions.length)}`;
      junctions.forEach(({ elevationM }, i) => node(`J${String(i)}`, 'junction', elevationM));
      junctions.forEach((drawn, i) => {
        if (i > 0) lay(`M${String(i)}`, `J${String(i)}`, `J${String(drawn.pipe.pick % i)}`, drawn.pipe, true);
      });
      chords.forEach(({ pipe: drawn, otherPick }, i) =>
        lay(`C${String(i)}`, at(drawn.pick), at(otherPick), drawn, true),
      );
      receivers.forEach(({ pipe: drawn, share, valved }, i) => {
        node(`R${String(i)}`, 'receiver', 0, { pressurePa: receiverBar * 1e5 * (i === 0 ? 1 : share) });
        lay(`E${String(i)}`, at(drawn.pick), `R${String(i)}`, { ...drawn, checkValve: valved }, false);
      });
      vessels.forEach(({ inPipe, outPipe, share, apart }, i) => {
        node(`V${String(i)}`, 'flashVessel', 0, { pressurePa: receiverBar * 1e5 * share });
        lay(`I${String(i)}`, at(inPipe.pick), `V${String(i)}`, { ...inPipe, checkValve: true }, false);
        // to a receiver of its own way, or back among the junctions, where it may find its way to the vessel again
        lay(`O${String(i)}`, `V${String(i)}`, apart ? 'R0' : at(outPipe.pick), outPipe, false);
      });
      sources.forEach(({ source: drawn, pipe: lead }, i) => {
        const id = `S${String(i)}`;
        if (drawn.pumped) node(id, 'pumpedInlet', 0, { flowKgS: drawn.loadKgS, temperatureK: 330 });
        else {
          const { loadKgS, subcoolingK, inletBar } = drawn;
          node(id, 'trap', 0, { loadKgS, subcoolingK, inletPressurePa: inletBar * 1e5 });
        }
        lay(`L${String(i)}`, id, at(drawn.pick), { ...lead, checkValve: false }, false);
      });
      return networkFile({ method, nodes, pipes });
    });
}
