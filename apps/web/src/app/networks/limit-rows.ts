import { checkName, LIMIT_WORDS } from '@riseback/contracts';
import type { Limits } from '@riseback/network';
import { CHECK_LIMITS, type CheckLimit } from '@riseback/solver';
import type { QuantityKind } from '@riseback/units';

/** One limit of a check as the form shows it. */
export interface LimitRow {
  readonly key: string;
  readonly label: string;
  readonly kind: QuantityKind;
  readonly defaultSi: number;
  readonly source: string;
  /** The site's own; undefined where the default is in force. */
  readonly own: number | undefined;
}

export interface LimitGroup {
  /** The check's code. */
  readonly code: string;
  readonly rows: readonly LimitRow[];
}

/** Every limit that the solver knows, with what the network says of it. */
export function limitGroups(limits: Limits): LimitGroup[] {
  const own: Readonly<Record<string, Readonly<Record<string, number | undefined>> | undefined>> = limits;
  return Object.entries<Readonly<Record<string, CheckLimit>>>(CHECK_LIMITS).map(([code, ofCode]) => ({
    code,
    rows: Object.entries(ofCode).map(([key, { value, quantity, source }]) => ({
      key,
      label: LIMIT_WORDS[`${code}.${key}`] ?? key,
      kind: kindOf(key, quantity),
      defaultSi: value,
      source,
      own: own[code]?.[key],
    })),
  }));
}

/** What one limit is called and measured in, and its default; undefined for what the solver does not know. */
export function limitOf(
  code: string,
  key: string,
):
  | { readonly check: string; readonly label: string; readonly kind: QuantityKind; readonly defaultSi: number }
  | undefined {
  const known: Readonly<Record<string, Readonly<Record<string, CheckLimit>> | undefined>> = CHECK_LIMITS;
  const limit = known[code]?.[key];
  if (limit === undefined) return undefined;
  return {
    check: checkName(code),
    label: LIMIT_WORDS[`${code}.${key}`] ?? key,
    kind: kindOf(key, limit.quantity),
    defaultSi: limit.value,
  };
}

/** The limits with one of them set, or given back to its default; a check without own limits has no entry. */
export function withLimit(limits: Limits, code: string, key: string, to: number | undefined): Limits {
  const own: Readonly<Record<string, Readonly<Record<string, number | undefined>> | undefined>> = limits;
  const ofCode = { ...own[code], [key]: to };
  const kept = Object.entries(ofCode).filter(([, value]) => value !== undefined);
  const others = Object.entries(own).filter(([name]) => name !== code);
  return Object.fromEntries([...others, ...(kept.length === 0 ? [] : [[code, Object.fromEntries(kept)] as const])]);
}

/** A finding's sentence says "10 psi"; a field takes what a person would type there, 10 psig. */
function kindOf(key: string, quantity: CheckLimit['quantity']): QuantityKind {
  return key.endsWith('GaugePa') ? 'gaugePressure' : quantity;
}
