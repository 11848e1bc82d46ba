import { REPORT_FORMATS } from '@riseback/contracts';
import { type NetworkFile, readNetworkFile } from '@riseback/network';
import type { ReportContent } from '../../server/src/reports/report-content';
import { REPORT_MAKERS } from '../../server/src/reports/report-makers';
import { caseIdsOf, solveCases } from '../../server/src/solve/solve-cases';
import { headers } from './bench-networks';

/** Of nodes and pipes together; half of them are pipes. */
const ELEMENTS = 500;
const CASES = ['Design', 'Start-up', 'Turndown'] as const;
const REPEATS = 3;
const GOALS_MS: Readonly<Record<string, number>> = { pdf: 5_000, xlsx: 2_000 };

/** What the reports of a plant of 500 elements in three cases cost beyond its solve, in each kind of file. */
export async function* reportBench(): AsyncGenerator<string> {
  const file = plant();
  const start = performance.now();
  const content = contentOf(file);
  const solveMs = performance.now() - start;
  yield `Reports of ${String(file.nodes.length + file.pipes.length)} elements in ${String(CASES.length)} cases (solved with bands in ${ms(solveMs)})`;
  for (const format of REPORT_FORMATS) {
    const times: number[] = [];
    let bytes = 0;
    for (let i = 0; i < REPEATS; i++) {
      const begun = performance.now();
      bytes = (await REPORT_MAKERS[format](content, () => undefined, new AbortController().signal)).length;
      times.push(performance.now() - begun);
    }
    const goal = GOALS_MS[format];
    yield `  ${format}: first ${ms(times[0] ?? NaN)}, then ${ms(Math.min(...times))}, ${(bytes / 1e6).toFixed(2)} MB${goal === undefined ? '' : ` (goal under ${ms(goal)})`}`;
  }
}

function plant(): NetworkFile {
  const cases = CASES.map((name, i) => ({ id: `c${String(i)}`, name, loadFactor: 1 - i / 4 }));
  const read = readNetworkFile({ ...headers('Report bench', ELEMENTS / 2), cases });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function contentOf(file: NetworkFile): ReportContent {
  const hash = '0'.repeat(64);
  return {
    siteName: 'Bench',
    networkName: file.name,
    paper: 'a4',
    reader: { name: 'Bench', units: 'us', timeZone: 'UTC' },
    madeAt: '2026-03-01T08:00:00.000Z',
    state: { kind: 'working', version: 1, changedAt: '2026-03-01T08:00:00.000Z', changedByName: 'Bench' },
    file,
    fileHash: hash,
    solverHash: hash,
    engineVersion: 'bench',
    outcomes: solveCases({ file, caseIds: caseIdsOf(file), partial: true, bands: true }),
    ledgersOf: file.nodes.flatMap(({ id, kind }) => (kind === 'trap' ? [id] : [])).slice(0, 10),
  };
}

function ms(time: number): string {
  return `${time.toFixed(0)} ms`;
}
