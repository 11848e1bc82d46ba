import type { CaseOutcome, Network } from '@riseback/contracts';
import {
  measurementUncertainty,
  predictedAtGauge,
  predictionUncertainty,
  type PredictedResult,
  readingExpected,
} from '@riseback/diagnosis';
import { KIND_WORDS } from '@riseback/figures';
import { type Gauge, inOrder, type NetworkDocument, type NetworkFile, toFile } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { zonesOf } from '../comments/zones';
import { toDocument } from '../networks/stored-document';
import { nameOf } from '../shared/element-words';
import type { CaseChoice, ExpectedReading, FieldSheet, GaugeCard } from './field-sheet';
import { predictedResult } from './predicted-result';
import { areaOf, walkOrder } from './walk-order';

/** For whom a sheet is made, and how they like to see it. */
export interface SheetReader {
  readonly personId: string;
  readonly units: DisplayUnits;
  readonly timeZone: string;
}

/** Puts together what the walk needs: the gauges in order, where each stands, and what it should show in each case. */
export function makeSheet(
  network: Network,
  outcomes: readonly CaseOutcome[],
  { personId, units, timeZone }: SheetReader,
  at: string,
): FieldSheet {
  const document = toDocument(network.document);
  return {
    personId,
    networkId: network.id,
    networkName: network.name,
    networkVersion: network.version,
    mayRead: network.permissions.includes('readings'),
    units,
    timeZone,
    cases: casesOf(document),
    cards: gaugeCards(document, outcomes, units),
    at,
  };
}

/** The plain network counts as a case where there is no other. */
export function casesOf(document: NetworkDocument): readonly CaseChoice[] {
  const cases = inOrder(document.cases).map(([, { value }]) => ({ id: value.id, name: value.name }));
  return cases.length === 0 ? [{ id: '', name: 'As drawn' }] : cases;
}

export function gaugeCards(
  document: NetworkDocument,
  outcomes: readonly CaseOutcome[],
  units: DisplayUnits,
): readonly GaugeCard[] {
  const file = toFile(document);
  const zones = zonesOf(document);
  const solved = outcomes.flatMap((outcome) => (outcome.status === 'solved' ? [outcome] : []));
  return walkOrder(document).map((gauge) => ({
    gauge,
    name: nameOf(gauge),
    place: placeWords(document, gauge, zones, units),
    area: areaOf(document, gauge),
    expected: Object.fromEntries(
      solved.flatMap(({ caseId, result }) => {
        const expected = expectedReading(file, predictedResult(result), gauge);
        return expected === undefined ? [] : [[caseId, expected]];
      }),
    ),
  }));
}

/** What the dial should show, water leg and height allowed for, and how far off it may be either way. */
function expectedReading(file: NetworkFile, result: PredictedResult, gauge: Gauge): ExpectedReading | undefined {
  const prediction = predictedAtGauge(file, result, gauge);
  if (prediction === undefined) return undefined;
  const dialPa = readingExpected(prediction.pressurePa, gauge, prediction.tap.elevationM, file.site);
  const measurement = measurementUncertainty(gauge, file.site);
  if (measurement === undefined) return { dialPa };
  const sidePa = (side: 'above' | 'below') =>
    Math.hypot(measurement.expandedPa, predictionUncertainty(file, result, prediction, side).expandedPa);
  return { dialPa, abovePa: sidePa('above'), belowPa: sidePa('below') };
}

function placeWords(
  document: NetworkDocument,
  gauge: Gauge,
  zones: ReadonlyMap<string, string>,
  units: DisplayUnits,
): string {
  const zone = zones.get(gauge.node ?? gauge.pipe ?? '');
  const within = zone === undefined ? '' : `, zone ${zone}`;
  const node = document.nodes.get(gauge.node ?? '')?.value;
  if (node !== undefined) {
    return `${capital(KIND_WORDS[node.kind])} ${nameOf(node)}${within}`;
  }
  const pipe = document.pipes.get(gauge.pipe ?? '')?.value;
  if (pipe === undefined) return '';
  const along = formatQuantity(gauge.distanceM ?? 0, 'length', units, { withUnit: true });
  return `Pipe ${nameOf(pipe)}, ${along} along it${within}`;
}

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
