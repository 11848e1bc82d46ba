import type {
  FileCase,
  FlashVessel,
  Junction,
  NetworkFile,
  NetworkNode,
  Override,
  PumpedInlet,
  Receiver,
  Trap,
} from '@riseback/network';
import { modulatedInletPressurePa } from './modulating-inlet';

/** A node as it stands in one operating case. */
export type OperatingNode =
  | {
      readonly kind: 'trap';
      readonly node: Trap;
      readonly inletPressurePa: number;
      readonly loadKgS: number;
      readonly isolated: boolean;
    }
  | { readonly kind: 'pumpedInlet'; readonly node: PumpedInlet; readonly flowKgS: number }
  | { readonly kind: 'fixedPressure'; readonly node: Receiver | FlashVessel; readonly pressurePa: number }
  | { readonly kind: 'junction'; readonly node: Junction };

/** The plain network: every node as drawn. */
export const PLAIN_CASE: FileCase = { id: '', name: '', loadFactor: 1, inletPressureFactor: 1, overrides: [] };

/** The case asked for: '' is the plain network, nothing is the first case, or the plain network if there is none. */
export function findCase(file: NetworkFile, caseId: string | undefined): FileCase | undefined {
  if (caseId === undefined) return file.cases[0] ?? PLAIN_CASE;
  if (caseId === '') return PLAIN_CASE;
  return file.cases.find(({ id }) => id === caseId);
}

/**
 * A node in a case. An override stands as it is; the case's factors work on what is not overridden,
 * the pressure factor on gauge pressure.
 */
export function operatingNode(
  node: NetworkNode,
  atmosphericPressurePa: number,
  operatingCase: FileCase,
  override: Override | undefined,
): OperatingNode {
  switch (node.kind) {
    case 'trap':
      return operatingTrap(node, atmosphericPressurePa, operatingCase, override);
    case 'pumpedInlet':
      return { kind: 'pumpedInlet', node, flowKgS: override?.flowKgS ?? node.flowKgS };
    case 'flashVessel':
      return { kind: 'fixedPressure', node, pressurePa: override?.pressurePa ?? node.pressurePa };
    case 'receiver': {
      const pressurePa = override?.pressurePa ?? node.pressurePa ?? atmosphericPressurePa;
      return { kind: 'fixedPressure', node, pressurePa };
    }
    case 'junction':
      return { kind: 'junction', node };
  }
}

function operatingTrap(
  node: Trap,
  atmosphericPressurePa: number,
  operatingCase: FileCase,
  override: Override | undefined,
): OperatingNode {
  const isolated = override?.state === 'isolated';
  const loadKgS = override?.loadKgS ?? node.loadKgS * operatingCase.loadFactor;
  const inletPressurePa = override?.inletPressurePa ?? servicePressurePa();
  return { kind: 'trap', node, inletPressurePa, loadKgS: isolated ? 0 : loadKgS, isolated };

  function servicePressurePa(): number {
    const gaugePa = node.inletPressurePa - atmosphericPressurePa;
    const fullLoadPa = atmosphericPressurePa + operatingCase.inletPressureFactor * gaugePa;
    const { service } = node;
    // an isolated exchanger, or one drawn without a load, has no part load to follow
    if (service.kind === 'constant' || isolated || node.loadKgS === 0) return fullLoadPa;
    return modulatedInletPressurePa(service, fullLoadPa, loadKgS / node.loadKgS);
  }
}
