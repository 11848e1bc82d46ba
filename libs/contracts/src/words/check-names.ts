/** What screens and reports call the checks and findings, by code. */
export const CHECK_NAMES: Readonly<Record<string, string>> = {
  differential: 'Differential',
  capacity: 'Capacity',
  backPressureFraction: 'Back-pressure fraction',
  orificeRating: 'Orifice rating',
  bodyRating: 'Body rating',
  stall: 'Stall',
  velocity: 'Velocity',
  momentum: 'Momentum',
  gradient: 'Gradient',
  reversed: 'Reversed flow',
  vesselCannotDrain: 'Vessel cannot drain',
  noReceiver: 'No receiver',
  noSource: 'No source',
  cutOff: 'Cut off',
  loop: 'Loop',
  trapPipes: 'Pipes at a trap',
  receiverPipes: 'Pipes at a receiver',
  vesselPipes: 'Pipes at a vessel',
  selfPipe: 'Pipe to itself',
  zeroLength: 'No length',
  shorterThanRise: 'Shorter than its rise',
  routeLength: 'Route length',
  routeRise: 'Route rise',
  gaugePastEnd: 'Gauge past the end',
  gaugeRange: 'Beyond its scale',
  gaugeScale: 'Place on its scale',
  gaugeGrade: 'Too coarse to decide',
  gaugeCalibration: 'Calibration overdue',
  gaugeUnknown: 'Range or accuracy not given',
  refused: 'Case not solved',
  noSolution: 'No solution',
  leftOut: 'Left out',
};

/** A check's name; a code that is not known here yet is taken apart at its capitals. */
export function checkName(code: string): string {
  const name = Object.hasOwn(CHECK_NAMES, code) ? CHECK_NAMES[code] : undefined;
  if (name !== undefined) return name;
  const apart = code.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`).trim();
  return apart.charAt(0).toUpperCase() + apart.slice(1);
}
