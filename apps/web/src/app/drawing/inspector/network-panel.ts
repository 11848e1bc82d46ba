import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { type Method, type SiteConditions, setNetworkOp } from '@riseback/network';
import {
  ACCELERATION_SENTENCE,
  COINCIDENCE_WORDS,
  DROP_CREDIT_SENTENCE,
  FRICTION_WORDS,
  STATIC_LIFT_WORDS,
  VOID_FRACTION_WORDS,
} from '../../networks/method-words';
import { NetworkStore } from '../../networks/network-store';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { PlanPanel } from '../plan/plan-panel';
import type { FieldSpec } from './element-fields';
import { LimitFields } from './limit-fields';
import { MethodChoice } from './method-choice';
import { type FieldChange, PropertyFields } from './property-fields';
import { hasSecondWays } from './second-ways';

const SITE_FIELDS: readonly FieldSpec[] = [
  { type: 'quantity', key: 'atmosphericPressurePa', label: 'Atmosphere', kind: 'absolutePressure' },
  { type: 'quantity', key: 'ambientTemperatureK', label: 'Air temperature', kind: 'temperature' },
];
const RULE_FIELD: FieldSpec = { type: 'quantity', key: 'liftRulePaM', label: 'Rule of lift', kind: 'pressurePerRise' };
const DROP_FIELD: FieldSpec = {
  type: 'quantity',
  key: 'dropCredit',
  label: 'Credit for falls',
  kind: 'fraction',
};

const WORDS = {
  friction: FRICTION_WORDS,
  staticLift: STATIC_LIFT_WORDS,
  voidFraction: VOID_FRACTION_WORDS,
  coincidence: COINCIDENCE_WORDS,
} as const;

/** The network as a whole: site conditions and method, shown while no element is selected. */
@Component({
  selector: 'app-network-panel',
  imports: [LimitFields, MethodChoice, PlanPanel, PropertyFields, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './network-panel.html',
  styleUrls: ['./inspector-tabs.scss', './network-panel.scss'],
})
export class NetworkPanel {
  protected readonly store = inject(NetworkStore);

  protected readonly siteFields = SITE_FIELDS;
  protected readonly words = WORDS;
  protected readonly dropCreditSentence = DROP_CREDIT_SENTENCE;
  protected readonly accelerationSentence = ACCELERATION_SENTENCE;
  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly siteValues = computed((): Readonly<Record<string, unknown>> => ({
    ...this.store.document()?.site,
  }));
  protected readonly methodValues = computed((): Readonly<Record<string, unknown>> => ({
    ...this.store.document()?.method,
  }));
  protected readonly methodFields = computed(() =>
    this.store.document()?.method.staticLift === 'rule' ? [RULE_FIELD, DROP_FIELD] : [DROP_FIELD],
  );
  protected readonly blockedCoincidence = computed((): Readonly<Record<string, string>> => {
    const document = this.store.document();
    return document !== null && hasSecondWays(document)
      ? { probable: 'It needs one way down for every trap, and this network has loops or second ways down.' }
      : {};
  });
  protected readonly counts = computed(() => {
    const document = this.store.document();
    if (document === null) return '';
    const traps = [...document.nodes.values()].filter(({ value }) => value.kind === 'trap').length;
    return `${String(traps)} traps, ${String(document.pipes.size)} pipes`;
  });
  protected readonly refusal = signal<{ key: string; reason: string } | null>(null);

  protected setSite({ key, what, to }: FieldChange): void {
    const document = this.store.document();
    if (document === null) return;
    const site = { ...document.site, [key]: to } as SiteConditions;
    this.taken(key, this.store.edit(`${what} of the site`, [setNetworkOp(document, 'site', site)]));
  }

  protected setMethod(key: string, to: unknown, what: string): void {
    const document = this.store.document();
    if (document === null || to === undefined) return;
    const method = { ...document.method, [key]: to } as Method;
    this.taken(key, this.store.edit(`method: ${what}`, [setNetworkOp(document, 'method', method)]));
  }

  protected refusalAt(key: string): string {
    const refusal = this.refusal();
    return refusal?.key === key ? refusal.reason : '';
  }

  private taken(key: string, taken: boolean): void {
    this.refusal.set(taken ? null : { key, reason: this.store.lastRefusal().join(' ') });
  }
}
