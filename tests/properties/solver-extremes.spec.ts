import { COINCIDENCES, FRICTION_METHODS, STATIC_LIFT_BASES, TRAP_STATES, VOID_FRACTIONS } from '@riseback/network';
import { isRefusal, solveNetwork } from '@riseback/solver';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { networkFile } from '../fixtures/solver/small-networks';

/** A thousand in npm test, more in the long form. */
const IS_FULL = process.env.RISEBACK_TEST_FULL === '1';
const RUNS = IS_FULL ? { numRuns: 5000 } : { numRuns: 1000, seed: 20_260_304 };
const LONGEST_MS = 2000;
const TIMEOUT_MS = IS_FULL ? 900_000 : 60_000;

/** Ends of what a file may hold, and what lies between. */
const between = (min: number, max: number) =>
  fc.oneof(fc.constant(min), fc.constant(max), fc.double({ min, max, noNaN: true }));

const extremeNetworks = fc
  .record({
    elevationM: between(-1000, 1000),
    inletPressurePa: between(1e-3, 2.5e7),
    loadKgS: between(0, 10_000),
    subcoolingK: between(0, 300),
    receiverPa: between(1e-3, 2.5e7),
    lengthM: between(1001, 100_000),
    insideDiameterM: between(0.001, 5),
    roughnessM: between(0, 0.05),
    lossCoefficient: between(0, 100_000),
    heatLossWM: between(0, 100_000),
    method: fc.record({
      staticLift: fc.constantFrom(...STATIC_LIFT_BASES),
      dropCredit: between(0, 1),
      friction: fc.constantFrom(...FRICTION_METHODS),
      voidFraction: fc.constantFrom(...VOID_FRACTIONS),
      coincidence: fc.constantFrom(...COINCIDENCES),
      acceleration: fc.boolean(),
    }),
    peakFactor: between(1, 100),
    state: fc.constantFrom(...TRAP_STATES),
    orificeDiameterM: between(1e-6, 1),
    bands: fc.boolean(),
    ambientTemperatureK: between(213.15, 343.15),
    temperatureK: between(200, 1100),
    flowKgS: between(0, 10_000),
    loadFactor: between(0, 1000),
    inletPressureFactor: between(0, 1000),
    service: fc.constantFrom('constant', 'varyingInlet', 'varyingFlow'),
    secondaryInletK: between(200, 1100),
    secondaryOutletK: between(200, 1100),
  })
  .map((drawn) => {
    const { method, ambientTemperatureK, loadFactor, inletPressureFactor, service } = drawn;
    const { secondaryInletK, secondaryOutletK } = drawn;
    const { lengthM, insideDiameterM, roughnessM, lossCoefficient, heatLossWM } = drawn;
    const pipe = { lengthM, insideDiameterM, roughnessM, lossCoefficient, heatLossWM };
    const trap = {
      id: 'T',
      kind: 'trap',
      elevationM: drawn.elevationM,
      inletPressurePa: drawn.inletPressurePa,
      loadKgS: drawn.loadKgS,
      subcoolingK: drawn.subcoolingK,
      maximumPressurePa: drawn.inletPressurePa,
      trapType: 'thermodynamic',
      peakFactor: drawn.peakFactor,
      trapModel: 'M',
      service:
        service === 'constant'
          ? { kind: service }
          : { kind: 'modulating', control: service, secondaryInletK, secondaryOutletK },
    };
    const { state, orificeDiameterM, bands } = drawn;
    const overrides = [{ node: 'T', state, orificeDiameterM }];
    const file = networkFile({
      site: { ambientTemperatureK },
      method,
      nodes: [
        trap,
        { id: 'P', kind: 'pumpedInlet', elevationM: 0, flowKgS: drawn.flowKgS, temperatureK: drawn.temperatureK },
        { id: 'J', kind: 'junction', elevationM: 0 },
        { id: 'R', kind: 'receiver', elevationM: 0, pressurePa: drawn.receiverPa },
      ],
      pipes: [
        { id: 'L1', from: 'T', to: 'J', ...pipe },
        { id: 'L2', from: 'P', to: 'J', ...pipe },
        { id: 'L3', from: 'J', to: 'R', ...pipe },
      ],
      trapModels: [{ id: 'M', name: 'M', bodyPressurePa: 1e6, bodyTemperatureK: 400, maximumDifferentialPa: 1e6 }],
      cases: [{ id: 'c', name: 'C', loadFactor, inletPressureFactor, overrides }],
    });
    return { file, bands };
  });

describe('well-formed files with extreme numbers', { timeout: TIMEOUT_MS }, () => {
  it('are solved in finite numbers, or the element that cannot be is named; never a crash or a NaN', () => {
    fc.assert(
      fc.property(extremeNetworks, ({ file, bands }) => {
        const start = performance.now();
        const outcome = solveNetwork(file, { partial: false, bands });
        expect(performance.now() - start).toBeLessThan(LONGEST_MS);
        if (isRefusal(outcome)) {
          // a rough pipe of small bore is all that these can be refused for
          expect(outcome.problem.errors.map(({ pointer }) => pointer)).toContain('/pipes/0/roughnessM');
        } else if (outcome.converged) expect(JSON.stringify(outcome)).not.toContain('null');
        else expect(outcome.problem?.errors[0]?.pointer).toMatch(/^\/(nodes|pipes)\/\d+$/);
      }),
      RUNS,
    );
  });
});
