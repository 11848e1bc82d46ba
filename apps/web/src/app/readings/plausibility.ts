import type { ExpectedReading } from './field-sheet';
import type { Gauge } from '@riseback/network';

/** What speaks against a reading before it is kept. None of it forbids to keep it. */
export type Doubt = 'belowRange' | 'aboveRange' | 'atLowStop' | 'atHighStop' | 'farAboveExpected' | 'farOff' | 'off';

/** So many times the prediction is more likely a slip of the finger than a pressure. */
const TIMES_EXPECTED = 5;
/** Under this a multiple says nothing: a needle that hardly moves is many times of nothing [Pa]. */
const LEAST_EXPECTED_PA = 5_000;
/** |E_n| from which a gauge disagrees. */
const DISAGREES = 1.5;

/** A needle lies at its stop within half of what can be read, or this share of the span where that is not known. */
const STOP_SHARE = 0.005;

/** The first doubt about a reading, the gravest first; null when there is none. */
export function doubtAbout(valuePa: number, gauge: Gauge, expected: ExpectedReading | undefined): Doubt | null {
  const [ofDial, ofModel] = [doubtOfDial(valuePa, gauge), doubtOfModel(valuePa, expected)];
  // where about nothing is expected, a needle at its lower stop is what it should be
  const expectedThere = ofDial === 'atLowStop' && expected?.belowPa !== undefined && ofModel === null;
  return expectedThere ? null : (ofDial ?? ofModel);
}

/** Whether it is asked about: only what is likely a slip or a gauge that shows nothing. A high reading is a finding too. */
export function isAskedAbout(doubt: Doubt): boolean {
  return doubt !== 'off' && doubt !== 'farOff';
}

function doubtOfDial(valuePa: number, { rangeLowPa, rangeHighPa, resolutionPa }: Gauge): Doubt | null {
  if (rangeHighPa !== undefined) {
    const spanPa = rangeHighPa - (rangeLowPa ?? 0);
    const nearPa = resolutionPa === undefined || resolutionPa === 0 ? STOP_SHARE * spanPa : resolutionPa / 2;
    if (valuePa > rangeHighPa + nearPa) return 'aboveRange';
    if (valuePa > rangeHighPa - nearPa) return 'atHighStop';
  }
  if (rangeLowPa !== undefined) {
    const spanPa = (rangeHighPa ?? rangeLowPa) - rangeLowPa;
    const nearPa = resolutionPa === undefined || resolutionPa === 0 ? STOP_SHARE * spanPa : resolutionPa / 2;
    if (valuePa < rangeLowPa - nearPa) return 'belowRange';
    if (valuePa < rangeLowPa + nearPa) return 'atLowStop';
  }
  return null;
}

function doubtOfModel(valuePa: number, expected: ExpectedReading | undefined): Doubt | null {
  if (expected === undefined) return null;
  const { dialPa } = expected;
  const withinPa = valuePa >= dialPa ? expected.abovePa : expected.belowPa;
  if (dialPa > LEAST_EXPECTED_PA && valuePa > TIMES_EXPECTED * dialPa) return 'farAboveExpected';
  if (withinPa === undefined || withinPa === 0) return null;
  const off = Math.abs(valuePa - dialPa) / withinPa;
  if (off >= DISAGREES) return 'farOff';
  return off > 1 ? 'off' : null;
}
