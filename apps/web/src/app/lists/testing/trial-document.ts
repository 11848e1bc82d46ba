import { fromFile, type NetworkDocument, readNetworkFile } from '@riseback/network';
import type { ListContext } from '../columns/column';
import { listContext } from '../list-context';

/** A small network with one of everything that is listed, for specs. */
export function trialDocument(): NetworkDocument {
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Trial',
    nodes: [
      {
        id: 'T1',
        kind: 'trap',
        tag: 'TR-2',
        area: 'Hall',
        elevationM: 0,
        inletPressurePa: 618_432,
        loadKgS: 0.05,
        trapModel: 'M1',
        maximumPressurePa: 721_853,
      },
      {
        id: 'T2',
        kind: 'trap',
        tag: 'TR-10',
        elevationM: 3.048,
        inletPressurePa: 308_168,
        loadKgS: 0.02,
        trapType: 'floatThermostatic',
        service: { kind: 'modulating', control: 'varyingInlet', secondaryInletK: 333.15, secondaryOutletK: 355.15 },
      },
      { id: 'J1', kind: 'junction', elevationM: 3.048 },
      { id: 'V1', kind: 'flashVessel', tag: 'FV-1', elevationM: 3, pressurePa: 204_746 },
      { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 1, vented: true },
      { id: 'P1', kind: 'pumpedInlet', tag: 'CP-1', elevationM: 0, flowKgS: 0.3, temperatureK: 333.15 },
    ],
    pipes: [
      { id: 'L1', tag: 'CR-1', from: 'T1', to: 'J1', lengthM: 12, size: { nps: '1', schedule: '80' } },
      { id: 'L2', tag: 'CR-2', from: 'J1', to: 'R1', lengthM: 30, insideDiameterM: 0.05 },
    ],
    trapModels: [{ id: 'M1', name: 'Marl B40', capacity: [{ differentialPa: 1e5, flowKgS: 0.2 }] }],
    cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', loadKgS: 0.1 }] }],
    gauges: [{ id: 'G1', node: 'J1', elevationM: 3 }],
  });
  if (!read.ok) throw new Error(read.errors.map(({ detail }) => detail).join('; '));
  return fromFile(read.file);
}

/** Its cells before any solve. */
export function trialContext(document: NetworkDocument = trialDocument(), system: 'us' | 'si' = 'us'): ListContext {
  return listContext({
    document,
    units: { system, atmosphericPressurePa: 101_325 },
    topology: [],
    outcome: null,
    result: null,
    traps: new Map(),
    pipes: new Map(),
    nodes: new Map(),
  });
}
