import * as z from 'zod';
import { Limits, Method, SiteConditions } from './file-settings';
import { isObject } from './json-value';

/**
 * The network file, `riseback-network` version 1: the one shape in which a network enters and leaves the program.
 * SI inside, the unit in every name; pressures are absolute except a gauge's range. Unknown keys are refused.
 * The table of required, optional and defaulted keys is in docs/network-file.md.
 *
 * Only *shape* lives here: types, ranges, ids. What makes a network unsolvable is a finding (findings.ts).
 */
export const FORMAT = 'riseback-network';
export const FORMAT_VERSION = 1;

/** A rule over several keys is checked beside other mistakes too, so that one reading names them all. */
const beside = { when: ({ value }: { value: unknown }) => isObject(value) };

/** Bounds that no plant reaches; they keep every intermediate finite. */
const pressurePa = z.number().positive().max(2.5e7);
const gaugePressurePa = z.number().min(-101_325).max(2.5e7);
const temperatureK = z.number().min(200).max(1_100);
const elevationM = z.number().min(-10_000).max(10_000);
const lengthM = z.number().min(0).max(100_000);
const flowKgS = z.number().min(0).max(10_000);
const factor = z.number().min(0).max(1_000);
const coordinate = z.number().min(-1e7).max(1e7);

export const ElementId = z
  .string()
  .regex(
    /^[A-Za-z0-9][A-Za-z0-9_.-]{0,63}$/,
    'an id starts with a letter or digit and has at most 64 of A-Z a-z 0-9 _ . -',
  );
const tag = z.string().trim().min(1).max(64);
const note = z.string().max(4_000);
const area = z.string().trim().min(1).max(80);
const calendarDate = z.iso.date();

export const TRAP_TYPES = ['invertedBucket', 'floatThermostatic', 'thermostatic', 'thermodynamic', 'orifice'] as const;
export const DISCHARGES = ['intermittent', 'continuous'] as const;
export const TRAP_STATES = ['normal', 'isolated', 'failedOpen'] as const;
/** Fittings by their Crane TP-410 L/D entry; libs/hydraulics holds the figures and fails to compile when one is missing. */
export const FITTING_KINDS = [
  'elbow90',
  'elbow90LongRadius',
  'elbow45',
  'mitre90',
  'returnBend180',
  'teeRun',
  'teeBranch',
  'gateValve',
  'globeValve',
  'angleValve',
  'ballValve',
  'plugValve',
  'butterflyValve',
  'swingCheckValve',
  'liftCheckValve',
  'entrance',
  'exit',
] as const;

/** New commercial steel, m: 0.0018 in, as the handbook tables use. */
export const DEFAULT_ROUGHNESS_M = 4.57e-5;

/** More elements than any plant has; a hostile file stops here. */
export const MAXIMUM_ELEMENTS = {
  nodes: 200_000,
  pipes: 200_000,
  trapModels: 10_000,
  cases: 200,
  overrides: 50_000,
  gauges: 50_000,
} as const;

export const Position = z.strictObject({ x: coordinate, y: coordinate });

const nodeBase = {
  id: ElementId,
  tag: tag.optional(),
  elevationM,
  position: Position.optional(),
  area: area.optional(),
  note: note.optional(),
};

export const TrapService = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('constant') }),
  z.strictObject({
    kind: z.literal('modulating'),
    control: z.enum(['varyingInlet', 'varyingFlow']),
    secondaryInletK: temperatureK,
    secondaryOutletK: temperatureK,
  }),
]);

/** A trap as stored: every default filled in, so that an edit always has a `from`. */
export const Trap = z.strictObject({
  ...nodeBase,
  kind: z.literal('trap'),
  inletPressurePa: pressurePa,
  loadKgS: flowKgS,
  loadTolerance: z.number().min(0).max(1),
  subcoolingK: z.number().min(0).max(300),
  trapType: z.enum(TRAP_TYPES).optional(),
  discharge: z.enum(DISCHARGES),
  peakFactor: z.number().min(1).max(100),
  sizingFactor: z.number().min(1).max(100),
  maximumPressurePa: pressurePa.optional(),
  trapModel: ElementId.optional(),
  batch: z.string().trim().min(1).max(64).optional(),
  service: TrapService,
});
export type Trap = z.infer<typeof Trap>;

type TrapDefaults = 'loadTolerance' | 'subcoolingK' | 'discharge' | 'peakFactor' | 'sizingFactor' | 'service';
type TrapInFile = Omit<Trap, TrapDefaults> & { [key in TrapDefaults]?: Trap[key] | undefined };

const { shape: trapShape } = Trap;
/** A trap as a file may give it: what is left out takes the default of its type. */
export const FileTrap = z
  .strictObject({
    ...trapShape,
    loadTolerance: trapShape.loadTolerance.optional(),
    subcoolingK: trapShape.subcoolingK.optional(),
    discharge: trapShape.discharge.optional(),
    peakFactor: trapShape.peakFactor.optional(),
    sizingFactor: trapShape.sizingFactor.optional(),
    service: trapShape.service.optional(),
  })
  .refine((trap) => trap.trapType !== 'orifice' || trap.sizingFactor !== undefined, {
    ...beside,
    path: ['sizingFactor'],
    error: 'An orifice has no usual sizing factor, so give one',
  });

/** Usual discharge, peak and sizing factors by trap type (common practice); see docs/network-file.md. */
export function withTrapDefaults(trap: TrapInFile): Trap {
  const discharge =
    trap.discharge ??
    (trap.trapType === 'invertedBucket' || trap.trapType === 'thermodynamic' ? 'intermittent' : 'continuous');
  return {
    ...trap,
    loadTolerance: trap.loadTolerance ?? 0.1,
    subcoolingK: trap.subcoolingK ?? 0,
    discharge,
    peakFactor: trap.peakFactor ?? (discharge === 'intermittent' ? 2 : 1),
    sizingFactor: trap.sizingFactor ?? (trap.trapType === 'floatThermostatic' ? 2 : 3),
    service: trap.service ?? { kind: 'constant' },
  };
}

export const Junction = z.strictObject({ ...nodeBase, kind: z.literal('junction') });
export const FlashVessel = z.strictObject({ ...nodeBase, kind: z.literal('flashVessel'), pressurePa });
export const PumpedInlet = z.strictObject({
  ...nodeBase,
  kind: z.literal('pumpedInlet'),
  flowKgS,
  temperatureK,
  peakFactor: z.number().min(1).max(100).default(1),
  availablePressurePa: pressurePa.optional(),
});
export const Receiver = z
  .strictObject({
    ...nodeBase,
    kind: z.literal('receiver'),
    pressurePa: pressurePa.optional(),
    vented: z.literal(true).optional(),
  })
  .refine((receiver) => (receiver.pressurePa === undefined) !== (receiver.vented === undefined), {
    ...beside,
    error: 'A receiver has either pressurePa or "vented": true',
  });

/** A node as stored, defaults filled in. */
export const NetworkNode = z.discriminatedUnion('kind', [Trap, Junction, FlashVessel, PumpedInlet, Receiver]);
export type NetworkNode = z.infer<typeof NetworkNode>;
export type NodeKind = NetworkNode['kind'];
export type Receiver = z.infer<typeof Receiver>;
export type PumpedInlet = z.infer<typeof PumpedInlet>;
export type FlashVessel = z.infer<typeof FlashVessel>;
export type Junction = z.infer<typeof Junction>;

export const FileNode = z
  .discriminatedUnion('kind', [FileTrap, Junction, FlashVessel, PumpedInlet, Receiver])
  .transform((node): z.input<typeof NetworkNode> => (node.kind === 'trap' ? withTrapDefaults(node) : node))
  // so that what comes out has a schema too, for the description of the API
  .pipe(NetworkNode);

export const PipeSize = z.strictObject({ nps: z.string().min(1).max(16), schedule: z.string().min(1).max(32) });
export const Fitting = z.strictObject({ kind: z.enum(FITTING_KINDS), count: z.number().int().min(1).max(1_000) });
export const RoutePiece = z.strictObject({ lengthM, riseM: z.number().min(-10_000).max(10_000) });

/** A pipe; the flow is counted from `from` to `to`. */
export const PipeRun = z
  .strictObject({
    id: ElementId,
    tag: tag.optional(),
    from: ElementId,
    to: ElementId,
    lengthM,
    size: PipeSize.optional(),
    insideDiameterM: z.number().min(0.001).max(5).optional(),
    roughnessM: z.number().min(0).max(0.05).default(DEFAULT_ROUGHNESS_M),
    fittings: z.array(Fitting).max(100).default([]),
    lossCoefficient: z.number().min(0).max(100_000).default(0),
    heatLossWM: z.number().min(0).max(100_000).default(0),
    checkValve: z.boolean().default(false),
    bends: z.array(Position).max(200).optional(),
    route: z.array(RoutePiece).min(1).max(200).optional(),
    area: area.optional(),
    note: note.optional(),
  })
  .refine((pipe) => (pipe.size === undefined) !== (pipe.insideDiameterM === undefined), {
    ...beside,
    error: 'A pipe has either a size or insideDiameterM',
  });
export type PipeRun = z.infer<typeof PipeRun>;

export const CapacityPoint = z.strictObject({
  differentialPa: z.number().positive().max(2.5e7),
  flowKgS: z.number().positive().max(10_000),
});
export type CapacityPoint = z.infer<typeof CapacityPoint>;
/** A trap model as a file gives it. */
export const FileTrapModel = z.strictObject({
  id: ElementId,
  name: z.string().trim().min(1).max(120),
  orificeDiameterM: z.number().positive().max(1).optional(),
  maximumDifferentialPa: z.number().positive().max(2.5e7).optional(),
  bodyPressurePa: pressurePa.optional(),
  bodyTemperatureK: temperatureK.optional(),
  maximumBackPressureFraction: z.number().positive().max(1).optional(),
  capacity: z
    .array(CapacityPoint)
    .max(200)
    .refine(
      (points) => points.every((point, i) => i === 0 || point.differentialPa > (points[i - 1]?.differentialPa ?? 0)),
      {
        error: 'Capacity points stand in order of rising differential',
      },
    )
    .optional(),
});
export type FileTrapModel = z.infer<typeof FileTrapModel>;

/**
 * The network's own copy of a trap model. A copy from the site's library says which version it is of; a file never does, since a
 * library belongs to one site of one installation (docs/decisions/0090-library-copies.md).
 */
export const TrapModel = z
  .strictObject({
    ...FileTrapModel.shape,
    libraryId: z.uuid().optional(),
    libraryVersion: z.number().int().min(1).max(1e9).optional(),
  })
  .refine((model) => (model.libraryId === undefined) === (model.libraryVersion === undefined), {
    ...beside,
    path: ['libraryVersion'],
    error: 'A copy of a library model says both which model and which version',
  });
export type TrapModel = z.infer<typeof TrapModel>;

const overrideShape = {
  node: ElementId,
  loadKgS: flowKgS.optional(),
  inletPressurePa: pressurePa.optional(),
  pressurePa: pressurePa.optional(),
  flowKgS: flowKgS.optional(),
  orificeDiameterM: z.number().positive().max(1).optional(),
  state: z.enum(TRAP_STATES).optional(),
};
export const Override = z.strictObject(overrideShape);
export type Override = z.infer<typeof Override>;

const caseShape = {
  id: ElementId,
  name: z.string().trim().min(1).max(80),
  loadFactor: factor.default(1),
  inletPressureFactor: factor.default(1),
};
/** An operating case as stored: its overrides stand beside it. */
export const OperatingCase = z.strictObject(caseShape);
export type OperatingCase = z.infer<typeof OperatingCase>;
export const FileCase = z.strictObject({
  ...caseShape,
  overrides: z.array(Override).max(MAXIMUM_ELEMENTS.overrides).default([]),
});
export type FileCase = z.infer<typeof FileCase>;

export const Gauge = z
  .strictObject({
    id: ElementId,
    tag: tag.optional(),
    node: ElementId.optional(),
    pipe: ElementId.optional(),
    distanceM: lengthM.optional(),
    elevationM,
    waterLeg: z.boolean().default(false),
    rangeLowPa: gaugePressurePa.optional(),
    rangeHighPa: gaugePressurePa.optional(),
    accuracy: z.number().min(0).max(1).optional(),
    resolutionPa: z.number().min(0).max(2.5e7).optional(),
    calibratedOn: calendarDate.optional(),
    calibrationDueOn: calendarDate.optional(),
    retired: z.boolean().default(false),
  })
  .refine((gauge) => (gauge.node === undefined) !== (gauge.pipe === undefined), {
    ...beside,
    error: 'A gauge stands either at a node or on a pipe',
  })
  .refine((gauge) => (gauge.pipe === undefined) === (gauge.distanceM === undefined), {
    ...beside,
    path: ['distanceM'],
    error: 'A gauge on a pipe says how far from the pipe’s start it stands, and only such a gauge does',
  })
  .refine(
    (gauge) =>
      gauge.rangeLowPa === undefined || gauge.rangeHighPa === undefined || gauge.rangeHighPa > gauge.rangeLowPa,
    {
      path: ['rangeHighPa'],
      error: 'A gauge’s range ends above its start',
    },
  );
export type Gauge = z.infer<typeof Gauge>;

export type Position = z.infer<typeof Position>;
export type Fitting = z.infer<typeof Fitting>;
export type FittingKind = (typeof FITTING_KINDS)[number];
export type TrapType = (typeof TRAP_TYPES)[number];
export type RoutePiece = z.infer<typeof RoutePiece>;
export type PipeSize = z.infer<typeof PipeSize>;

/** The whole file, defaults filled in on parsing. References and unique ids are checked by `readNetworkFile`. */
export const NetworkFileShape = z.strictObject({
  format: z.literal(FORMAT),
  version: z.literal(FORMAT_VERSION),
  name: z.string().trim().min(1).max(120),
  site: SiteConditions.prefault({}),
  method: Method.prefault({}),
  limits: Limits.default({}),
  nodes: z.array(FileNode).max(MAXIMUM_ELEMENTS.nodes).default([]),
  pipes: z.array(PipeRun).max(MAXIMUM_ELEMENTS.pipes).default([]),
  trapModels: z.array(FileTrapModel).max(MAXIMUM_ELEMENTS.trapModels).default([]),
  cases: z.array(FileCase).max(MAXIMUM_ELEMENTS.cases).default([]),
  gauges: z.array(Gauge).max(MAXIMUM_ELEMENTS.gauges).default([]),
});
export type NetworkFile = z.infer<typeof NetworkFileShape>;
