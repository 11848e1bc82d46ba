import type { TrapResult, Verdict } from '@riseback/contracts';
import { type FileTrapModel, type NetworkDocument, overrideId, type Trap } from '@riseback/network';
import { checkTrap, limitsInForce } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { checkName } from '../results/finding-words';

/** What a trap asks of its model in one case. */
export interface TrapDemand {
  readonly trap: Trap;
  readonly inletPressurePa: number;
  readonly backPressurePa: number;
  readonly differentialPa: number;
  readonly loadKgS: number;
  /** Load times sizing factor. */
  readonly needKgS: number;
  readonly document: NetworkDocument;
}

/** How a model would do at a trap, before it is chosen. */
export interface ModelJudgement {
  /** Null where it cannot be said. */
  readonly capacityKgS: number | null;
  readonly verdict: Verdict | 'none';
  readonly words: string;
}

/** Checks that hang on the model; the others stay as they are, whichever is chosen. */
const OF_MODEL = new Set(['capacity', 'backPressureFraction', 'orificeRating', 'bodyRating']);
const RANK: Readonly<Record<Verdict, number>> = { pass: 0, watch: 1, fail: 2 };

/** What the trap needs in a case, by its newest result. */
export function trapDemand(document: NetworkDocument, caseId: string, trap: Trap, result: TrapResult): TrapDemand {
  const { backPressurePa, differentialPa } = result;
  // as the solver has it: an override's load stands by itself, any other is scaled by the case
  const override = document.overrides.get(overrideId(caseId, trap.id))?.value;
  const loadKgS = override?.loadKgS ?? trap.loadKgS * (document.cases.get(caseId)?.value.loadFactor ?? 1);
  return {
    document,
    trap,
    inletPressurePa: backPressurePa + differentialPa,
    backPressurePa,
    differentialPa,
    loadKgS,
    needKgS: trap.sizingFactor * loadKgS,
  };
}

/** The solver's own checks with this model in the trap's place; without a result only its ratings can be looked at. */
export function judgeModel(model: Omit<FileTrapModel, 'id'>, demand: TrapDemand, units: DisplayUnits): ModelJudgement {
  const { document, trap, inletPressurePa, backPressurePa, loadKgS, needKgS } = demand;
  const { checks, notChecked } = checkTrap({
    trap,
    model: { ...model, id: 'candidate' },
    inletPressurePa,
    backPressurePa,
    loadKgS,
    atmosphericPressurePa: document.site.atmosphericPressurePa,
    limits: limitsInForce(document.limits),
  });
  const ofModel = checks.filter(({ code }) => OF_MODEL.has(code));
  const capacity = ofModel.find(({ code }) => code === 'capacity');
  const unmade = notChecked.find(({ code }) => code === 'capacity');
  const worst = ofModel.reduce<Verdict>(
    (found, { verdict }) => (RANK[verdict] > RANK[found] ? verdict : found),
    'pass',
  );
  const others = ofModel.filter(({ code, verdict }) => code !== 'capacity' && verdict !== 'pass');
  const words = [
    capacity?.value === undefined ? (unmade?.reason ?? '') : capacityWords(capacity.value, needKgS, units),
    ...others.map(({ code, verdict }) => `${checkName(code)}: ${verdict}.`),
  ];
  return {
    capacityKgS: capacity?.value ?? null,
    // a capacity that is not judged is no pass, whatever the ratings say
    verdict: capacity === undefined && worst === 'pass' ? 'none' : worst,
    words: words.join(' '),
  };
}

function capacityWords(capacityKgS: number, needKgS: number, units: DisplayUnits): string {
  if (!(needKgS > 0)) return 'Nothing is needed in this case.';
  const share = capacityKgS / needKgS;
  const percent = formatQuantity(share, 'fraction', units, { withUnit: true, decimals: 0 });
  const times = share.toFixed(share < 10 ? 1 : 0);
  if (share < 1) return `Passes ${percent} of what is needed.`;
  return share < 1.05 ? 'Passes just what is needed.' : `Passes ${times} times what is needed.`;
}
