import * as z from 'zod';
import { Problem } from './problem';

export const Verdict = z.enum(['pass', 'watch', 'fail']);
export type Verdict = z.infer<typeof Verdict>;

/** The kinds of number that a finding's text may carry; the names are those of libs/units. */
export const FindingQuantity = z.enum([
  'pressure',
  'pressureDifference',
  'length',
  'massFlow',
  'velocity',
  'temperature',
  'temperatureDifference',
  'pressureGradient',
  'momentumFlux',
  'fraction',
  'factor',
]);

/** A sentence as words and SI numbers, to be shown in the person's units. */
export const FindingText = z.array(z.union([z.string(), z.object({ quantity: FindingQuantity, si: z.number() })]));
export type FindingText = z.infer<typeof FindingText>;

const words = { message: z.string(), text: FindingText, remedy: FindingText.optional() };

export const TrapCheck = z.object({
  ...words,
  code: z.string(),
  verdict: Verdict,
  value: z.number().optional(),
  limit: z.number().optional(),
});
export type TrapCheck = z.infer<typeof TrapCheck>;

/** Patterns of level runs, of rises, and of a single phase. */
export const FlowPattern = z.enum([
  'liquid',
  'vapour',
  'stratifiedSmooth',
  'stratifiedWavy',
  'intermittent',
  'annular',
  'dispersedBubble',
  'bubbly',
  'slug',
  'churn',
]);
export type FlowPattern = z.infer<typeof FlowPattern>;

export const NodeResult = z.object({
  id: z.string(),
  pressurePa: z.number(),
  temperatureK: z.number(),
  enthalpyJKg: z.number(),
  quality: z.number(),
  massFlowKgS: z.number(),
});
export type NodeResult = z.infer<typeof NodeResult>;

export const PipeResult = z.object({
  id: z.string(),
  massFlowKgS: z.number(),
  upstreamPressurePa: z.number(),
  downstreamPressurePa: z.number(),
  staticPa: z.number(),
  frictionPa: z.number(),
  flashPa: z.number(),
  upstreamQuality: z.number(),
  downstreamQuality: z.number(),
  liquidVelocityMS: z.number(),
  mixtureVelocityMS: z.number(),
  flowPattern: FlowPattern.optional(),
  choked: z.boolean().optional(),
  outletPressurePa: z.number().optional(),
});
export type PipeResult = z.infer<typeof PipeResult>;

/** Absolute pressures between which methods put what stands behind a trap; the methods named have no solution there. */
export const Band = z.object({
  lowPa: z.number(),
  highPa: z.number(),
  withoutSolution: z.array(z.string()).optional(),
});
export type Band = z.infer<typeof Band>;

export const TrapResult = z.object({
  id: z.string(),
  backPressurePa: z.number(),
  receiverPressurePa: z.number(),
  staticPa: z.number(),
  frictionPa: z.number(),
  flashPa: z.number(),
  differentialPa: z.number(),
  handCheck: z.object({ staticPa: z.number(), backPressurePa: z.number() }),
  liveSteamKgS: z.number().optional(),
  basis: z.enum(['average', 'ownPeak', 'probable']).optional(),
  /** Over every friction method and basis of lift; then over those that suit the flow in each pipe. */
  spread: Band.optional(),
  credible: Band.optional(),
  walk: z.array(z.string()),
  checks: z.array(TrapCheck),
  notChecked: z.array(z.object({ code: z.string(), reason: z.string() })),
});
export type TrapResult = z.infer<typeof TrapResult>;

export const SolveWarning = z.object({
  ...words,
  code: z.string(),
  element: z.string(),
  verdict: z.enum(['watch', 'fail']),
  value: z.number().optional(),
  limit: z.number().optional(),
});
export type SolveWarning = z.infer<typeof SolveWarning>;

/** What POST /api/solve answers and `npm run solve` prints. `case` '' is the plain network. */
export const SolveResult = z.object({
  case: z.string(),
  converged: z.boolean(),
  iterations: z.number(),
  nodes: z.array(NodeResult),
  pipes: z.array(PipeResult),
  traps: z.array(TrapResult),
  warnings: z.array(SolveWarning),
  partial: z.literal(true).optional(),
  leftOut: z.array(z.string()).optional(),
  problem: Problem.optional(),
});
export type SolveResult = z.infer<typeof SolveResult>;

/** One case of a live solve; a case that needs what is not computed yet is refused by name while the others stand. */
export const CaseOutcome = z.discriminatedUnion('status', [
  z.object({ caseId: z.string(), status: z.literal('solved'), result: SolveResult }),
  z.object({ caseId: z.string(), status: z.literal('refused'), problem: Problem }),
]);
export type CaseOutcome = z.infer<typeof CaseOutcome>;

/** GET /api/networks/:networkId/results?version=N&bands=later: 200 finished or failed, 202 waiting. */
export const NetworkResults = z.discriminatedUnion('state', [
  z.object({ state: z.literal('waiting'), version: z.number().int() }),
  z.object({
    state: z.literal('finished'),
    version: z.number().int(),
    solverHash: z.string(),
    engineVersion: z.string(),
    finishedAt: z.iso.datetime(),
    /** How long the pressures took. */
    solveMs: z.number(),
    /**
     * Only where asked for with `bands=later`: traps have no `spread` and `credible` yet, and a check that passes may yet have to be
     * watched. Ask again without.
     */
    bandsToCome: z.literal(true).optional(),
    cases: z.array(CaseOutcome),
  }),
  z.object({ state: z.literal('failed'), version: z.number().int(), problem: Problem }),
]);
export type NetworkResults = z.infer<typeof NetworkResults>;
