import type { Gauge } from '@riseback/network';
import type { JudgedRow, RoundResults } from './agreement';
import { expandedUncertainty, type ExpandedUncertainty, type UncertaintyPart } from './expanded-uncertainty';
import { accuracyLimitPa, resolutionPart } from './measurement-uncertainty';
import { agreementWord, normalisedError, type AgreementWord } from './normalised-error';
import { credibleHalfWidthPa, loadsPart } from './prediction-uncertainty';

/** How a gauge moved since the baseline round, and how it should have. */
export interface ChangeSince {
  readonly measuredPa: number;
  readonly predictedPa: number;
  readonly measurement: ExpandedUncertainty;
  readonly predicted: ExpandedUncertainty;
  readonly normalisedError: number;
  readonly word: AgreementWord;
}

/**
 * A gauge's error runs smoothly over its scale: at the same reading it cancels but for friction and hysteresis, taken as a quarter of its
 * accuracy; half a scale apart it does not cancel at all. Ours: the standards limit the error, not its change.
 */
const LEAST_SHARE = 0.25;
const APART_SHARE = 2;

/**
 * E_n on the change since a baseline, in which what the model and the gauge always have wrong cancels. What remains of the model is by how
 * much its band has grown or shrunk on that side; loads and dial are read anew each time.
 */
export function changeSinceBaseline(
  now: JudgedRow,
  then: JudgedRow,
  resultsNow: RoundResults,
  resultsThen: RoundResults,
): ChangeSince {
  const measuredPa = now.measuredPa - then.measuredPa;
  const predictedPa = now.predictedPa - then.predictedPa;
  const measurement = expandedUncertainty([
    ...accuracyParts(now, then),
    ...resolutionPart(now.gauge),
    ...resolutionPart(then.gauge),
  ]);
  const side = measuredPa >= predictedPa ? 'above' : 'below';
  const grownPa = Math.abs(
    (credibleHalfWidthPa(now.prediction, side) ?? 0) - (credibleHalfWidthPa(then.prediction, side) ?? 0),
  );
  const predicted = expandedUncertainty([
    ...loadsPart(resultsNow.file, resultsNow.result, now.prediction),
    ...loadsPart(resultsThen.file, resultsThen.result, then.prediction),
    ...(grownPa === 0 ? [] : [{ cause: 'model', shape: 'rectangular', limitPa: grownPa } as const]),
  ]);
  const error = normalisedError(measuredPa, predictedPa, measurement.expandedPa, predicted.expandedPa);
  return { measuredPa, predictedPa, measurement, predicted, normalisedError: error, word: agreementWord(error) };
}

function accuracyParts(now: JudgedRow, then: JudgedRow): UncertaintyPart[] {
  const [limitPa = 0, formerPa = 0] = [accuracyLimitPa(now.gauge), accuracyLimitPa(then.gauge)];
  if (!sameInstrument(now.gauge, then.gauge)) return [accuracy(limitPa), accuracy(formerPa)];
  const spanPa = (now.gauge.rangeHighPa ?? NaN) - (now.gauge.rangeLowPa ?? NaN);
  const movedPa = Math.abs((now.reading.valuePa ?? NaN) - (then.reading.valuePa ?? NaN));
  return [accuracy(limitPa * Math.min(1, Math.max(LEAST_SHARE, (APART_SHARE * movedPa) / spanPa)))];
}

/** Another range, accuracy or calibration since: another instrument, or the same one set anew. */
function sameInstrument(a: Gauge, b: Gauge): boolean {
  return (
    a.rangeLowPa === b.rangeLowPa &&
    a.rangeHighPa === b.rangeHighPa &&
    a.accuracy === b.accuracy &&
    a.calibratedOn === b.calibratedOn
  );
}

function accuracy(limitPa: number): UncertaintyPart {
  return { cause: 'accuracy', shape: 'rectangular', limitPa };
}
