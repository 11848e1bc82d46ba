import type { PipeResult, TrapResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { pipeRows, trapNotes, trapRows } from './result-rows';

const SI = { system: 'si', atmosphericPressurePa: 100_000 } as const;
const pipe: PipeResult = {
  id: 'L1',
  massFlowKgS: 1,
  upstreamPressurePa: 300_000,
  downstreamPressurePa: 150_000,
  staticPa: 0,
  frictionPa: 50_000,
  flashPa: 100_000,
  upstreamQuality: 0.01,
  downstreamQuality: 0.05,
  liquidVelocityMS: 1,
  mixtureVelocityMS: 80,
};
const trap: TrapResult = {
  id: 'T1',
  backPressurePa: 200_000,
  receiverPressurePa: 100_000,
  staticPa: 100_000,
  frictionPa: 0,
  flashPa: 0,
  differentialPa: 400_000,
  handCheck: { staticPa: 100_000, backPressurePa: 200_000 },
  walk: ['L1'],
  checks: [],
  notChecked: [],
};

describe('pipeRows', () => {
  it('says pattern and choking in words, and nothing of either where there is none', () => {
    const choked = pipeRows({ ...pipe, choked: true, outletPressurePa: 180_000, flowPattern: 'dispersedBubble' }, SI);
    expect(choked).toContainEqual({ name: 'Choked: its outlet stands at', value: '80.0 kPa g' });
    expect(choked).toContainEqual({ name: 'Flow pattern at its end', value: 'Dispersed bubbles' });
    expect(pipeRows(pipe, SI)).toHaveLength(choked.length - 2);
  });
});

describe('trapRows', () => {
  it('adds the bands where they are computed', () => {
    expect(trapRows(trap, 'VR-1', SI)).toHaveLength(5);
    const banded = trapRows({ ...trap, credible: { lowPa: 190_000, highPa: 260_000 } }, 'VR-1', SI);
    expect(banded.at(-1)).toEqual({ name: 'Other methods', value: 'Credible from 90.0 to 160.0 kPa g.' });
  });
});

describe('trapNotes', () => {
  it('tells a peak’s figures from an average’s, and how much steam an open trap blows', () => {
    expect(trapNotes({ ...trap, basis: 'average' }, SI)).toEqual([]);
    expect(trapNotes({ ...trap, basis: 'ownPeak' }, SI)[0]).toContain('its own peak');
    expect(trapNotes({ ...trap, liveSteamKgS: 0.05 }, SI)[0]).toContain('180 kg/h of live steam');
  });
});
