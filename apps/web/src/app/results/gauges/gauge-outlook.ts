import { computed, inject, Injectable, linkedSignal } from '@angular/core';
import type { SolveResult } from '@riseback/contracts';
import {
  gaugeFindings,
  type GaugeFinding,
  type GaugePrediction,
  leastMarginPa,
  measurementUncertainty,
  predictedAtGauge,
  predictionUncertainty,
  readingExpected,
} from '@riseback/diagnosis';
import { type Gauge, inOrder, type NetworkDocument, type NetworkFile, toFile } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { TODAY } from '../../shared/today';
import { asSolved } from '../as-solved';

/** What is expected of a gauge in a case, and how well it and the model know it. */
export interface GaugeOutlook {
  readonly caseId: string;
  readonly prediction: GaugePrediction;
  /** What the dial should show, gauge pressure. */
  readonly readingPa: number;
  /** Either way, about 95 %; absent where range or accuracy is not known. */
  readonly readToPa: number | undefined;
  readonly predictedToPa: { readonly above: number; readonly below: number };
}

/** Up to this many gauges are looked at with the credible band at each, which costs a march by every method. */
const WITH_BANDS = 40;

interface Basis {
  readonly document: NetworkDocument | null;
  readonly finished: unknown;
  readonly ready: boolean;
}

/** What the results say of each gauge. In the drawing page's `providers`. */
@Injectable()
export class GaugeOutlooks {
  private readonly store = inject(NetworkStore);
  private readonly today = inject(TODAY);

  /** By gauge. Those of before stay until new results have their bands, so that no edit waits for them. */
  readonly findings = linkedSignal<Basis, ReadonlyMap<string, readonly GaugeFinding[]>>({
    source: () => ({
      document: this.store.document(),
      finished: this.store.finished(),
      ready: !this.store.bandsToCome() && this.store.solveState().kind !== 'solving',
    }),
    computation: ({ document, ready }, before) => {
      if (document === null) return new Map<string, never>();
      return !ready && before !== undefined ? before.value : this.allFindings(document);
    },
  });
  private readonly file = computed(() => {
    const document = this.store.document();
    return document === null ? null : toFile(document);
  });

  /** @returns null where the case shown has no result for the gauge's element */
  of(gauge: Gauge): GaugeOutlook | null {
    const file = this.file();
    const place = this.placeOf(gauge);
    const prediction = file === null || place.result === null ? undefined : predicted(file, place.result, gauge);
    if (file === null || place.result === null || prediction === undefined) return null;
    const result = asSolved(place.result);
    const predictedTo = (side: 'above' | 'below'): number =>
      predictionUncertainty(file, result, prediction, side).expandedPa;
    return {
      caseId: place.caseId,
      prediction,
      readingPa: readingExpected(prediction.pressurePa, gauge, prediction.tap.elevationM, file.site),
      readToPa: measurementUncertainty(gauge, file.site)?.expandedPa,
      predictedToPa: { above: predictedTo('above'), below: predictedTo('below') },
    };
  }

  private allFindings(document: NetworkDocument): ReadonlyMap<string, readonly GaugeFinding[]> {
    const file = this.file();
    const found = new Map<string, readonly GaugeFinding[]>();
    if (file === null || document.gauges.size === 0) return found;
    const banded = document.gauges.size <= WITH_BANDS;
    for (const [id, { value: gauge }] of inOrder(document.gauges)) {
      const { result } = this.placeOf(gauge);
      const prediction = result === null ? undefined : predicted(file, banded ? result : bandless(result), gauge);
      const leastPa =
        prediction === undefined || result === null ? undefined : leastMarginPa(file, result.traps, prediction);
      const place = { prediction, leastMarginPa: leastPa };
      found.set(id, gaugeFindings(gauge, place, file.site, this.today()));
    }
    return found;
  }

  private placeOf({ node, pipe }: Gauge): { readonly caseId: string; readonly result: SolveResult | null } {
    const element = node ?? pipe ?? '';
    return { caseId: this.store.caseOf(element), result: this.store.resultAt(element) };
  }
}

function predicted(file: NetworkFile, result: SolveResult, gauge: Gauge): GaugePrediction | undefined {
  return predictedAtGauge(file, asSolved(result), gauge);
}

function bandless(result: SolveResult): SolveResult {
  return { ...result, traps: result.traps.map(({ credible: _, ...trap }) => trap) };
}
