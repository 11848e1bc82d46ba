import type { EditBatch, EditOp } from '@riseback/network';
import type { Client } from './test-server';

/** One trap that lifts into one receiver, as small as a network can be that has something to tell. */
export const SMALL = {
  format: 'riseback-network',
  version: 1,
  name: 'Small',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    {
      id: 'T1',
      kind: 'trap',
      tag: 'TR-1',
      elevationM: 0,
      inletPressurePa: 618_000,
      loadKgS: 0.05,
      position: { x: 0, y: 0 },
    },
    { id: 'J1', kind: 'junction', elevationM: 3.048, position: { x: 100, y: 0 } },
    { id: 'R1', kind: 'receiver', elevationM: 3.048, pressurePa: 101_325, position: { x: 200, y: 0 } },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J1', lengthM: 6, size: { nps: '1', schedule: '40' } },
    { id: 'L2', from: 'J1', to: 'R1', lengthM: 30, size: { nps: '1', schedule: '40' }, lossCoefficient: 5 },
  ],
};

/** Every kind of element, and every key that a file may give, once at least. */
export const EVERY_KEY = {
  format: 'riseback-network',
  version: 1,
  name: 'Every key',
  site: { atmosphericPressurePa: 95_000, ambientTemperatureK: 288.15 },
  method: {
    staticLift: 'liquidFull',
    liftRulePaM: 9_800,
    dropCredit: 0.5,
    friction: 'friedel',
    voidFraction: 'zivi',
    coincidence: 'ownPeak',
    acceleration: false,
  },
  limits: {
    backPressureFraction: { watchFraction: 0.4, failFraction: 0.7, minimumInletGaugePa: 50_000 },
    velocity: { watchMS: 12, failMS: 25, liquidMS: 2 },
  },
  nodes: [
    {
      id: 'T1',
      kind: 'trap',
      tag: 'TR-101',
      elevationM: 1.2,
      position: { x: 20, y: 40 },
      area: 'Hall',
      note: 'Line one\nline "two"',
      inletPressurePa: 618_000,
      loadKgS: 0.05,
      loadTolerance: 0.2,
      subcoolingK: 3,
      trapType: 'invertedBucket',
      discharge: 'intermittent',
      peakFactor: 2.5,
      sizingFactor: 3,
      maximumPressurePa: 1_135_000,
      trapModel: 'M1',
      batch: 'retorts',
      service: { kind: 'modulating', control: 'varyingInlet', secondaryInletK: 300, secondaryOutletK: 330 },
    },
    { id: 'T0', kind: 'trap', elevationM: -2, inletPressurePa: 300_000, loadKgS: 0, position: { x: -20, y: 40 } },
    { id: 'J1', kind: 'junction', elevationM: 4.9, position: { x: 100, y: -0.5 } },
    { id: 'V1', kind: 'flashVessel', elevationM: 3, pressurePa: 204_700, position: { x: 160, y: 40 } },
    {
      id: 'P1',
      kind: 'pumpedInlet',
      elevationM: 0,
      flowKgS: 1,
      temperatureK: 350,
      peakFactor: 1.5,
      availablePressurePa: 400_000,
      position: { x: 100, y: 120 },
    },
    { id: 'R1', kind: 'receiver', elevationM: 2, pressurePa: 101_325, position: { x: 220, y: 40 } },
    { id: 'R2', kind: 'receiver', elevationM: 2, vented: true, position: { x: 280, y: 40 } },
  ],
  pipes: [
    {
      id: 'L1',
      tag: 'CR-1',
      from: 'T1',
      to: 'J1',
      lengthM: 12,
      size: { nps: '1', schedule: '80' },
      roughnessM: 1e-4,
      fittings: [
        { kind: 'elbow90', count: 2 },
        { kind: 'gateValve', count: 1 },
      ],
      lossCoefficient: 0.5,
      heatLossWM: 20,
      checkValve: true,
      bends: [
        { x: 40, y: 10 },
        { x: 100, y: 10 },
      ],
      route: [
        { lengthM: 4, riseM: 3.7 },
        { lengthM: 8, riseM: 0 },
      ],
      area: 'Hall',
      note: 'n',
    },
    { id: 'L0', from: 'T0', to: 'J1', lengthM: 0, insideDiameterM: 0.0243 },
    { id: 'L2', from: 'J1', to: 'V1', lengthM: 5, insideDiameterM: 0.05 },
    { id: 'L3', from: 'V1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 },
    { id: 'L4', from: 'P1', to: 'R2', lengthM: 5, insideDiameterM: 0.05 },
  ],
  trapModels: [
    {
      id: 'M1',
      name: 'Marl B15',
      orificeDiameterM: 0.0032,
      maximumDifferentialPa: 1_034_000,
      bodyPressurePa: 1_800_000,
      bodyTemperatureK: 473.15,
      maximumBackPressureFraction: 0.9,
      capacity: [
        { differentialPa: 50_000, flowKgS: 0.06 },
        { differentialPa: 100_000, flowKgS: 0.08 },
      ],
    },
  ],
  cases: [
    {
      id: 'start-up',
      name: 'Start-up',
      loadFactor: 2,
      inletPressureFactor: 0.5,
      overrides: [{ node: 'T1', loadKgS: 0.1, inletPressurePa: 500_000, orificeDiameterM: 0.004, state: 'isolated' }],
    },
    {
      id: 'design',
      name: 'Design',
      overrides: [
        { node: 'R1', pressurePa: 120_000 },
        { node: 'P1', flowKgS: 0.5 },
        { node: 'T1', state: 'failedOpen' },
      ],
    },
  ],
  gauges: [
    {
      id: 'G2',
      tag: 'PI-2',
      pipe: 'L1',
      distanceM: 3,
      elevationM: 5.5,
      waterLeg: true,
      rangeLowPa: -101_325,
      rangeHighPa: 689_500,
      accuracy: 0.01,
      resolutionPa: 1_000,
      calibratedOn: '2026-03-01',
      calibrationDueOn: '2027-03-01',
      retired: true,
    },
    { id: 'G1', node: 'J1', elevationM: 5.5 },
  ],
};

/** @returns the new network's id */
export async function makeNetwork(client: Client, siteId: string, file: object = SMALL): Promise<string> {
  const made = await client.post(`/api/sites/${siteId}/networks`, file).expect(201);
  return (made.body as { id: string }).id;
}

export function batchOf(ops: readonly EditOp[], label = 'change it'): EditBatch {
  return { batchId: crypto.randomUUID(), label, ops: [...ops] };
}

export function raise(to: number, from = 0): EditOp {
  return { op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from, to };
}

/** Sends a batch as made on a version. */
export function sendBatch(client: Client, networkId: string, version: number, batch: EditBatch) {
  return client.post(`/api/networks/${networkId}/edits`, batch).set('If-Match', `"${version}"`);
}
