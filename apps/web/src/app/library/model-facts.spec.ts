import { describe, expect, it } from 'vitest';
import { modelDifferences, ratingRows, type ModelContent } from './model-facts';

const SI = { system: 'si', atmosphericPressurePa: 100_000 } as const;
const MARL: ModelContent = {
  name: 'Marl B15',
  trapType: 'invertedBucket',
  orificeDiameterM: 0.0032,
  bodyPressurePa: 1_800_000,
  capacity: [
    { differentialPa: 50_000, flowKgS: 0.05 },
    { differentialPa: 100_000, flowKgS: 0.075 },
  ],
};

describe('modelDifferences', () => {
  it('of the same are none', () => {
    expect(modelDifferences(MARL, { ...MARL }, SI)).toEqual([]);
  });

  it('names each rating, and each point of the capacity that moved, came or went', () => {
    const after: ModelContent = {
      name: 'Marl B15 wide',
      trapType: 'invertedBucket',
      orificeDiameterM: 0.004,
      bodyPressurePa: 1_800_000,
      maximumBackPressureFraction: 0.9,
      capacity: [
        { differentialPa: 50_000, flowKgS: 0.06 },
        { differentialPa: 200_000, flowKgS: 0.1 },
      ],
    };
    expect(modelDifferences(MARL, after, SI).map(({ word, before, after: now }) => [word, before, now])).toEqual([
      ['Name', 'Marl B15', 'Marl B15 wide'],
      ['Orifice', '3.2 mm', '4 mm'],
      ['Largest back-pressure fraction', 'not given', '90 %'],
      ['Capacity at 50.0 kPa', '180 kg/h', '216 kg/h'],
      ['Capacity at 100.0 kPa', '270 kg/h', 'not given'],
      ['Capacity at 200.0 kPa', 'not given', '360 kg/h'],
    ]);
  });

  it('tells values apart that print alike', () => {
    const [only] = modelDifferences(MARL, { ...MARL, orificeDiameterM: 0.0032001 }, SI);
    expect(only).toEqual({ word: 'Orifice', before: '3.200000 mm', after: '3.200100 mm' });
  });

  it('says that a model was retired', () => {
    expect(modelDifferences(MARL, { ...MARL, retired: true }, SI)).toEqual([
      { word: 'In the library', before: 'in use', after: 'retired' },
    ]);
  });
});

it('ratingRows gives what is known', () => {
  expect(ratingRows(MARL, SI)).toEqual([
    { word: 'Orifice', value: '3.2 mm' },
    { word: 'Body pressure', value: '1,700.0 kPa g' },
  ]);
});
