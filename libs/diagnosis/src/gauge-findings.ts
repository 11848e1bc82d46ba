import type { Gauge, SiteConditions } from '@riseback/network';
import type { FindingText } from '@riseback/solver';
import { measurementUncertainty } from './measurement-uncertainty';
import type { GaugePrediction } from './predicted-at-gauge';
import { credibleHalfWidthPa } from './prediction-uncertainty';
import { readingExpected } from './reading-at-tap';

export type GaugeFindingCode = 'gaugeRange' | 'gaugeScale' | 'gaugeGrade' | 'gaugeCalibration' | 'gaugeUnknown';

/** What keeps a gauge from deciding what it is there for: what is so and why it matters, and what would mend it. */
export interface GaugeFinding {
  readonly code: GaugeFindingCode;
  readonly text: FindingText;
  readonly remedy: FindingText;
}

/**
 * The part of the scale that a gauge should work in: its middle half, where ASME B40.100 grades hold their narrower limit and where that
 * standard has gauges chosen to work; EN 837-2 likewise keeps a steady pressure at or below three quarters of the scale. From memory.
 */
export const WORKING_PART = { from: 0.25, to: 0.75 } as const;

/** What is known about the place of a gauge, beside what is predicted there. */
export interface GaugePlace {
  readonly prediction: GaugePrediction | undefined;
  /** The least that any trap whose way passes is away from its back-pressure limit; absent where none is judged. */
  readonly leastMarginPa?: number | undefined;
}

/** @param today calendar date, as 2026-03-01 */
export function gaugeFindings(gauge: Gauge, place: GaugePlace, site: SiteConditions, today: string): GaugeFinding[] {
  if (gauge.retired) return [];
  return [
    ...scaleFindings(gauge, place, site),
    ...gradeFindings(gauge, place, site),
    ...unknownFindings(gauge),
    ...calibrationFindings(gauge, today),
  ];
}

function scaleFindings(gauge: Gauge, { prediction }: GaugePlace, site: SiteConditions): GaugeFinding[] {
  const { rangeLowPa, rangeHighPa } = gauge;
  if (prediction === undefined || rangeLowPa === undefined || rangeHighPa === undefined) return [];
  const expectedPa = readingExpected(prediction.pressurePa, gauge, prediction.tap.elevationM, site);
  const share = (expectedPa - rangeLowPa) / (rangeHighPa - rangeLowPa);
  const expected = gaugeAmount(expectedPa, site);
  if (share > 1 || share < 0) {
    const end = share > 1 ? 'above' : 'below';
    return [
      {
        code: 'gaugeRange',
        text: [`It is expected to show `, expected, `, which is ${end} its scale: the needle would stand at the stop.`],
        remedy: ['Fit a gauge whose middle half holds that pressure. Never leave a gauge on more than its scale.'],
      },
    ];
  }
  if (share >= WORKING_PART.from && share <= WORKING_PART.to) return [];
  const lower = share < WORKING_PART.from;
  return [
    {
      code: 'gaugeScale',
      text: [
        'It is expected to show ',
        expected,
        ', in the ',
        lower ? 'lowest' : 'highest',
        ' quarter of its scale, where a dial is read least well and many grades allow twice the error.',
      ],
      remedy: [
        `Fit a gauge of a ${lower ? 'lower' : 'higher'} range, so that it works in the middle half of its scale.`,
      ],
    },
  ];
}

function gradeFindings(gauge: Gauge, { prediction, leastMarginPa }: GaugePlace, site: SiteConditions): GaugeFinding[] {
  const expandedPa = measurementUncertainty(gauge, site)?.expandedPa;
  if (prediction === undefined || expandedPa === undefined) return [];
  const halfPa = Math.max(credibleHalfWidthPa(prediction, 'above') ?? 0, credibleHalfWidthPa(prediction, 'below') ?? 0);
  const known = { quantity: 'pressureDifference', si: expandedPa } as const;
  if (leastMarginPa !== undefined && leastMarginPa > 0 && expandedPa > leastMarginPa)
    return [
      {
        code: 'gaugeGrade',
        text: [
          'It can be read to ',
          known,
          ' either way, more than the ',
          { quantity: 'pressureDifference', si: leastMarginPa },
          ' that a trap upstream is away from its back-pressure limit: it cannot tell whether that is kept.',
        ],
        remedy: BETTER,
      },
    ];
  if (halfPa > 0 && expandedPa > halfPa)
    return [
      {
        code: 'gaugeGrade',
        text: [
          'It can be read to ',
          known,
          ' either way, more than the ',
          { quantity: 'pressureDifference', si: halfPa },
          ' by which the methods differ here: it cannot tell which of them holds.',
        ],
        remedy: BETTER,
      },
    ];
  return [];
}

const BETTER: FindingText = ['Fit a gauge of a lower range, a better grade or a finer scale.'];

/** Without range and accuracy a reading decides nothing. */
function unknownFindings({ rangeLowPa, rangeHighPa, accuracy }: Gauge): GaugeFinding[] {
  const missing = [
    ...(rangeLowPa === undefined || rangeHighPa === undefined ? ['range'] : []),
    ...(accuracy === undefined ? ['accuracy'] : []),
  ];
  if (missing.length === 0) return [];
  return [
    {
      code: 'gaugeUnknown',
      text: [
        `Its ${missing.join(' and ')} ${missing.length > 1 ? 'are' : 'is'} not given, so no reading of it can be judged.`,
      ],
      remedy: ['Give what stands on its dial.'],
    },
  ];
}

function calibrationFindings({ calibrationDueOn }: Gauge, today: string): GaugeFinding[] {
  // calendar dates of this form stand in the order of their letters
  if (calibrationDueOn === undefined || calibrationDueOn >= today) return [];
  return [
    {
      code: 'gaugeCalibration',
      text: [`Its calibration was due on ${calibrationDueOn}, so its accuracy is no longer assured.`],
      remedy: ['Have it calibrated, then give the new dates.'],
    },
  ];
}

/** A gauge pressure is told as the absolute one that it stands for, which screens turn into the person's units. */
function gaugeAmount(gaugePa: number, site: SiteConditions): FindingText[number] {
  return { quantity: 'pressure', si: gaugePa + site.atmosphericPressurePa };
}
