import {
  flashVapourLiquidGradient,
  flashVapourSteamGradient,
  flowPattern,
  type FlashingFlow,
} from '@riseback/hydraulics';
import { readNetworkFile, type NetworkFile, type Trap } from '@riseback/network';
import {
  isRefusal,
  solveNetwork,
  type GradientEvaluation,
  type SolveOptions,
  type SolveResult,
} from '@riseback/solver';
import {
  blankSaturation,
  fillSaturation,
  saturationState,
  saturationStateDirect,
  saturationTemperatureK,
  type SaturationRecord,
} from '@riseback/steam';
import ternQuay from '../fixtures/tern-quay.json' with { type: 'json' };

const PIPES = [100, 200, 500, 1000, 2000, 5000, 10_000, 20_000, 50_000] as const;
const RATIO_PIPES = 2000;
const REPEATS = 25;
/** After so many the code is as fast as it gets. */
const WARM_UP_SOLVES = 150;
/** Small plants are solved over and over in each timing, so that no size is timed cold, or too short for the clock. */
const PIPES_A_TIMING = 5000;
const MESHED_PIPES = 1000;
const GOAL_MESHES = 50;
const MESHES = [1, GOAL_MESHES, 200] as const;

/** What the solver costs, each figure as a ratio within this run, so that it means the same on any machine. */
export function* solverBench(): Generator<string> {
  yield* overPipes();
  yield* saturationRatio();
  yield* wholeSolveRatio();
  yield bandsRatio();
  yield* meshesRatio();
}

function* overPipes(): Generator<string> {
  const [first] = PIPES;
  const warm = plant(RATIO_PIPES);
  for (let i = 0; i < WARM_UP_SOLVES; i++) solve(warm);
  const times = PIPES.map((pipes) => {
    const file = plant(pipes);
    const solves = Math.max(1, Math.round(PIPES_A_TIMING / pipes));
    const many = (): void => {
      for (let i = 0; i < solves; i++) solve(file);
    };
    return leastMs(many) / solves;
  });
  const [reference = NaN] = times;
  yield 'Whole solve over pipes (time of 100 pipes = 1)';
  for (const [i, pipes] of PIPES.entries()) {
    const ratio = (times[i] ?? NaN) / reference;
    yield `  ${String(pipes).padStart(6)} pipes: ${ratio.toFixed(1).padStart(7)}, ${(ratio / (pipes / first)).toFixed(2)} per pipe`;
  }
  yield `  exponent of time over pipes: ${slopeOfLogs(PIPES, times).toFixed(2)} (goal: at most 1.1)`;
}

/** Whole states, all nine properties of both phases: into a record that is used again, as the march does, and in an object each. */
function* saturationRatio(): Generator<string> {
  const pressures = Array.from({ length: 20_000 }, (_, i) => 1e3 * 1e4 ** (i / 20_000));
  const record = blankSaturation();
  let sum = 0;
  const direct = (): void => {
    for (const pressure of pressures) sum += saturationStateDirect(pressure).liquidDensityKgM3;
  };
  const fill = (): void => {
    for (const pressure of pressures) {
      fillSaturation(record, pressure);
      sum += record.liquidDensityKgM3;
    }
  };
  const make = (): void => {
    for (const pressure of pressures) sum += saturationState(pressure).liquidDensityKgM3;
  };
  const [directMs = NaN, fillMs = NaN, makeMs = NaN] = leastTimesMs([direct, fill, make]);
  const times = (ms: number): string => `${(directMs / ms).toFixed(1)} times`;
  yield `Saturation look-up: ${times(fillMs)} as fast as the direct formulas (goal: 10); ${times(makeMs)} with an object made for each`;
  if (!(sum > 0)) throw new Error('the look-ups gave nothing');
}

/**
 * A whole solve over what it cannot do without, measured alone in the same process. Counted as such are the look-ups and friction
 * evaluations that the solve makes: at each stage of each step of each march the state of the water and the two Darcy-Weisbach
 * gradients of the flash-vapour method, the state at each node, and at each trap the state and the boiling temperature that its
 * enthalpy and its body rating ask for. The flow pattern at the end of each pipe, which is friction evaluations too, is counted only
 * in the second figure. Never counted are reading the network, ordering it, steering the steps, checks, results.
 */
function* wholeSolveRatio(): Generator<string> {
  const file = plant(RATIO_PIPES);
  const evaluations: GradientEvaluation[] = [];
  const outcome = solve(file, { onGradient: (evaluation) => evaluations.push(evaluation) });
  const nodePressuresPa = outcome.nodes.map(({ pressurePa }) => pressurePa);
  const traps = file.nodes.filter((node) => node.kind === 'trap');
  const alone = (): number => gradientsAgain(evaluations) + lookUpsAgain(nodePressuresPa, traps);
  const patterns = (): number => patternsAgain(evaluations);
  const [wholeMs = NaN, aloneMs = NaN, patternsMs = NaN] = leastTimesMs([() => solve(file), alone, patterns]);
  const perPipe = (ms: number): string => `${((1000 * ms) / RATIO_PIPES).toFixed(2)} µs a pipe`;
  yield `Whole solve of ${RATIO_PIPES} pipes: ${(wholeMs / aloneMs).toFixed(2)} times its look-ups and friction evaluations alone (goal: at most 2)`;
  yield `  with its flow patterns counted among them: ${(wholeMs / (aloneMs + patternsMs)).toFixed(2)} times`;
  yield `  ${evaluations.length} evaluations; whole ${perPipe(wholeMs)}, look-ups and friction ${perPipe(aloneMs)}, patterns ${perPipe(patternsMs)}`;
}

/** What meshes cost over a tree of as many pipes. */
function* meshesRatio(): Generator<string> {
  const tree = plant(MESHED_PIPES);
  for (const meshes of MESHES) {
    const meshed = withMeshes(plant(MESHED_PIPES - meshes), meshes);
    const [treeMs = NaN, meshedMs = NaN] = leastTimesMs([() => solve(tree), () => solve(meshed)]);
    const goal = meshes === GOAL_MESHES ? ' (goal: under 10)' : '';
    yield `${MESHED_PIPES} pipes with ${meshes} meshes: ${(meshedMs / treeMs).toFixed(1)} times the tree${goal}`;
  }
}

/** What both bands of every trap cost, in solves of the same plant. */
function bandsRatio(): string {
  const read = readNetworkFile(ternQuay);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  const many = (options: Partial<SolveOptions>) => (): void => {
    for (let i = 0; i < 20; i++) solve(read.file, options);
  };
  const [plainMs = NaN, bandsMs = NaN] = leastTimesMs([many({}), many({ bands: true })]);
  return `Both bands of every trap of the demo plant: ${((bandsMs - plainMs) / plainMs).toFixed(1)} times its solve without (goal: under 30)`;
}

/** The gradients of a solve by themselves, at the same places, in one object as the march does it. */
function gradientsAgain(evaluations: readonly GradientEvaluation[]): number {
  const flow = blankFlow();
  let sum = 0;
  for (const evaluation of evaluations) {
    placeAt(flow, evaluation);
    sum += flashVapourLiquidGradient(flow) + flashVapourSteamGradient(flow);
  }
  return sum;
}

/** The states that a solve looks up beside its marches. */
function lookUpsAgain(nodePressuresPa: readonly number[], traps: readonly Trap[]): number {
  let sum = 0;
  for (const pressurePa of nodePressuresPa) sum += saturationState(pressurePa).liquidEnthalpyJKg;
  for (const { inletPressurePa, maximumPressurePa = inletPressurePa } of traps) {
    sum += saturationState(inletPressurePa).liquidEnthalpyJKg + saturationTemperatureK(maximumPressurePa);
  }
  return sum;
}

/** A march looks at its outlet first, which is where the pipe's pattern is told. */
function patternsAgain(evaluations: readonly GradientEvaluation[]): number {
  const flow = blankFlow();
  let annular = 0;
  let before: GradientEvaluation['pipe'] | undefined;
  for (const evaluation of evaluations) {
    if (evaluation.pipe !== before) {
      placeAt(flow, evaluation);
      if (flowPattern(flow) === 'annular') annular++;
    }
    before = evaluation.pipe;
  }
  return annular;
}

type Flow = { -readonly [Key in keyof FlashingFlow]: FlashingFlow[Key] } & { readonly saturation: SaturationRecord };

function blankFlow(): Flow {
  const sizes = { insideDiameterM: NaN, roughnessM: NaN, lossCoefficientPerM: NaN };
  return { massFlowKgS: NaN, quality: NaN, saturation: blankSaturation(), ...sizes, fallSlope: NaN };
}

function placeAt(flow: Flow, { pipe, massFlowKgS, pressurePa, enthalpyJKg, riseSlope }: GradientEvaluation): void {
  fillSaturation(flow.saturation, pressurePa);
  const { liquidEnthalpyJKg, vapourEnthalpyJKg } = flow.saturation;
  flow.massFlowKgS = massFlowKgS;
  flow.quality = (enthalpyJKg - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
  flow.insideDiameterM = pipe.insideDiameterM;
  flow.roughnessM = pipe.roughnessM;
  flow.lossCoefficientPerM = pipe.lossCoefficientPerM;
  flow.fallSlope = -riseSlope;
}

function solve(file: NetworkFile, options: Partial<SolveOptions> = {}): SolveResult {
  const outcome = solveNetwork(file, { partial: false, ...options });
  if (isRefusal(outcome) || !outcome.converged) throw new Error('the bench network was not solved');
  return outcome;
}

/** Halls of 40 pipes, each a header with a trap at every junction and a riser at its end, all led to one receiver. */
function plant(pipeCount: number): NetworkFile {
  const nodes: object[] = [{ id: 'R', kind: 'receiver', elevationM: 4, pressurePa: 120_000 }];
  const pipes: object[] = [];
  for (let i = 0; i < pipeCount / 2; i++) {
    const inHall = i % 20;
    const [junction, trap] = [`J${i}`, `T${i}`];
    nodes.push({ id: junction, kind: 'junction', elevationM: 0.5 });
    nodes.push({
      id: trap,
      kind: 'trap',
      elevationM: 1,
      inletPressurePa: 5e5 + (i % 7) * 1e5,
      loadKgS: 0.01 + (i % 5) * 0.004,
      trapType: 'thermodynamic',
      trapModel: 'M1',
      maximumPressurePa: 1.2e6,
    });
    const riser = {
      to: 'R',
      lengthM: 20,
      route: [
        { lengthM: 5, riseM: 3.5 },
        { lengthM: 15, riseM: 0 },
      ],
    };
    const header = { to: `J${i - 1}`, lengthM: 8 };
    pipes.push({
      id: `H${i}`,
      from: junction,
      insideDiameterM: 0.08,
      lossCoefficient: 1,
      ...(inHall === 0 ? riser : header),
    });
    pipes.push({
      id: `B${i}`,
      from: trap,
      to: junction,
      lengthM: 3,
      size: { nps: '1', schedule: '80' },
      lossCoefficient: 2,
    });
  }
  const capacity = [
    { differentialPa: 1e5, flowKgS: 0.1 },
    { differentialPa: 1e6, flowKgS: 0.3 },
  ];
  const trapModels = [
    { id: 'M1', name: 'Model', maximumDifferentialPa: 2e6, bodyPressurePa: 2e6, bodyTemperatureK: 500, capacity },
  ];
  const read = readNetworkFile({ format: 'riseback-network', version: 1, name: 'Bench', nodes, pipes, trapModels });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

/** The same with more pipes, each from a junction of one hall to one of the next. */
function withMeshes(file: NetworkFile, meshes: number): NetworkFile {
  const junctions = file.nodes.filter(({ kind }) => kind === 'junction').map(({ id }) => id);
  const cross = Array.from({ length: meshes }, (_, i) => {
    const start = Math.floor(((i + 0.5) * junctions.length) / meshes);
    const end = (start + 20 + (i % 7)) % junctions.length;
    return { id: `X${i}`, from: junctions[start], to: junctions[end], lengthM: 25, insideDiameterM: 0.05 };
  });
  const read = readNetworkFile({ ...file, pipes: [...file.pipes, ...cross] });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function leastMs(work: () => unknown): number {
  return leastTimesMs([work])[0] ?? NaN;
}

/**
 * The least of several timings, taken in turn, in processor time with the garbage collector's: what else the machine does then
 * hardly counts.
 */
function leastTimesMs(works: readonly (() => unknown)[]): number[] {
  const least = works.map(() => Infinity);
  for (let repeat = 0; repeat < REPEATS; repeat++) {
    for (const [i, work] of works.entries()) {
      const start = process.cpuUsage();
      work();
      const { user, system } = process.cpuUsage(start);
      least[i] = Math.min(least[i] ?? NaN, (user + system) / 1000);
    }
  }
  return least;
}

/** Slope of the least-squares line through the logarithms. */
function slopeOfLogs(xs: readonly number[], ys: readonly number[]): number {
  const [lx, ly] = [xs.map(Math.log), ys.map(Math.log)];
  const mean = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
  const [mx, my] = [mean(lx), mean(ly)];
  const over = lx.reduce((sum, x, i) => sum + (x - mx) * ((ly[i] ?? NaN) - my), 0);
  return over / lx.reduce((sum, x) => sum + (x - mx) ** 2, 0);
}
