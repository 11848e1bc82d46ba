import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  Injector,
  signal,
  viewChild,
} from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import { RouterLink } from '@angular/router';
import {
  atmosphereKeepingGauge,
  countGaugePressures,
  type Method,
  type NetworkDocument,
  type SiteConditions,
  setNetworkOp,
} from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { firstValueFrom } from 'rxjs';
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
import { AtmosphereDialog, type AtmosphereQuestion, type KeptPressures } from './atmosphere-dialog';
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
  private readonly dialog = inject(MatDialog);
  private readonly injector = inject(Injector);
  private readonly siteForm = viewChild.required<PropertyFields>('siteForm');
  private asking = false;

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
    if (key === 'atmosphericPressurePa' && typeof to === 'number' && countGaugePressures(document) > 0) {
      void this.setAtmosphere(document, to);
      return;
    }
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

  /** Asks which pressures stay, since those that were read off dials would else become others. */
  private async setAtmosphere(document: NetworkDocument, atmosphericPressurePa: number): Promise<void> {
    // the field commits once more when the question takes its focus away
    if (this.asking) return;
    this.asking = true;
    const kept = await this.keptPressures(document, atmosphericPressurePa);
    this.asking = false;
    // somebody else may have changed the network while the question stood
    const present = this.store.document();
    if (kept !== undefined && present !== null) {
      const ops =
        kept === 'gauge'
          ? atmosphereKeepingGauge(present, atmosphericPressurePa)
          : [setNetworkOp(present, 'site', { ...present.site, atmosphericPressurePa })];
      this.taken('atmosphericPressurePa', this.store.edit('atmosphere of the site', ops));
    }
    afterNextRender(() => this.siteForm().focusFirst(), { injector: this.injector });
  }

  /** Undefined: the person would rather leave the atmosphere as it is. */
  private keptPressures(document: NetworkDocument, toPa: number): Promise<KeptPressures | undefined> {
    const printed = (pressurePa: number) =>
      formatQuantity(pressurePa, 'absolutePressure', this.store.units(), { withUnit: true });
    const data = {
      from: printed(document.site.atmosphericPressurePa),
      to: printed(toPa),
      count: countGaugePressures(document),
    };
    const asked = this.dialog.open<AtmosphereDialog, AtmosphereQuestion, KeptPressures>(AtmosphereDialog, {
      data,
      width: '460px',
      // the field would go on from the value that it still shows; it gets the keyboard back with the new one
      restoreFocus: false,
    });
    return firstValueFrom(asked.afterClosed());
  }

  private taken(key: string, taken: boolean): void {
    this.refusal.set(taken ? null : { key, reason: this.store.lastRefusal().join(' ') });
  }
}
