import { describe, expect, it } from 'vitest';
import { found, solved, ternQuay } from '../fixtures/solver/small-networks';

const PSI_PA = 6894.757293168;
const ATMOSPHERE_PA = 101_325;
/** The independent walk is printed to 0.01 psi. */
const PRINTED_PSI = 0.005;

// Tern Quay Cannery, an invented plant: an independent walk of tests/fixtures/tern-quay.json with IF97, default methods, design
// case. psig behind each trap, then psi of static, friction and flash above the node where its walk ends.
const WALKED: readonly (readonly [
  tag: string,
  backPsig: number,
  staticPsi: number,
  frictionPsi: number,
  flashPsi: number,
])[] = [
  ['RT-1', 30.53, 11.0, 0.85, 3.69],
  ['RT-2', 30.53, 11.0, 0.85, 3.69],
  ['RT-3', 30.52, 11.0, 0.85, 3.68],
  ['RT-4', 30.52, 11.0, 0.85, 3.68],
  ['RT-5', 30.51, 11.0, 0.85, 3.66],
  ['RT-6', 30.51, 11.0, 0.85, 3.66],
  ['RT-7', 30.49, 11.0, 0.85, 3.64],
  ['RT-8', 30.49, 11.0, 0.85, 3.64],
  ['DL75-1', 30.52, 11.0, 0.85, 3.67],
  ['DL75-2', 30.5, 11.0, 0.85, 3.65],
  ['DL75-3', 30.43, 11.0, 0.85, 3.58],
  ['DL150-1', 30.51, 11.0, 0.85, 3.66],
  ['DL150-2', 30.43, 11.0, 0.85, 3.59],
  ['BL-1', 30.47, 11.0, 0.85, 3.62],
  ['BL-2', 30.43, 11.0, 0.85, 3.58],
  ['PH-1', 30.43, 11.0, 0.85, 3.58],
  ['EX-1', 30.49, 11.0, 0.85, 3.65],
  ['UH-4', 30.36, 11.0, 0.85, 3.51],
  ['CW-1', 21.33, 6.0, 0.01, 0.32],
  ['CW-2', 21.31, 6.0, 0.01, 0.31],
  ['HX-1', 21.33, 6.0, 0.01, 0.32],
  ['HX-2', 21.33, 6.0, 0.01, 0.33],
  ['DL150-3', 15.56, 0, 0, 0.56],
  ['DL150-4', 15.27, 0, 0, 0.27],
  ['DL150-5', 15.1, 0, 0, 0.1],
  ['DL150-6', 0.13, 0, 0, 0.13],
  ['HX-3', 0.07, 0, 0, 0.07],
  ['UH-1', 0.1, 0, 0, 0.1],
  ['UH-2', 0.04, 0, 0, 0.04],
  ['UH-3', 0.02, 0, 0, 0.02],
];

const file = ternQuay();
const design = solved(file, { caseId: 'design' });
const trapByTag = (tag: string) => {
  const node = file.nodes.find((candidate) => candidate.tag === tag);
  return found(design.traps, node?.id ?? '');
};

describe('Tern Quay Cannery in its design case', () => {
  it.each(WALKED)('%s stands as the independent walk has it', (tag, backPsig, staticPsi, frictionPsi, flashPsi) => {
    const trap = trapByTag(tag);
    // within 0.5 % of the rise above the end of the walk, and the print's own rounding
    const allowedPsi = 0.005 * ((trap.backPressurePa - trap.receiverPressurePa) / PSI_PA) + PRINTED_PSI;
    expect(Math.abs((trap.backPressurePa - ATMOSPHERE_PA) / PSI_PA - backPsig)).toBeLessThan(allowedPsi);
    expect(Math.abs(trap.staticPa / PSI_PA - staticPsi)).toBeLessThan(allowedPsi);
    expect(Math.abs(trap.frictionPa / PSI_PA - frictionPsi)).toBeLessThan(allowedPsi);
    expect(Math.abs(trap.flashPa / PSI_PA - flashPsi)).toBeLessThan(allowedPsi);
  });

  it('walks every trap of the plant', () => {
    expect(design.traps.length).toBe(WALKED.length);
  });

  it('lets fail what an engineer would expect to fail, and nothing else', () => {
    const failing = design.traps.flatMap(({ id, checks }) =>
      checks.filter(({ verdict }) => verdict === 'fail').map(({ code }) => `${found(file.nodes, id).tag}: ${code}`),
    );
    expect(failing.sort()).toEqual([
      'BL-2: capacity',
      'DL150-2: orificeRating',
      'PH-1: backPressureFraction',
      'UH-4: differential',
    ]);
  });

  it('names the road crossing as the governing pipe: about 44 m/s, momentum over its limit', () => {
    const crossing = found(design.pipes, 'L24');
    expect(Math.abs(crossing.mixtureVelocityMS - 44)).toBeLessThan(0.5);
    const ofCrossing = design.warnings
      .filter(({ element }) => element === 'L24')
      .map(({ code, verdict }) => `${code} ${verdict}`);
    expect(ofCrossing).toEqual(expect.arrayContaining(['velocity fail', 'momentum fail']));
    // 11 psi for its 22 ft of rise; in all what the walk has between UH-4 and DL150-3, which stand close to its two ends
    expect(Math.abs(crossing.staticPa / PSI_PA - 11)).toBeLessThan(0.01);
    expect(
      Math.abs((crossing.upstreamPressurePa - crossing.downstreamPressurePa) / PSI_PA - (30.36 - 15.56)),
    ).toBeLessThan(0.1);
  });

  it('gives the hall back about 3 psi with the crossing in 2-1/2 in', () => {
    const pipes = file.pipes.map((pipe) =>
      pipe.id === 'L24' ? { ...pipe, size: { nps: '2-1/2', schedule: '80' } } : pipe,
    );
    const wider = found(solved({ ...file, pipes }, { caseId: 'design' }).traps, 'TR1');
    const gainPsi = (found(design.traps, 'TR1').backPressurePa - wider.backPressurePa) / PSI_PA;
    expect(Math.abs(gainPsi - 3)).toBeLessThan(0.5);
  });

  it('lets about 600 lb/h of vapour leave the flash vessel', () => {
    const vessel = found(design.nodes, 'V1');
    const vapourLbH = (vessel.quality * vessel.massFlowKgS * 3600) / 0.45359237;
    expect(Math.abs(vapourLbH - 600)).toBeLessThan(10);
  });

  it('stalls its three exchangers at half load: their steam falls below the return', () => {
    const turndown = solved(file, { caseId: 'turndown' });
    const stalled = ['TE1', 'TE2', 'TE3'].map((id) => found(turndown.traps, id).differentialPa < 0);
    expect(stalled).toEqual([true, true, true]);
  });
});

describe('Tern Quay Cannery with RT-5 failed open', () => {
  // the same independent walk, with Napier’s steam through a 3/8 in orifice at 75 psig; printed in round figures
  const open = solved(file, { caseId: 'rt5open' });
  // the traps on the hall's header; RT-5 itself has its own branch's steam on top
  const HALL = WALKED.slice(0, 18).flatMap(([tag]) => (tag === 'RT-5' ? [] : [tag]));
  const idOf = (tag: string) => file.nodes.find((node) => node.tag === tag)?.id ?? '';
  const failing = (tag: string) =>
    found(open.traps, idOf(tag)).checks.flatMap(({ code, verdict }) => (verdict === 'fail' ? [code] : []));

  it('blows about 370 lb/h of live steam', () => {
    const steamKgS = found(open.traps, idOf('RT-5')).liveSteamKgS ?? NaN;
    expect(Math.abs((steamKgS * 3600) / 0.45359237 - 370)).toBeLessThan(5);
  });

  it.each(HALL)('raises %s by 6 to 7 psi', (tag) => {
    const risePsi = (found(open.traps, idOf(tag)).backPressurePa - trapByTag(tag).backPressurePa) / PSI_PA;
    expect(risePsi).toBeGreaterThan(6);
    expect(risePsi).toBeLessThan(7);
  });

  it('turns EX-1 and takes the differential of PH-1', () => {
    expect(failing('EX-1')).toContain('backPressureFraction');
    expect(failing('PH-1')).toContain('differential');
  });

  it('lets about 980 lb/h of vapour leave the flash vessel', () => {
    const vessel = found(open.nodes, 'V1');
    expect(Math.abs((vessel.quality * vessel.massFlowKgS * 3600) / 0.45359237 - 980)).toBeLessThan(15);
  });
});
