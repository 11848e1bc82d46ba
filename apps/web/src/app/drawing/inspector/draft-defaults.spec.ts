import { describe, expect, it } from 'vitest';
import { documentOf, sampleDocument } from '../model/sample-network';
import { nodeDefaults, pipeDefaults } from './draft-defaults';

describe('what a new element is filled with', () => {
  it('takes the last of its kind, and says so', () => {
    const { values, hints } = nodeDefaults('trap', sampleDocument());
    expect(values).toEqual({ tag: 'TR-103', elevationM: 1.2192, inletPressurePa: 618_000, loadKgS: 0.05 });
    expect(hints).toEqual({ elevationM: 'As TR-102', inletPressurePa: 'As TR-102', loadKgS: 'As TR-102' });
  });

  it('gives a pipe the length and size of the last one', () => {
    const { values } = pipeDefaults(sampleDocument());
    expect(values).toEqual({ tag: 'CR-3', lengthM: 6, size: { nps: '1', schedule: '40' } });
  });

  it('fills in nothing but a tag where there is none of its kind', () => {
    expect(nodeDefaults('receiver', documentOf([]))).toEqual({ values: { tag: 'R-1' }, hints: {} });
    expect(pipeDefaults(documentOf([]))).toEqual({ values: { tag: 'CR-1' }, hints: {} });
  });
});
