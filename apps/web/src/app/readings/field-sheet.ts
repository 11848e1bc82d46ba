import type { Gauge } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';

/** What a gauge's dial should show in one case, and between what it agrees. Gauge pressure, as on the dial. */
export interface ExpectedReading {
  readonly dialPa: number;
  /** So far above and below |E_n| is at most 1; absent where the gauge's accuracy is not known. */
  readonly abovePa?: number;
  readonly belowPa?: number;
}

/** One gauge of the walk. */
export interface GaugeCard {
  readonly gauge: Gauge;
  readonly name: string;
  /** Where it stands, in words. */
  readonly place: string;
  /** '' where its element has none. */
  readonly area: string;
  /** By case; a case without an entry has no solution there. */
  readonly expected: Readonly<Record<string, ExpectedReading>>;
}

export interface CaseChoice {
  /** '' is the plain network. */
  readonly id: string;
  readonly name: string;
}

/** All that the walk through the plant needs, as it is kept on the device for where there is no signal. */
export interface FieldSheet {
  readonly personId: string;
  readonly networkId: string;
  readonly networkName: string;
  readonly networkVersion: number;
  /** May this person take readings here? */
  readonly mayRead: boolean;
  readonly units: DisplayUnits;
  readonly timeZone: string;
  readonly cases: readonly CaseChoice[];
  /** In the order of the walk. */
  readonly cards: readonly GaugeCard[];
  /** When it was put together. */
  readonly at: string;
}
