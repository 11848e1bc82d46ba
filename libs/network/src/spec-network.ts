import { fromFile } from './document-file';
import type { NetworkDocument } from './network-document';
import type { NetworkFile } from './network-file';
import { readNetworkFile } from './read-network-file';

type Loose = Record<string, unknown>;

/** For specs: the smallest sound file, one trap that rises into a vented receiver, with what a spec puts in its place. */
export function smallJson(changes: Loose = {}): Loose {
  return {
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [
      { id: 'T1', kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
      { id: 'J1', kind: 'junction', elevationM: 3 },
      { id: 'R1', kind: 'receiver', elevationM: 3, vented: true },
    ],
    pipes: [pipe('L1', 'T1', 'J1', 6), pipe('L2', 'J1', 'R1', 30)],
    ...changes,
  };
}

export function pipe(id: string, from: string, to: string, lengthM = 10, more: Loose = {}): Loose {
  return { id, from, to, lengthM, insideDiameterM: 0.03, ...more };
}

export function trap(id: string, more: Loose = {}): Loose {
  return { id, kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05, ...more };
}

export function junction(id: string, elevationM = 0): Loose {
  return { id, kind: 'junction', elevationM };
}

export function vessel(id: string): Loose {
  return { id, kind: 'flashVessel', elevationM: 0, pressurePa: 200_000 };
}

export function receiver(id: string): Loose {
  return { id, kind: 'receiver', elevationM: 0, vented: true };
}

/** @throws Error with the mistakes when the file is refused */
export function fileOf(json: unknown): NetworkFile {
  const read = readNetworkFile(json);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

export function documentOf(json: unknown): NetworkDocument {
  return fromFile(fileOf(json));
}
