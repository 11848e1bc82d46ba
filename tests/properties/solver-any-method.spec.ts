import { COINCIDENCES, FRICTION_METHODS, STATIC_LIFT_BASES, TRAP_STATES, VOID_FRACTIONS } from '@riseback/network';
import { isRefusal, solveNetwork, type SolveResult } from '@riseback/solver';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { networkFile } from '../fixtures/solver/small-networks';

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** Even over the powers of ten. */
const sized = (min: number, max: number) => number(Math.log(min), Math.log(max)).map(Math.exp);

const pipe = fc.record({
  riseM: fc.oneof(fc.constant(0), number(-3, 30), number(-0.3, 0.3)),
  stretch: sized(1.01, 300),
  insideDiameterM: sized(0.004, 0.6),
  lossCoefficient: fc.oneof(fc.constant(0), sized(0.1, 200)),
  heatLossWM: fc.oneof(fc.constant(0), sized(1, 20_000)),
});
const trap = fc.record({
  inletPressurePa: sized(3e4, 5e6),
  loadKgS: fc.oneof(fc.constant(0), sized(1e-5, 20)),
  subcoolingK: fc.oneof(fc.constant(0), number(0, 60)),
  peakFactor: number(1, 8),
  discharge: fc.constantFrom('intermittent', 'continuous'),
  state: fc.constantFrom(...TRAP_STATES),
  orificeDiameterM: sized(5e-4, 0.03),
  pipe,
});

/** Three traps, a pump and a line, from what drips to what chokes, by any method. */
const networks = fc
  .record({
    traps: fc.array(trap, { minLength: 1, maxLength: 3 }),
    main: pipe,
    receiverPa: sized(2e4, 1e6),
    pumped: fc.option(fc.record({ flowKgS: sized(1e-3, 20), temperatureK: number(280, 370), pipe }), {
      nil: undefined,
    }),
    method: fc.record({
      staticLift: fc.constantFrom(...STATIC_LIFT_BASES),
      dropCredit: fc.constantFrom(0, 0.5, 1),
      friction: fc.constantFrom(...FRICTION_METHODS),
      voidFraction: fc.constantFrom(...VOID_FRACTIONS),
      coincidence: fc.constantFrom(...COINCIDENCES),
      acceleration: fc.boolean(),
    }),
  })
  .map(({ traps, main, receiverPa, pumped, method }) => {
    const draining = ({ riseM, stretch, ...rest }: typeof main, id: string, from: string, to: string) => ({
      id,
      from,
      to,
      lengthM: (Math.abs(riseM) + 0.1) * stretch,
      ...rest,
    });
    return networkFile({
      method,
      nodes: [
        ...traps.map(({ pipe: { riseM }, inletPressurePa, loadKgS, subcoolingK, peakFactor, discharge }, i) => {
          const own = { inletPressurePa, loadKgS, subcoolingK, peakFactor, discharge };
          return { id: `T${i}`, kind: 'trap', elevationM: -riseM, ...own };
        }),
        ...(pumped
          ? [
              {
                id: 'P',
                kind: 'pumpedInlet',
                elevationM: -pumped.pipe.riseM,
                flowKgS: pumped.flowKgS,
                temperatureK: pumped.temperatureK,
              },
            ]
          : []),
        { id: 'J', kind: 'junction', elevationM: 0 },
        { id: 'R', kind: 'receiver', elevationM: main.riseM, pressurePa: receiverPa },
      ],
      pipes: [
        ...traps.map((drawn, i) => draining(drawn.pipe, `L${i}`, `T${i}`, 'J')),
        ...(pumped ? [draining(pumped.pipe, 'LP', 'P', 'J')] : []),
        draining(main, 'L', 'J', 'R'),
      ],
      cases: [
        {
          id: 'c',
          name: 'C',
          overrides: traps.map(({ state, orificeDiameterM }, i) => ({ node: `T${i}`, state, orificeDiameterM })),
        },
      ],
    });
  });

function expectSound(result: SolveResult): void {
  expect(JSON.stringify(result)).not.toContain('null');
  for (const { backPressurePa, receiverPressurePa, staticPa, frictionPa, flashPa, spread } of result.traps) {
    expect(Math.abs(receiverPressurePa + staticPa + frictionPa + flashPa - backPressurePa)).toBeLessThan(0.01);
    expect(frictionPa).toBeGreaterThanOrEqual(0);
    expect(spread?.lowPa).toBeLessThanOrEqual(backPressurePa);
    expect(spread?.highPa).toBeGreaterThanOrEqual(backPressurePa);
  }
  for (const pipe of result.pipes) {
    const sumPa = pipe.staticPa + pipe.frictionPa + pipe.flashPa;
    expect(Math.abs(pipe.downstreamPressurePa + sumPa - pipe.upstreamPressurePa)).toBeLessThan(0.01);
    expect(pipe.frictionPa).toBeGreaterThanOrEqual(0);
    if (pipe.choked) expect(pipe.outletPressurePa).toBeGreaterThan(pipe.downstreamPressurePa);
  }
}

describe('any network by any method', () => {
  it('is solved with sound sums and bands around each trap, or refused at a place; in no time', () => {
    let solved = 0;
    fc.assert(
      fc.property(networks, (file) => {
        const start = process.cpuUsage().user;
        const outcome = solveNetwork(file, { partial: false, bands: true });
        expect((process.cpuUsage().user - start) / 1e6).toBeLessThan(2);
        if (isRefusal(outcome)) throw new Error(outcome.problem.detail);
        if (!outcome.converged) {
          expect(outcome.problem?.errors[0]?.pointer).toMatch(/^\/(nodes|pipes)\/\d+$/);
          return;
        }
        solved++;
        expectSound(outcome);
      }),
      { numRuns: 400, seed: 20_260_305 },
    );
    // most are: a refusal is for what no line could carry
    expect(solved).toBeGreaterThan(200);
  });
});
