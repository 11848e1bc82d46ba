import type { Gauge, NetworkFile } from '@riseback/network';
import { changeSinceBaseline, type ChangeSince } from './change-since';
import type { ExpandedUncertainty } from './expanded-uncertainty';
import { measurementUncertainty } from './measurement-uncertainty';
import { agreementWord, normalisedError, type AgreementWord } from './normalised-error';
import { predictedAtGauge, type GaugePrediction, type PredictedResult } from './predicted-at-gauge';
import { predictionUncertainty } from './prediction-uncertainty';
import { readingAtTap } from './reading-at-tap';

/** A reading, as a round has it: with the gauge as it was when it was read. */
export interface TakenReading {
  readonly id: string;
  readonly gaugeId: string;
  readonly gauge: Gauge;
  /** Gauge pressure as the dial showed it; absent where the gauge could not be read. */
  readonly valuePa?: number | undefined;
  /** The reading that this one puts right. */
  readonly replaces?: string | undefined;
}

/** Readings taken together, in one case. */
export interface ReadRound {
  readonly readings: readonly TakenReading[];
}

/** A network as it was solved in the case in which the plant was run. */
export interface RoundResults {
  readonly file: NetworkFile;
  readonly result: PredictedResult;
}

interface RowStart {
  readonly gaugeId: string;
  readonly gauge: Gauge;
  readonly reading: TakenReading;
  readonly prediction?: GaugePrediction | undefined;
}

/** What a round says of one gauge. Pressures are absolute and at the tap. */
export type AgreementRow =
  | (RowStart & { readonly status: 'notRead' })
  /** The result does not have the gauge's element. */
  | (RowStart & { readonly status: 'notPredicted'; readonly measuredPa?: number | undefined })
  /** The gauge's range or accuracy is not known, so nothing can be told from the difference. */
  | (RowStart & { readonly status: 'accuracyUnknown'; readonly measuredPa: number; readonly predictedPa: number })
  | JudgedRow;

export interface JudgedRow extends RowStart {
  readonly status: 'judged';
  readonly prediction: GaugePrediction;
  readonly measuredPa: number;
  readonly predictedPa: number;
  readonly measurement: ExpandedUncertainty;
  readonly predicted: ExpandedUncertainty;
  /** E_n. */
  readonly normalisedError: number;
  readonly word: AgreementWord;
  /** Against a baseline round, where there is one that has this gauge. */
  readonly sinceBaseline?: ChangeSince | undefined;
}

/**
 * A round of readings against what a result says: by gauge, in the order in which gauges were first read.
 * Of a gauge read more than once the last reading that none replaces counts.
 * @param baseline a round in which the plant was found in order, with the results of its own case and version
 */
export function agreementOf(
  round: ReadRound,
  results: RoundResults,
  baseline?: { readonly round: ReadRound; readonly results: RoundResults },
): ReadonlyMap<string, AgreementRow> {
  const before = baseline && agreementOf(baseline.round, baseline.results);
  const rows = new Map<string, AgreementRow>();
  for (const [gaugeId, reading] of standingReadings(round)) {
    const row = rowOf(reading, results);
    const then = before?.get(gaugeId);
    rows.set(
      gaugeId,
      row.status === 'judged' && then?.status === 'judged'
        ? { ...row, sinceBaseline: changeSinceBaseline(row, then, results, baseline?.results ?? results) }
        : row,
    );
  }
  return rows;
}

/** By gauge, the last reading that no other replaces. */
export function standingReadings({ readings }: ReadRound): ReadonlyMap<string, TakenReading> {
  const replaced = new Set(readings.flatMap(({ replaces }) => (replaces === undefined ? [] : [replaces])));
  return new Map(
    readings.flatMap((reading) => (replaced.has(reading.id) ? [] : [[reading.gaugeId, reading] as const])),
  );
}

function rowOf(reading: TakenReading, { file, result }: RoundResults): AgreementRow {
  const { gauge, gaugeId, valuePa } = reading;
  const prediction = predictedAtGauge(file, result, gauge);
  const start = { gaugeId, gauge, reading, prediction };
  if (valuePa === undefined) return { ...start, status: 'notRead' };
  if (prediction === undefined) return { ...start, status: 'notPredicted' };
  const measuredPa = readingAtTap(valuePa, gauge, prediction.tap.elevationM, file.site);
  const predictedPa = prediction.pressurePa;
  const measurement = measurementUncertainty(gauge, file.site);
  if (measurement === undefined) return { ...start, status: 'accuracyUnknown', measuredPa, predictedPa };
  const side = measuredPa >= predictedPa ? 'above' : 'below';
  const predicted = predictionUncertainty(file, result, prediction, side);
  const error = normalisedError(measuredPa, predictedPa, measurement.expandedPa, predicted.expandedPa);
  return {
    ...start,
    prediction,
    status: 'judged',
    measuredPa,
    predictedPa,
    measurement,
    predicted,
    normalisedError: error,
    word: agreementWord(error),
  };
}
