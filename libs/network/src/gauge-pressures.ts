import type { EditOp } from './edit-batch';
import { setNetworkOp, setOp } from './edit-ops';
import type { NetworkDocument } from './network-document';

/** Absolute pressures that people give as gauge pressures, by where they stand. Differentials and what gauges show are none. */
const GIVEN_BY_GAUGE = {
  nodes: ['inletPressurePa', 'maximumPressurePa', 'pressurePa', 'availablePressurePa'],
  trapModels: ['bodyPressurePa'],
  overrides: ['inletPressurePa', 'pressurePa'],
} as const;

/** How many values of the network are absolute pressures that were given by gauge. */
export function countGaugePressures(document: NetworkDocument): number {
  return [...gaugePressures(document)].length;
}

/**
 * Sets the atmosphere of the site, and with it every pressure that was given by gauge, so that the gauge values stay what they are. Without
 * that, absolute values stay and every gauge value changes by the difference.
 * @param atmosphericPressurePa new pressure of the atmosphere [Pa absolute]
 */
export function atmosphereKeepingGauge(document: NetworkDocument, atmosphericPressurePa: number): EditOp[] {
  const risePa = atmosphericPressurePa - document.site.atmosphericPressurePa;
  return [
    setNetworkOp(document, 'site', { ...document.site, atmosphericPressurePa }),
    ...Array.from(gaugePressures(document), ({ collection, id, key, pressurePa }) =>
      setOp(document, collection, id, key, pressurePa + risePa),
    ),
  ];
}

function* gaugePressures(document: NetworkDocument) {
  for (const collection of ['nodes', 'trapModels', 'overrides'] as const) {
    for (const [id, { value }] of document[collection]) {
      const values = new Map<string, unknown>(Object.entries(value));
      for (const key of GIVEN_BY_GAUGE[collection]) {
        const pressurePa = values.get(key);
        if (typeof pressurePa === 'number') yield { collection, id, key, pressurePa };
      }
    }
  }
}
