import { ACCURACY_GRADES, widestLimit } from '@riseback/diagnosis';
import type { Gauge } from '@riseback/network';
import { DATE_HINT } from '../../shared/calendar-date';
import type { FieldSpec } from './element-fields';

const TAG: FieldSpec = { type: 'text', key: 'tag', label: 'Tag', optional: true };
const DISTANCE: FieldSpec = { type: 'quantity', key: 'distanceM', label: 'From its start', kind: 'length' };
const ELEVATION: FieldSpec = {
  type: 'quantity',
  key: 'elevationM',
  label: 'Elevation of the gauge',
  kind: 'length',
};
const WATER_LEG: FieldSpec = { type: 'flag', key: 'waterLeg', label: 'Water leg: the line to it stands full of water' };
const RANGE: readonly FieldSpec[] = [
  { type: 'quantity', key: 'rangeLowPa', label: 'Range from', kind: 'gaugePressure', optional: true },
  { type: 'quantity', key: 'rangeHighPa', label: 'Range to', kind: 'gaugePressure', optional: true },
];
/** The choice only fills in the accuracy: several grades share a figure, so what stands there names none. */
export const GRADE_KEY = 'grade';
const ACCURACY: readonly FieldSpec[] = [
  { type: 'quantity', key: 'accuracy', label: 'Accuracy', kind: 'fraction', optional: true, hint: 'Share of the span' },
  {
    type: 'choice',
    key: GRADE_KEY,
    label: 'Fill in from a grade or class',
    choices: ACCURACY_GRADES.map((grade) => ({
      value: grade.id,
      words: `${grade.standard} ${grade.standard === 'EN 837-1' ? 'class' : 'grade'} ${grade.grade}`,
    })),
    none: 'Choose',
    hint: 'Of a grade with two limits, the wider one',
  },
  {
    type: 'quantity',
    key: 'resolutionPa',
    label: 'Read to the nearest',
    kind: 'pressureDifference',
    optional: true,
  },
];
const CALIBRATION: readonly FieldSpec[] = [
  { type: 'text', key: 'calibratedOn', label: 'Calibrated on', optional: true, hint: DATE_HINT },
  { type: 'text', key: 'calibrationDueOn', label: 'Calibration due', optional: true, hint: DATE_HINT },
];
const RETIRED: FieldSpec = { type: 'flag', key: 'retired', label: 'Retired: no longer read' };

/** A text that names an element; three keys hang on it. */
export const PLACE_KEY = 'place';
const PLACE: FieldSpec = { type: 'text', key: PLACE_KEY, label: 'On' };
export const DATE_KEYS: ReadonlySet<string> = new Set(['calibratedOn', 'calibrationDueOn']);

/** What is asked when a gauge is placed. */
export function askedGaugeFields(onPipe: boolean): readonly FieldSpec[] {
  return [TAG, ...(onPipe ? [DISTANCE] : []), ELEVATION, ...RANGE, ...ACCURACY, WATER_LEG];
}

/** Every property of a gauge. */
export function gaugeFields({ pipe }: Gauge): readonly FieldSpec[] {
  return [
    TAG,
    PLACE,
    ...(pipe === undefined ? [] : [DISTANCE]),
    ELEVATION,
    WATER_LEG,
    ...RANGE,
    ...ACCURACY,
    ...CALIBRATION,
    RETIRED,
  ];
}

/** The accuracy that a grade promises on its whole scale. */
export function accuracyOfGrade(gradeId: unknown): number | undefined {
  const grade = ACCURACY_GRADES.find(({ id }) => id === gradeId);
  return grade && widestLimit(grade);
}
