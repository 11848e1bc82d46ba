import { describe, expect, it } from 'vitest';
import { applyBatch } from './apply-batch';
import { atmosphereKeepingGauge, countGaugePressures } from './gauge-pressures';
import { documentOf, pipe, receiver, trap, vessel } from './spec-network';

const document = documentOf({
  format: 'riseback-network',
  version: 1,
  name: 'High up',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [trap('T1', { maximumPressurePa: 1_135_000, trapModel: 'M1' }), vessel('V1'), receiver('R1')],
  pipes: [pipe('L1', 'T1', 'V1'), pipe('L2', 'V1', 'R1')],
  trapModels: [{ id: 'M1', name: 'Marl', bodyPressurePa: 1_800_000, maximumDifferentialPa: 1_034_000 }],
  cases: [{ id: 'low', name: 'Low', overrides: [{ node: 'T1', inletPressurePa: 500_000 }] }],
});

describe('a change of the atmosphere that keeps gauge values', () => {
  // 14.7 psia at the sea and 12.2 psia at about 1,500 m: every absolute pressure falls by the difference, 17,325 Pa here
  const applied = applyBatch(document, atmosphereKeepingGauge(document, 84_000));
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  const after = applied.document;

  it('moves every absolute pressure by the difference, in cases and models too', () => {
    expect(after.site).toEqual({ atmosphericPressurePa: 84_000, ambientTemperatureK: 293.15 });
    expect(after.nodes.get('T1')?.value).toMatchObject({ inletPressurePa: 600_675, maximumPressurePa: 1_117_675 });
    expect(after.nodes.get('V1')?.value).toMatchObject({ pressurePa: 182_675 });
    expect(after.trapModels.get('M1')?.value).toMatchObject({ bodyPressurePa: 1_782_675 });
    expect([...after.overrides.values()].map(({ value }) => value)).toMatchObject([{ inletPressurePa: 482_675 }]);
  });

  it('leaves differentials and vented receivers alone, and counts what it moves', () => {
    expect(after.trapModels.get('M1')?.value).toMatchObject({ maximumDifferentialPa: 1_034_000 });
    expect(after.nodes.get('R1')?.value).toEqual(document.nodes.get('R1')?.value);
    expect(countGaugePressures(document)).toBe(5);
  });

  it('is taken back whole', () => {
    const undone = applyBatch(after, applied.inverse);
    expect(undone.ok && undone.document).toEqual(document);
  });

  it('is refused where a pressure would fall to nothing', () => {
    const vacuum = documentOf({
      format: 'riseback-network',
      version: 1,
      name: 'Vacuum',
      nodes: [trap('T1', { inletPressurePa: 20_000 }), receiver('R1')],
      pipes: [pipe('L1', 'T1', 'R1')],
    });
    expect(applyBatch(vacuum, atmosphereKeepingGauge(vacuum, 80_000)).ok).toBe(false);
  });
});
