import type * as z from 'zod';
import { Method, SiteConditions } from './file-settings';
import {
  CapacityPoint,
  FileCase,
  FileTrap,
  FileTrapModel,
  Fitting,
  FlashVessel,
  Gauge,
  Junction,
  NetworkFileShape,
  Override,
  PipeRun,
  PipeSize,
  Position,
  PumpedInlet,
  Receiver,
  RoutePiece,
  Trap,
} from './network-file';

/** Whether a file must give a key, may leave it out for good, or gets a default in its place. */
export type KeyPresence = 'required' | 'optional' | 'defaulted';

export interface ElementKey {
  readonly key: string;
  readonly presence: KeyPresence;
  /** The default where it is one value; a trap's defaults hang on its type instead. */
  readonly default?: unknown;
}

/** What the network file is made of; docs/network-file.md has a table for each. */
export const FILE_PARTS = {
  network: NetworkFileShape,
  site: SiteConditions,
  method: Method,
  trap: FileTrap,
  junction: Junction,
  flashVessel: FlashVessel,
  pumpedInlet: PumpedInlet,
  receiver: Receiver,
  position: Position,
  pipe: PipeRun,
  size: PipeSize,
  fitting: Fitting,
  routePiece: RoutePiece,
  trapModel: FileTrapModel,
  capacityPoint: CapacityPoint,
  case: FileCase,
  override: Override,
  gauge: Gauge,
} as const;
export type FilePart = keyof typeof FILE_PARTS;

/** The keys of a part of the file in their order, read off its schema: one table for editors, documentation and tests. */
export function keysOf(part: FilePart): ElementKey[] {
  const shape: Readonly<Record<string, z.ZodType>> = FILE_PARTS[part].shape;
  return Object.entries(shape).map(([key, schema]) => {
    const absent = schema.safeParse(undefined);
    if (!absent.success) return { key, presence: 'required' };
    if (absent.data !== undefined) return { key, presence: 'defaulted', default: absent.data };
    return { key, presence: part === 'trap' && isTrapDefault(key) ? 'defaulted' : 'optional' };
  });
}

/** A key that a file may leave out of a trap but that every stored trap has. */
function isTrapDefault(key: string): boolean {
  const stored: Readonly<Record<string, z.ZodType>> = Trap.shape;
  return stored[key]?.safeParse(undefined).success === false;
}
