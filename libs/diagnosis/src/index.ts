export { ACCURACY_GRADES, limitAt, widestLimit, type AccuracyGrade } from './accuracy-grades';
export {
  agreementOf,
  standingReadings,
  type AgreementRow,
  type JudgedRow,
  type ReadRound,
  type RoundResults,
  type TakenReading,
} from './agreement';
export { type ChangeSince } from './change-since';
export {
  expandedUncertainty,
  standardOf,
  type ExpandedUncertainty,
  type UncertaintyCause,
  type UncertaintyPart,
} from './expanded-uncertainty';
export { gaugeTap, type GaugeTap } from './gauge-tap';
export { ELEVATION_LIMIT_M, accuracyLimitPa, measurementUncertainty } from './measurement-uncertainty';
export { AGREEMENT_LIMITS, agreementWord, normalisedError, type AgreementWord } from './normalised-error';
export { predictedAtGauge, type GaugePrediction, type PredictedResult } from './predicted-at-gauge';
export {
  credibleHalfWidthPa,
  HELD_PRESSURE_TOLERANCE,
  predictionUncertainty,
  type Side,
} from './prediction-uncertainty';
export { legDensityKgM3, readingAtTap, readingExpected, waterLegPa } from './reading-at-tap';
export {
  gaugeFindings,
  WORKING_PART,
  type GaugeFinding,
  type GaugeFindingCode,
  type GaugePlace,
} from './gauge-findings';
export { leastMarginPa } from './margin-above';
