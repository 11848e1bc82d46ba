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
  TrapModel,
} from '@riseback/network';
import { atElement } from './element-failure';
import { modulatedInletPressurePa } from './modulating-inlet';
import type { ProblemError } from './refusal';

export interface OperatingTrap {
  readonly kind: 'trap';
  readonly node: Trap;
  readonly inletPressurePa: number;
  readonly loadKgS: number;
  readonly isolated: boolean;
  /** Of a modulating trap that follows its load: what its exchanger does in the case. */
  readonly modulation?: { readonly fullLoadPressurePa: number; readonly loadFraction: number };
  /** Of a trap that has failed open: the hole that passes live steam. */
  readonly openOrificeM?: number;
  /** Live steam that it passes on top of its load, as open-traps.ts finds it. */
  readonly liveSteamKgS?: number;
}

/** A node as it stands in one operating case. */
export type OperatingNode =
  | OperatingTrap
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
 * The nodes in a case, in the file's order. An override stands as it is; the case's factors work on what is not overridden,
 * the pressure factor on gauge pressure.
 * @throws ElementFailure where a modulating trap's steam space falls outside the steam properties
 */
export function operatingNodes(file: NetworkFile, operatingCase: FileCase): OperatingNode[] {
  const overrides = new Map(operatingCase.overrides.map((override) => [override.node, override]));
  const models = new Map(file.trapModels.map((model) => [model.id, model]));
  return file.nodes.map((node, i) => {
    try {
      return operatingNode(node, file.site.atmosphericPressurePa, operatingCase, overrides.get(node.id), models);
    } catch (error) {
      throw atElement('node', node, i, error);
    }
  });
}

/** The traps that a case has fail open and that have no hole to say how much steam they then pass. */
export function openWithoutOrifice(file: NetworkFile, operatingCase: FileCase): ProblemError[] {
  if (!operatingCase.overrides.some(({ state }) => state === 'failedOpen')) return [];
  const models = new Map(file.trapModels.map((model) => [model.id, model]));
  const traps = new Map(file.nodes.flatMap((node) => (node.kind === 'trap' ? [[node.id, node]] : [])));
  const caseIndex = file.cases.indexOf(operatingCase);
  return operatingCase.overrides.flatMap((override, i) => {
    const trap = traps.get(override.node);
    if (override.state !== 'failedOpen' || trap === undefined || openOrificeM(trap, override, models) !== undefined)
      return [];
    const detail = `Trap ${override.node} fails open in case ${operatingCase.id}, but no orifice is known: give its override or its trap model an orificeDiameterM.`;
    return [{ pointer: `/cases/${caseIndex}/overrides/${i}`, detail }];
  });
}

function operatingNode(
  node: NetworkNode,
  atmosphericPressurePa: number,
  operatingCase: FileCase,
  override: Override | undefined,
  models: ReadonlyMap<string, TrapModel>,
): OperatingNode {
  switch (node.kind) {
    case 'trap':
      return operatingTrap(node, atmosphericPressurePa, operatingCase, override, models);
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
  models: ReadonlyMap<string, TrapModel>,
): OperatingTrap {
  const isolated = override?.state === 'isolated';
  const loadKgS = override?.loadKgS ?? node.loadKgS * operatingCase.loadFactor;
  const fullLoadPressurePa =
    atmosphericPressurePa + operatingCase.inletPressureFactor * (node.inletPressurePa - atmosphericPressurePa);
  const { service } = node;
  // an isolated exchanger, or one drawn without a load, has no part load to follow
  const modulates = service.kind === 'modulating' && !isolated && node.loadKgS > 0;
  const loadFraction = loadKgS / node.loadKgS;
  const given = override?.inletPressurePa;
  const inletPressurePa =
    given === undefined && modulates
      ? modulatedInletPressurePa(service, fullLoadPressurePa, loadFraction)
      : (given ?? fullLoadPressurePa);
  const trap: OperatingTrap = { kind: 'trap', node, inletPressurePa, loadKgS: isolated ? 0 : loadKgS, isolated };
  const orificeM = override?.state === 'failedOpen' ? openOrificeM(node, override, models) : undefined;
  // most traps are neither: a plain one is not copied
  if (!modulates && orificeM === undefined) return trap;
  return {
    ...trap,
    ...(modulates ? { modulation: { fullLoadPressurePa, loadFraction } } : {}),
    ...(orificeM === undefined ? {} : { openOrificeM: orificeM }),
  };
}

function openOrificeM(trap: Trap, override: Override, models: ReadonlyMap<string, TrapModel>): number | undefined {
  return (
    override.orificeDiameterM ??
    (trap.trapModel === undefined ? undefined : models.get(trap.trapModel)?.orificeDiameterM)
  );
}
