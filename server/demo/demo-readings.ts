import type { CaseOutcome, WhyNotRead } from '@riseback/contracts';
import { predictedAtGauge, readingExpected, type PredictedResult } from '@riseback/diagnosis';
import { toFile, type Gauge, type NetworkDocument, type NetworkFile } from '@riseback/network';
import type { Database } from '../src/platform/db/database';
import type { ReadingRow } from '../src/readings/reading-repository';
import { recordClosing, recordReading, recordRound } from '../src/readings/round-records';
import { RoundRepository } from '../src/readings/round-repository';
import type { DemoPersonHere } from './demo-revisions';

/** One gauge of one round: how far off its dial was, as a share of what its grade allows, or why it could not be read. */
interface DemoDial {
  readonly error: number;
  readonly whyNot?: WhyNotRead;
  readonly note?: string;
  /** Entered first, and corrected a minute later. */
  readonly mistypedPa?: number;
}

interface DemoRound {
  readonly daysAgo: number;
  readonly title: string;
  /** How the plant really was. */
  readonly truth: string;
  /** By gauge. Invented: each gauge has its own bias within its grade and trembles a little from week to week. */
  readonly dials: Readonly<Record<string, DemoDial>>;
}

/** What the round says of how the plant is run. */
const SAID = 'design';

/** A month of weekly rounds. Before the last of them RT-5's trap has failed open, which nobody knows. */
const ROUNDS: readonly DemoRound[] = [
  {
    ...{ daysAgo: 29, title: 'All traps looked over', truth: 'design' },
    dials: dialsOf([0.45, -0.2, -0.2, -0.6, 0.1, 0.25]),
  },
  {
    ...{ daysAgo: 22, title: '', truth: 'design' },
    dials: dialsOf([0.35, -0.3, -0.25, -0.58, 0.2, 0.15]),
  },
  {
    ...{ daysAgo: 15, title: '', truth: 'design' },
    dials: dialsOf([0.75, -0.25, -0.18, -0.62, 0.05, 0.3], {
      G3: { mistypedPa: 220_632, note: 'Entered as 32 psig first.' },
    }),
  },
  {
    ...{ daysAgo: 8, title: '', truth: 'design' },
    dials: dialsOf([0.4, -0.15, -0.22, -0.59, 0.15, 0.2]),
  },
  {
    ...{ daysAgo: 1, title: '', truth: 'rt5open' },
    dials: dialsOf([0.45, -0.2, -0.2, -0.6, 0.1, 0.25], {
      G1: { note: 'Steady, and higher than it ever was. Drain of the hall hot to the hand guard.' },
      G2: { whyNot: 'noAccess', note: 'Scaffold before it.' },
    }),
  },
];

const DAY_MS = 24 * 3_600_000;
const MINUTE_MS = 60_000;
/** Of the day, UTC: a morning in the demo's time zone. */
const FIRST_READING_MS = 13 * 3_600_000;
/** The oldest round lies within; what it was read against is older. */
export const DEMO_AGE_MS = 36 * DAY_MS;

export interface DemoReadingParts {
  readonly db: Database;
  readonly newId: () => string;
  readonly now: () => Date;
  readonly siteId: string;
  readonly commissioning: DemoPersonHere;
}

/** What the rounds are read against, solved already in all its cases. */
export interface ReadNetwork {
  readonly networkId: string;
  readonly version: number;
  readonly document: NetworkDocument;
  readonly outcomes: readonly CaseOutcome[];
}

/** The rounds, each with readings of all gauges. Part of the transaction that the caller holds. */
export function seedReadings(parts: DemoReadingParts, network: ReadNetwork): void {
  const file = toFile(network.document);
  const rounds = new RoundRepository(parts.db);
  const deviceId = parts.newId();
  let deviceSeq = 0;
  for (const round of ROUNDS) {
    const walk = new Walk(parts, rounds, startOf(round, parts.now()));
    const id = walk.begin(network, round.title);
    const result = resultOf(network.outcomes, round.truth);
    for (const gauge of file.gauges) {
      const { error, whyNot, note = '', mistypedPa } = dialOf(round, gauge.id);
      const seen =
        whyNot === undefined
          ? { valuePa: dialShows(file, result, gauge, error), whyNot: null }
          : { valuePa: null, whyNot };
      const numbered = () => ({ deviceId, deviceSeq: (deviceSeq += 1) });
      const mistyped =
        mistypedPa === undefined
          ? null
          : walk.take(id, gauge, { ...numbered(), valuePa: mistypedPa, whyNot: null, note: '', replaces: null });
      walk.take(id, gauge, { ...numbered(), ...seen, note, replaces: mistyped });
    }
    walk.close(id);
  }
}

/** One way through the plant, a minute or two from gauge to gauge. */
class Walk {
  constructor(
    private readonly parts: DemoReadingParts,
    private readonly rounds: RoundRepository,
    private timeMs: number,
  ) {}

  /** @returns the round's id */
  begin({ networkId, version }: ReadNetwork, title: string): string {
    const id = this.parts.newId();
    const startedAt = this.at().toISOString();
    const personId = this.parts.commissioning.id;
    const row = { id, networkId, networkVersion: version, caseId: SAID, title, personId, startedAt, closedAt: null };
    recordRound(this.rounds, row, this.by());
    return id;
  }

  /** @returns the reading's id */
  take(
    roundId: string,
    gauge: Gauge,
    seen: Pick<ReadingRow, 'valuePa' | 'whyNot' | 'note' | 'replaces' | 'deviceId' | 'deviceSeq'>,
  ): string {
    this.timeMs += (seen.replaces === null ? 2 : 1) * MINUTE_MS;
    const [id, at, personId] = [this.parts.newId(), this.at().toISOString(), this.parts.commissioning.id];
    const row = { id, roundId, gaugeId: gauge.id, gauge, ...seen, takenAt: at, receivedAt: at, personId };
    recordReading(this.rounds, row, this.by());
    return id;
  }

  close(id: string): void {
    this.timeMs += MINUTE_MS;
    recordClosing(this.rounds, id, this.at().toISOString(), this.by());
  }

  private at(): Date {
    return new Date(this.timeMs);
  }

  private by() {
    return { at: this.at(), personId: this.parts.commissioning.id, siteId: this.parts.siteId };
  }
}

/** What the needle shows in that state of the plant: off by its error, held by its stop, and read to the dial's nearest mark. */
function dialShows(file: NetworkFile, result: PredictedResult, gauge: Gauge, error: number): number {
  const prediction = predictedAtGauge(file, result, gauge);
  const { rangeLowPa, rangeHighPa, accuracy, resolutionPa, tag } = gauge;
  if (prediction === undefined || rangeLowPa === undefined || rangeHighPa === undefined || !accuracy || !resolutionPa) {
    throw new Error(`the demo's gauge ${tag ?? gauge.id} lacks what its readings are made of`);
  }
  const expectedPa = readingExpected(prediction.pressurePa, gauge, prediction.tap.elevationM, file.site);
  const needlePa = expectedPa + error * accuracy * (rangeHighPa - rangeLowPa);
  const heldPa = Math.min(rangeHighPa, Math.max(rangeLowPa, needlePa));
  return Math.round(heldPa / resolutionPa) * resolutionPa;
}

function startOf({ daysAgo }: DemoRound, now: Date): number {
  const day = Math.floor((now.getTime() - daysAgo * DAY_MS) / DAY_MS);
  return day * DAY_MS + FIRST_READING_MS;
}

function resultOf(outcomes: readonly CaseOutcome[], caseId: string): PredictedResult {
  const outcome = outcomes.find((each) => each.caseId === caseId);
  if (outcome?.status !== 'solved') throw new Error(`the demo plant was not solved in the case ${caseId}`);
  // the contract's result is the solver's, but that an absent key may be undefined there
  const result = outcome.result as PredictedResult;
  // without bands: a dial shows a pressure, and to march them all along takes longer than all else here
  return { ...result, traps: result.traps.map(({ credible: _band, ...trap }) => trap) };
}

function dialOf({ dials }: DemoRound, gaugeId: string): DemoDial {
  const dial = dials[gaugeId];
  if (dial === undefined) throw new Error(`the demo has no readings of gauge ${gaugeId}`);
  return dial;
}

/** @param errors of G1, G2 and so on */
function dialsOf(
  errors: readonly number[],
  special: Readonly<Record<string, Partial<DemoDial>>> = {},
): Record<string, DemoDial> {
  return Object.fromEntries(
    errors.map((error, i) => {
      const id = `G${i + 1}`;
      return [id, { error, ...special[id] }];
    }),
  );
}
