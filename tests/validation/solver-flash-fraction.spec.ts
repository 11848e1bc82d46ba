import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import { found, networkFile, solved } from '../fixtures/solver/small-networks';

const BAR_PA = 1e5;
const PSI_PA = 6894.757293168;

function rowsOf(fileName: string): Record<string, string>[] {
  const text = readFileSync(new URL(`../fixtures/solver/${fileName}`, import.meta.url), 'utf8');
  return parse(text, { columns: true, comment: '#', skip_empty_lines: true });
}

/** Flash quality where condensate of a trap comes into a receiver: nothing is lost on a level way between them. */
function flashQuality(inletPressurePa: number, receiverPressurePa: number, subcoolingK = 0): number {
  const file = networkFile({
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa, loadKgS: 0.01, subcoolingK },
      { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: receiverPressurePa },
    ],
    pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 1, insideDiameterM: 0.1 }],
  });
  return found(solved(file).nodes, 'R1').quality;
}

// Independent isenthalpic flashes with IF97 (Debian's python3-iapws); the fixture's head names them. A fraction below 0 there
// means that nothing flashes.
describe('flash fraction against independent IF97 figures', () => {
  it.each(
    rowsOf('flash-fraction.csv').map(
      (row) => [row['p1_bar_abs'], row['p2_bar_abs'], row['subcooling_K'], row] as const,
    ),
  )('%s bar to %s bar, %s K subcooled', (_p1, _p2, _subcooling, row) => {
    const figure = (column: string): number => Number(row[column]);
    const quality = flashQuality(figure('p1_bar_abs') * BAR_PA, figure('p2_bar_abs') * BAR_PA, figure('subcooling_K'));
    expect(Math.abs(quality - Math.max(0, figure('flash_fraction')))).toBeLessThan(1e-6);
  });
});

/** Printed figures further off than 0.25 points, rounded or read from a chart in print: upstream and downstream psig, printed %. */
const PRINTED_OFF = [
  { unit: 'psig', upstream: '350', downstream: '2', printed: '23.3', offBy: 0.26 },
  { unit: 'psig', upstream: '400', downstream: '0', printed: '25.3', offBy: 0.27 },
];

// Published percentages (the source stands in each row), printed to 0.1 % from tables of their own: within 0.25 points.
describe('flash steam against published percentages', () => {
  it.each(
    rowsOf('flash-published.csv').map(
      (row) => [row['p_upstream_gauge'], row['p_downstream_gauge'], row['unit'], row] as const,
    ),
  )('%s to %s %s', (upstream, downstream, unit, row) => {
    const [zeroPa, unitPa] = unit === 'psig' ? [14.696 * PSI_PA, PSI_PA] : [1.01325 * BAR_PA, BAR_PA];
    const percent = 100 * flashQuality(zeroPa + Number(upstream) * unitPa, zeroPa + Number(downstream) * unitPa);
    const off = Math.abs(percent - Number(row['published_flash_pct']));
    const known = PRINTED_OFF.find(
      (entry) => entry.unit === unit && entry.upstream === upstream && entry.downstream === downstream,
    );
    if (known === undefined) expect(off).toBeLessThan(0.25);
    else expect([row['published_flash_pct'], off > 0.25 && off < known.offBy]).toEqual([known.printed, true]);
  });

  it('has one more misprint on its list: 250 to 30 psig was printed 17.7 %, and is 14.9', () => {
    // the same table prints 12.8 % for 200 and 16.7 % for 300 to 30 psig, which bracket 14.9 and not 17.7
    const percent = 100 * flashQuality((250 + 14.696) * PSI_PA, (30 + 14.696) * PSI_PA);
    expect(Math.abs(percent - 14.9)).toBeLessThan(0.05);
  });
});
