import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal, viewChild } from '@angular/core';
import type { Gauge } from '@riseback/network';
import { formatQuantity, type QuantityKind } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';
import { checkName, findingWords } from '../../results/finding-words';
import { GaugeOutlooks } from '../../results/gauges/gauge-outlook';
import { calendarDate, noDate } from '../../shared/calendar-date';
import { gaugePlaceName, gaugePlaceOps } from '../../shared/gauge-place';
import { DrawingCommands } from '../drawing-commands';
import { gaugeKey } from '../model/gauge-keys';
import { accuracyOfGrade, DATE_KEYS, gaugeFields, GRADE_KEY, PLACE_KEY } from './gauge-fields';
import { type FieldChange, PropertyFields } from './property-fields';

/** A gauge: what it should show, what it cannot decide, and its fields. Each accepted field is one edit and one step of undo. */
@Component({
  selector: 'app-gauge-panel',
  imports: [PropertyFields],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './gauge-panel.html',
  styleUrls: ['./inspector-tabs.scss', './gauge-panel.scss'],
})
export class GaugePanel {
  private readonly commands = inject(DrawingCommands);
  private readonly outlooks = inject(GaugeOutlooks);
  protected readonly store = inject(NetworkStore);

  readonly gauge = input.required<Gauge>();

  private readonly fields = viewChild.required(PropertyFields);

  protected readonly specs = computed(() => gaugeFields(this.gauge()));
  protected readonly values = computed((): Readonly<Record<string, unknown>> => {
    const document = this.store.document();
    return { ...this.gauge(), [PLACE_KEY]: document === null ? '' : gaugePlaceName(this.gauge(), document) };
  });
  protected readonly fixed = computed(() => !this.store.may('readings'));
  protected readonly caseName = computed(() => {
    const caseId = this.outlook()?.caseId ?? '';
    return caseId === '' ? 'the network as drawn' : `case ${this.store.nameOfCase(caseId)}`;
  });
  protected readonly outlook = computed(() => this.outlooks.of(this.gauge()));
  /** What is expected, [what, how much]. */
  protected readonly expected = computed((): readonly (readonly [string, string])[] => {
    const outlook = this.outlook();
    if (outlook === null) return [];
    const { prediction, readingPa, readToPa, predictedToPa } = outlook;
    return [
      ['At its tap', this.amount(prediction.pressurePa, 'pressure')],
      ['On its dial', this.amount(readingPa, 'gaugePressure')],
      ['May be higher by', this.amount(predictedToPa.above, 'pressureDifference')],
      ['May be lower by', this.amount(predictedToPa.below, 'pressureDifference')],
      ...(readToPa === undefined
        ? []
        : [['Its readings are good to', `± ${this.amount(readToPa, 'pressureDifference')}`] as const]),
    ];
  });
  protected readonly notes = computed(() =>
    (this.outlooks.findings().get(this.gauge().id) ?? []).map(({ code, text, remedy }) => ({
      code,
      name: checkName(code),
      what: findingWords(text, this.store.units()),
      remedy: findingWords(remedy, this.store.units()),
    })),
  );
  /** Forgotten when another gauge is looked at. */
  protected readonly refusal = linkedSignal<string, { key: string; reason: string } | null>({
    source: () => this.gauge().id,
    computation: () => null,
  });

  focusFirst(): void {
    this.fields().focusFirst();
  }

  protected set({ key, what, to }: FieldChange): void {
    if (key === PLACE_KEY) this.move(typeof to === 'string' ? to : '');
    else if (key === GRADE_KEY) this.accept('accuracy', accuracyOfGrade(to), 'accuracy');
    else if (DATE_KEYS.has(key) && typeof to === 'string') {
      const date = calendarDate(to);
      if (date === null) this.refusal.set({ key, reason: noDate(to) });
      else this.accept(key, date, what);
    } else this.accept(key, to, what);
  }

  private move(text: string): void {
    const document = this.store.document();
    if (document === null) return;
    const placed = gaugePlaceOps(text, this.gauge(), document);
    const reason = placed.ok
      ? this.store.edit(`place of ${this.gauge().tag ?? this.gauge().id}`, placed.ops)
        ? ''
        : this.store.lastRefusal().join(' ')
      : placed.reason;
    this.refusal.set(reason === '' ? null : { key: PLACE_KEY, reason });
  }

  private accept(key: string, to: unknown, what: string): void {
    const taken = this.commands.set(gaugeKey(this.gauge().id), key, to, what);
    this.refusal.set(taken ? null : { key, reason: this.store.lastRefusal().join(' ') });
  }

  private amount(si: number, kind: QuantityKind): string {
    return formatQuantity(si, kind, this.store.units(), { withUnit: true });
  }
}
