import { blankSaturation, fillSaturation } from '@riseback/steam';
import { thermodynamicQuality } from './fluid-state';
import type { NetworkState } from './network-state';

/** How what is mixed at a node boils at its pressure; by node of the tree, vessel outlets included, untouched where nothing is reached. */
export interface NodeQualities {
  /** x, not held within 0 and 1. */
  readonly quality: Float64Array;
  readonly boilingK: Float64Array;
}

/** Two figures of each node's state: all nine kept for every node would be half of what a large network holds in memory. */
export function nodeQualities({ tree, flows, walk }: NetworkState): NodeQualities {
  const quality = new Float64Array(tree.nodeCount);
  const boilingK = new Float64Array(tree.nodeCount);
  const saturation = blankSaturation();
  for (const index of tree.downstreamFirst) {
    fillSaturation(saturation, walk.pressurePa[index] as number);
    quality[index] = thermodynamicQuality(saturation, flows.enthalpyJKg[index] as number);
    boilingK[index] = saturation.temperatureK;
  }
  return { quality, boilingK };
}
