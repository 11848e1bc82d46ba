import type { Band, TrapResult } from '@riseback/contracts';
import { type DisplayUnits, displayUnit, formatQuantity } from '@riseback/units';

/** The two bands of a trap's back pressure: by every method, and by those that suit the flow in each pipe. */
export interface Bands {
  readonly spread: Band | undefined;
  readonly credible: Band | undefined;
}

export function bandsOf({ spread, credible }: Pick<TrapResult, 'spread' | 'credible'>): Bands {
  return { spread, credible };
}

/** "21.0 to 46.7", without a unit. */
export function bandNumbers({ lowPa, highPa }: Band, units: DisplayUnits): string {
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units);
  return `${pressure(lowPa)} to ${pressure(highPa)}`;
}

/** Both bands as sentences for a screen reader; '' while neither is computed. */
export function bandWords(trap: Pick<TrapResult, 'spread' | 'credible'>, units: DisplayUnits): string {
  const { spread, credible } = bandsOf(trap);
  const unit = displayUnit('pressure', units.system);
  return [
    credible === undefined ? '' : `Credible from ${bandNumbers(credible, units)} ${unit}${without(credible)}.`,
    spread === undefined ? '' : `By every method from ${bandNumbers(spread, units)} ${unit}${without(spread)}.`,
  ]
    .filter((words) => words !== '')
    .join(' ');
}

/** Methods that the band leaves out because they find no solution: in truth it is wider. */
function without({ withoutSolution = [] }: Band): string {
  return withoutSolution.length === 0 ? '' : `, ${withoutSolution.join(' and ')} without a solution`;
}
