import { readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { placedMistakes } from './network-file-mistakes';

function mistakes(file: unknown) {
  const read = readNetworkFile(file);
  return read.ok ? [] : placedMistakes(read.errors, file);
}

describe('mistakes of a network file', () => {
  const file = { format: 'riseback-network', version: 1, name: 'A' };

  it('stand where a person would look', () => {
    const trap = { id: 'T1', kind: 'trap', tag: 'TR-104', elevationM: 0, inletPressurePa: 4e5, loadKgS: -1 };
    expect(mistakes({ ...file, nodes: [trap] })).toMatchObject([{ place: 'Trap 1 (TR-104), loadKgS' }]);
    expect(mistakes({ ...file, gauges: [{ id: 'G1', node: 'X', elevationM: 0 }] })).toMatchObject([
      { place: 'Gauge 1 (G1), node' },
    ]);
    expect(mistakes({ ...file, site: { ambientTemperatureK: 'warm' } })).toMatchObject([
      { place: 'site, ambientTemperatureK' },
    ]);
    expect(mistakes({ ...file, nodes: [{ kind: 'tank' }] })[0]?.place).toMatch(/^Node 1/);
  });

  it('say of a whole file that it is none', () => {
    expect(mistakes([])[0]).toMatchObject({ place: '' });
  });
});
