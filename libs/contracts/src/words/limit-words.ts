/** What each limit bounds, by the check's code and the limit's key. */
export const LIMIT_WORDS: Readonly<Record<string, string>> = {
  'backPressureFraction.watchFraction': 'Watch above',
  'backPressureFraction.failFraction': 'Fail above',
  'backPressureFraction.minimumInletGaugePa': 'Least inlet',
  'velocity.watchMS': 'Flashing: watch above',
  'velocity.failMS': 'Flashing: fail above',
  'velocity.liquidMS': 'Liquid: watch above',
  'momentum.limitPa': 'Fail above',
  'gradient.flashingPaM': 'Flashing: watch above',
  'gradient.liquidPaM': 'Liquid: watch above',
  'thermalShock.limitK': 'Watch above',
  'stall.watchMargin': 'Watch within',
};
