/** The part of a gauge's scale from its start, as a share of the span, up to which `limit` holds. */
interface ScalePart {
  readonly upTo: number;
  /** Greatest error either way, as a share of the span. */
  readonly limit: number;
}

/** A grade or class that stands on a dial. */
export interface AccuracyGrade {
  readonly id: string;
  readonly standard: 'ASME B40.100' | 'EN 837-1';
  /** As the standard writes it. */
  readonly grade: string;
  readonly parts: readonly ScalePart[];
}

/**
 * Accuracy grades of dial gauges, from memory of the standards.
 * ASME B40.100 gives some grades a narrower limit in the middle half of the scale than in its lower and upper quarter;
 * EN 837-1 gives each class one limit over the whole scale. Best first.
 */
export const ACCURACY_GRADES: readonly AccuracyGrade[] = [
  asme('4A', 0.001),
  asme('3A', 0.0025),
  asme('2A', 0.005),
  asme('1A', 0.01),
  asme('A', 0.02, 0.01),
  asme('B', 0.03, 0.02),
  asme('C', 0.04, 0.03),
  asme('D', 0.05),
  en('0.1', 0.001),
  en('0.25', 0.0025),
  en('0.6', 0.006),
  en('1', 0.01),
  en('1.6', 0.016),
  en('2.5', 0.025),
  en('4', 0.04),
];

/** The limit that holds on the whole scale: what is stored as a gauge's accuracy, so that a reading near an end is not trusted too far. */
export function widestLimit({ parts }: AccuracyGrade): number {
  return Math.max(...parts.map(({ limit }) => limit));
}

/**
 * Greatest error of a gauge at a reading.
 * @param share where the reading stands on the scale, 0 at its start and 1 at its end; outside, the nearer end's limit
 * @returns as a share of the span
 */
export function limitAt({ parts }: AccuracyGrade, share: number): number {
  return (parts.find(({ upTo }) => share <= upTo) ?? parts.at(-1))?.limit ?? NaN;
}

function asme(grade: string, outer: number, middle = outer): AccuracyGrade {
  const parts =
    outer === middle
      ? [{ upTo: 1, limit: outer }]
      : [
          { upTo: 0.25, limit: outer },
          { upTo: 0.75, limit: middle },
          { upTo: 1, limit: outer },
        ];
  return { id: `asme-${grade}`, standard: 'ASME B40.100', grade, parts };
}

function en(grade: string, limit: number): AccuracyGrade {
  return { id: `en-${grade}`, standard: 'EN 837-1', grade, parts: [{ upTo: 1, limit }] };
}
