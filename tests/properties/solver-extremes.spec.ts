import { isRefusal, solveNetwork } from '@riseback/solver';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { networkFile } from '../fixtures/solver/small-networks';

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
    staticLift: fc.constantFrom('rule', 'liquidFull'),
    dropCredit: between(0, 1),
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
    const { staticLift, dropCredit, ambientTemperatureK, loadFactor, inletPressureFactor, service } = drawn;
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
      trapModel: 'M',
      service:
        service === 'constant'
          ? { kind: service }
          : { kind: 'modulating', control: service, secondaryInletK, secondaryOutletK },
    };
    return networkFile({
      site: { ambientTemperatureK },
      method: { staticLift, dropCredit },
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
      cases: [{ id: 'c', name: 'C', loadFactor, inletPressureFactor }],
    });
  });

describe('well-formed files with extreme numbers', () => {
  it('are solved in finite numbers, or the element that cannot be is named; never a crash or a NaN', () => {
    fc.assert(
      fc.property(extremeNetworks, (file) => {
        const outcome = solveNetwork(file, { partial: false });
        if (isRefusal(outcome)) {
          // a rough pipe of small bore is all that these can be refused for
          expect(outcome.problem.errors.map(({ pointer }) => pointer)).toContain('/pipes/0/roughnessM');
        } else if (outcome.converged) expect(JSON.stringify(outcome)).not.toContain('null');
        else expect(outcome.problem?.errors[0]?.pointer).toMatch(/^\/(nodes|pipes)\/\d+$/);
      }),
      { numRuns: 1000, seed: 20_260_304 },
    );
  });
});
