import { readFileSync } from 'node:fs';
import type { Signature } from '@riseback/contracts';
import { FORMAT, fromFile, type NetworkFile, readNetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { parse } from 'csv-parse/sync';
import { strFromU8, unzipSync } from 'fflate';
import readWorkbook from 'read-excel-file/node';
import { describe, expect, it } from 'vitest';
import { listContext } from '../../apps/web/src/app/lists/list-context';
import { ELEMENT_LISTS, type ListId } from '../../apps/web/src/app/lists/list-definitions';
import { makeCsv } from '../../server/src/reports/exports/make-csv';
import { makeJson } from '../../server/src/reports/exports/make-json';
import { makeXlsx } from '../../server/src/reports/exports/make-xlsx';
import { reportTables } from '../../server/src/reports/exports/report-tables';
import type { FrozenState, PreviousRevision, ReportContent } from '../../server/src/reports/report-content';
import { caseIdsOf, solveCases } from '../../server/src/solve/solve-cases';

/** Exact by definition: the international pound and foot, and standard gravity in the pound-force. */
const PA_PER_PSI = (0.45359237 * 9.80665) / 0.0254 ** 2;
const KG_S_PER_LB_H = 0.45359237 / 3600;
const M_PER_FT = 0.3048;

const TERN_QUAY = readFile(
  JSON.parse(readFileSync(new URL('../fixtures/tern-quay.json', import.meta.url), 'utf8')) as object,
);
const HASH = 'a'.repeat(64);

type Cell = string | number | null;

describe('the report as a workbook', () => {
  it('read back equals the lists of the screen, in both systems of units', async () => {
    for (const units of ['us', 'si'] as const) {
      const content = working(TERN_QUAY, { units });
      const sheets = await sheetsOf(content);
      let compared = 0;
      for (const { caseId } of content.outcomes) {
        for (const id of Object.keys(SHEETS_OF_LISTS) as ListId[])
          compared += expectAsListed(content, caseId, id, sheets);
      }
      // 30 traps with 15 filled cells and more, 46 pipes with 18 and more, in three cases
      expect(compared).toBeGreaterThan(3 * (30 * 15 + 46 * 18));
    }
  });

  it('has the numbers of the file, turned into pounds, feet and psi by hand', async () => {
    const { site, nodes, pipes } = TERN_QUAY;
    const sheets = await sheetsOf(working(TERN_QUAY));
    const gauge = (pa: number) => (pa - site.atmosphericPressurePa) / PA_PER_PSI;
    const traps = records(sheets, 'Traps');
    for (const node of nodes) {
      if (node.kind !== 'trap') continue;
      const row = traps.find(({ Id }) => Id === node.id);
      expectNear(row?.['Inlet, psig'], gauge(node.inletPressurePa));
      expectNear(row?.['Load, lb/h'], node.loadKgS / KG_S_PER_LB_H);
      expectNear(row?.['Elevation, ft'], node.elevationM / M_PER_FT);
    }
    const listed = records(sheets, 'Pipes');
    expect(listed).toHaveLength(pipes.length);
    for (const pipe of pipes) {
      expectNear(listed.find(({ Id }) => Id === pipe.id)?.['Length, ft'], pipe.lengthM / M_PER_FT);
    }
  });

  it('has the back pressure of every trap in every case, and what it is made of', async () => {
    const content = working(TERN_QUAY);
    const rows = records(await sheetsOf(content), 'Trap results');
    const gauge = (pa: number) => (pa - TERN_QUAY.site.atmosphericPressurePa) / PA_PER_PSI;
    let compared = 0;
    for (const outcome of content.outcomes) {
      if (outcome.status === 'refused') continue;
      const caseName = TERN_QUAY.cases.find(({ id }) => id === outcome.caseId)?.name;
      for (const trap of outcome.result.traps) {
        const row = rows.find(({ Id, Case }) => Id === trap.id && Case === caseName);
        expectNear(row?.['Back, psig'], gauge(trap.backPressurePa));
        expectNear(row?.['Differential, psi'], trap.differentialPa / PA_PER_PSI);
        // the account adds up in the reader's units as it does in SI: 1 Pa is 0.00015 psi
        const parts = ['Receiver or vessel, psig', 'Static, psi', 'Friction, psi', 'Flash, psi'].map((key) =>
          Number(row?.[key]),
        );
        expect(Math.abs(parts.reduce((sum, part) => sum + part, 0) - Number(row?.['Back, psig']))).toBeLessThan(2e-4);
        compared += 1;
      }
    }
    expect(compared).toBe(90);
  });

  it('shows each number with the decimals of the screen', async () => {
    const content = working(TERN_QUAY);
    const table = reportTables(content).find(({ name }) => name === 'Trap results');
    const back = table?.columns.findIndex(({ title }) => title === 'Back') ?? -1;
    const backs = content.outcomes.flatMap((outcome) => (outcome.status === 'solved' ? outcome.result.traps : []));
    const units: DisplayUnits = { system: 'us', atmosphericPressurePa: TERN_QUAY.site.atmosphericPressurePa };
    const printed = new Set(backs.map(({ backPressurePa }) => formatQuantity(backPressurePa, 'pressure', units)));
    for (const row of table?.rows ?? []) {
      const cell = row[back];
      if (typeof cell !== 'object' || !('number' in cell)) throw new Error('a back pressure is no number');
      expect(printed).toContain(cell.number.toFixed(cell.decimals));
    }
    const xml = xmlOf(await makeXlsx(content, () => undefined, new AbortController().signal));
    expect(xml('xl/styles.xml')).toContain('formatCode="#,##0.0"');
  });

  it('holds no formula, whatever things are called', async () => {
    const hostile = ['=1+1', '+1', '-2', '@SUM(A1)', "'=1", '=HYPERLINK("http://x","y")'];
    const file = readFile({
      ...small(),
      nodes: small().nodes.map((node, i) => ({
        ...node,
        tag: hostile[i] ?? 'J',
        note: hostile[i + 2] ?? '',
        area: 'a\u0001b',
      })),
    });
    const workbook = await makeXlsx(working(file), () => undefined, new AbortController().signal);
    const xml = xmlOf(workbook);
    const sheets = Object.keys(unzipSync(workbook)).filter((name) => name.startsWith('xl/worksheets/sheet'));
    for (const name of sheets) expect(xml(name)).not.toMatch(/<f[ >]/);
    const cells = (await readWorkbook(workbook)).flatMap(({ data }) => (data as Cell[][]).flat());
    expect(cells).toContain("'=1+1");
    expect(cells.filter((cell) => typeof cell === 'string' && /^[=+\-@\t\r]/.test(cell))).toEqual([]);
  });

  it('has sheets with names that every spreadsheet takes', async () => {
    const names = (
      await readWorkbook(await makeXlsx(frozen(TERN_QUAY), () => undefined, new AbortController().signal))
    ).map(({ sheet }) => sheet);
    expect(new Set(names).size).toBe(names.length);
    for (const name of names) expect(name).toMatch(/^[^\\/?*[\]:']{1,31}$/);
    expect(names[0]).toBe('Cover');
  });

  it('says on every sheet and in every other file how it stands', async () => {
    const signal = new AbortController().signal;
    for (const [content, words] of [
      [working(TERN_QUAY), 'DRAFT'],
      [frozen(TERN_QUAY, { state: 'superseded' }), 'SUPERSEDED'],
      [frozen(TERN_QUAY, { presentEngineVersion: '9.9' }), 'STALE'],
    ] as const) {
      for (const { data } of await readWorkbook(await makeXlsx(content, () => undefined, signal))) {
        expect(String((data as Cell[][])[0]?.[0])).toContain(words);
      }
      expect((await makeJson(content, () => undefined, signal)).toString()).toContain(words);
      const cover = Object.entries(unzipSync(await makeCsv(content, () => undefined, signal)))[0]?.[1];
      expect(strFromU8(cover ?? new Uint8Array())).toContain(words);
    }
  });

  it('tells the course of a revision and who signed it', async () => {
    const by = { personId: 'p', personName: 'Ada Reader', at: '2026-03-02T09:30:00.000Z' };
    const hashes = { statement: '{}', statementHash: HASH, auditHead: HASH, signature: 'AA==', keyId: 'k1' };
    const signature: Signature = { ...by, ...hashes, seq: 1, meaning: 'approved', role: 'reviewer' };
    const events = [{ ...by, seq: 2, state: 'returned', note: 'Riser too small' }] as const;
    const rows = records(await sheetsOf(frozen(TERN_QUAY, { events, signatures: [signature] })), 'Cover');
    const told = (what: string) => rows.filter(({ What }) => What === what).map(({ Value }) => String(Value));
    expect(told('Course')[0]).toMatch(/^Returned, 2 Mar 2026, 09:30 UTC, Ada Reader: Riser too small$/);
    expect(told('Signature')[0]).toMatch(/^Approved by Ada Reader, reviewer, 2 Mar 2026, 09:30 UTC; key k1$/);
  });

  it('says plainly that nothing changed', async () => {
    const sheets = await sheetsOf(frozen(smallNetwork(), {}, previous(smallNetwork())));
    expect(records(sheets, 'Changed inputs').map(({ List }) => List)).toEqual(['Nothing changed']);
  });

  it('tells a case without a solution as such, and goes on with the others', async () => {
    const sheets = await sheetsOf(working(refusedFile()));
    const rows = records(sheets, 'Trap results');
    expect(rows.map(({ State }) => State)).toEqual(['Case not solved']);
    expect(rows[0]?.['Back, psig']).toBeNull();
    expect(records(sheets, 'Findings').map(({ Check }) => Check)).toContain('Case not solved');
  });
});

describe('the report as tables packed in a zip', () => {
  it('reads by RFC 4180 as what the workbook holds, line ends and quotes within cells included', async () => {
    const file = readFile({
      ...small(),
      nodes: small().nodes.map((node) => ({ ...node, note: 'one, "two"\r\nthree' })),
    });
    const content = working(file);
    const sheets = [...(await sheetsOf(content)).values()];
    const files = Object.entries(unzipSync(await makeCsv(content, () => undefined, new AbortController().signal)));
    expect(files).toHaveLength(sheets.length);
    for (const [index, [name, bytes]] of files.entries()) {
      expect(name).toMatch(/^\d\d-[a-z0-9-]+-not-approved\.csv$/);
      // a decoder would take the mark away
      const text = Buffer.from(bytes).toString('utf8');
      expect(text.startsWith('\uFEFF')).toBe(true);
      const rows = parse(text, { bom: true, relaxColumnCount: false });
      const [, ...sheet] = sheets[index] ?? [];
      // a spreadsheet keeps a line feed where a text has both marks
      const plain = (cells: readonly Cell[]) => cells.map((cell) => String(cell ?? '').replaceAll('\r', ''));
      expect(rows.map(plain)).toEqual(sheet.map(plain));
    }
  });

  it('is the same file for the same content', async () => {
    const make = () => makeCsv(working(smallNetwork()), () => undefined, new AbortController().signal);
    expect((await make()).equals(await make())).toBe(true);
  });
});

describe('the report as JSON', () => {
  it('carries the network, its results in SI and the hashes', async () => {
    const content = frozen(TERN_QUAY);
    const report = JSON.parse(
      (await makeJson(content, () => undefined, new AbortController().signal)).toString(),
    ) as Record<string, unknown>;
    expect(report).toMatchObject({ format: 'riseback-report', version: 1, hashes: { file: HASH, results: HASH } });
    expect(readFile(report['network'] as object)).toEqual(TERN_QUAY);
    expect(report['outcomes']).toEqual(JSON.parse(JSON.stringify(content.outcomes)));
  });
});

describe('what changed since the revision before', () => {
  it('tells added, removed and changed inputs, and what they did to each trap, the greatest effect first', async () => {
    const after = readFile({
      ...small(),
      nodes: small().nodes.map((node) => (node.id === 'T1' ? { ...node, loadKgS: 0.1, tag: 'TR-9' } : node)),
      pipes: small().pipes.map((pipe) => (pipe.id === 'L2' ? { ...pipe, size: { nps: '2', schedule: '40' } } : pipe)),
      method: { friction: 'friedel' },
    });
    const sheets = await sheetsOf(
      frozen(after, {}, previous(readFile({ ...small(), gauges: [{ id: 'G1', node: 'J1', elevationM: 3 }] }))),
    );
    const inputs = records(sheets, 'Changed inputs').map((row) => [
      row['List'],
      row['What'],
      row['Property'],
      row['Before'],
      row['After'],
    ]);
    expect(inputs).toContainEqual(['Gauges', 'Removed', null, null, null]);
    expect(inputs).toContainEqual(['Traps', 'Changed', 'Tag', 'TR-1', 'TR-9']);
    expect(inputs).toContainEqual(['Pipes', 'Changed', 'Size, in', '1', '2']);
    expect(inputs).toContainEqual(['Method', 'Changed', 'Value', 'Flash vapour (dry returns)', 'Friedel']);
    const load = inputs.find(([, , property]) => property === 'Load, lb/h');
    expectNear(load?.[3], 0.05 / KG_S_PER_LB_H);
    expectNear(load?.[4], 0.1 / KG_S_PER_LB_H);
    const [result] = records(sheets, 'Changed results');
    expect(Number(result?.['Back after, psig']) - Number(result?.['Back before, psig'])).toBeCloseTo(
      Number(result?.['Change, psi']),
      9,
    );
  });
});

/** What the screen's list prints and saves, against the sheet of that name. */
const SHEETS_OF_LISTS = {
  traps: ['Traps', 'Trap results'],
  pipes: ['Pipes', 'Pipe results'],
  junctions: ['Junctions', 'Node results'],
  vessels: ['Vessels & receivers', 'Node results'],
  'pumped-inlets': ['Pumped inlets', 'Node results'],
  gauges: ['Gauges'],
  'trap-models': ['Trap models'],
} as const satisfies Record<ListId, readonly string[]>;
/** Told as two numbers in the report. */
const BANDS = ['Credible', 'Spread'];

function expectAsListed(
  content: ReportContent,
  caseId: string,
  id: ListId,
  sheets: ReadonlyMap<string, Cell[][]>,
): number {
  let compared = 0;
  const list = ELEMENT_LISTS.find((each) => each.id === id);
  if (list === undefined) throw new Error(`no list ${id}`);
  const { table, block } = list;
  const context = contextOf(content, caseId);
  const ids = table(context).ids;
  const { fields, sheet } = block(context);
  const [inputs, results] = SHEETS_OF_LISTS[id];
  const caseName = content.file.cases.find((each) => each.id === caseId)?.name ?? 'As drawn';
  for (const { key, title, result } of fields) {
    if (result && BANDS.includes(title)) continue;
    const [[listedHead] = [], ...listed] = sheet([key], ids);
    const of = records(sheets, result ? (results ?? inputs) : inputs);
    for (const [row, elementId] of ids.entries()) {
      const record = of.find(({ Id, Case }) => Id === elementId && (!result || Case === caseName));
      const head = String(listedHead).replace('Result: ', '');
      const found = record?.[head] ?? record?.[`${head}, in`] ?? null;
      const expected = listed[row]?.[0] ?? null;
      if (expected !== null) compared += 1;
      const where = `${id}, ${elementId}, ${head}`;
      if (typeof expected === 'number') {
        expect(typeof found, where).toBe('number');
        expect(Math.abs(Number(found) - expected), where).toBeLessThan(1e-9 * Math.max(1, Math.abs(expected)));
      } else expect(found, where).toBe(expected);
    }
  }
  return compared;
}

function contextOf({ file, outcomes, reader }: ReportContent, caseId: string): ReturnType<typeof listContext> {
  const document = fromFile(file);
  const outcome = outcomes.find((each) => each.caseId === caseId) ?? null;
  const result = outcome?.status === 'solved' ? outcome.result : null;
  const byId = <T extends { id: string }>(items: readonly T[] = []) => new Map(items.map((item) => [item.id, item]));
  return listContext({
    document,
    units: { system: reader.units, atmosphericPressurePa: file.site.atmosphericPressurePa },
    topology: [],
    outcome,
    result,
    traps: byId(result?.traps),
    pipes: byId(result?.pipes),
    nodes: byId(result?.nodes),
  });
}

async function sheetsOf(content: ReportContent): Promise<Map<string, Cell[][]>> {
  const sheets = await readWorkbook(await makeXlsx(content, () => undefined, new AbortController().signal));
  return new Map(sheets.map(({ sheet, data }) => [sheet, data as Cell[][]]));
}

/** The rows of a sheet by their headings, which stand under the line that says how the report stands. */
function records(sheets: ReadonlyMap<string, Cell[][]>, name: string): Record<string, Cell>[] {
  const [, head = [], ...rows] = sheets.get(name) ?? [];
  return rows.map((row) => Object.fromEntries(head.map((title, i) => [String(title), row[i] ?? null])));
}

function expectNear(found: Cell | undefined, expected: number): void {
  expect(typeof found).toBe('number');
  // twelve digits are kept of every number
  expect(relativeError(Number(found), expected)).toBeLessThan(1e-10);
}

function xmlOf(workbook: Buffer): (name: string) => string {
  const entries = unzipSync(workbook);
  return (name) => strFromU8(entries[name] ?? new Uint8Array());
}

function working(file: NetworkFile, { units = 'us' }: { units?: DisplayUnits['system'] } = {}): ReportContent {
  return {
    siteName: 'Tern Quay Cannery',
    networkName: file.name,
    paper: 'a4',
    reader: { name: 'Ada Reader', units, timeZone: 'UTC' },
    madeAt: '2026-03-01T08:00:00.000Z',
    state: { kind: 'working', version: 12, changedAt: '2026-03-01T07:00:00.000Z', changedByName: 'Ivo Drawer' },
    file,
    fileHash: HASH,
    solverHash: HASH,
    engineVersion: '1.0',
    outcomes: solveCases({ file, caseIds: caseIdsOf(file), partial: true, bands: true }),
    ledgersOf: [],
  };
}

function frozen(file: NetworkFile, state: Partial<FrozenState> = {}, before?: PreviousRevision): ReportContent {
  return {
    ...working(file),
    ...(before === undefined ? {} : { previous: before }),
    state: {
      kind: 'revision',
      id: 'r2',
      letter: 'B',
      title: 'For review',
      reason: 'First issue',
      state: 'approved',
      version: 12,
      createdAt: '2026-03-01T07:00:00.000Z',
      createdByName: 'Ivo Drawer',
      resultsHash: HASH,
      events: [],
      signatures: [],
      editsSince: 0,
      presentEngineVersion: '1.0',
      ...state,
    },
  };
}

function previous(file: NetworkFile): PreviousRevision {
  const { outcomes, engineVersion } = working(file);
  const facts = { letter: 'A', title: 'Before', state: 'superseded', createdAt: '2026-02-01T07:00:00.000Z' } as const;
  return { ...facts, engineVersion, file, outcomes };
}

/** One trap that lifts into one receiver. */
function small() {
  return {
    format: FORMAT,
    version: 1,
    name: 'Small',
    nodes: [
      { id: 'T1', kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
      { id: 'J1', kind: 'junction', elevationM: 3.048 },
      { id: 'R1', kind: 'receiver', elevationM: 3.048, pressurePa: 101_325 },
    ],
    pipes: [
      { id: 'L1', from: 'T1', to: 'J1', lengthM: 6, size: { nps: '1', schedule: '40' } },
      { id: 'L2', from: 'J1', to: 'R1', lengthM: 30, size: { nps: '1', schedule: '40' } },
    ],
  };
}

function smallNetwork(): NetworkFile {
  return readFile(small());
}

/** Probable discharges cannot be told in a loop, so its case is refused. */
function refusedFile(): NetworkFile {
  const { nodes, pipes, ...head } = small();
  return readFile({
    ...head,
    method: { coincidence: 'probable' },
    nodes: [...nodes, { id: 'J2', kind: 'junction', elevationM: 3.048 }],
    pipes: [
      ...pipes,
      { id: 'L3', from: 'J1', to: 'J2', lengthM: 5, size: { nps: '1', schedule: '40' } },
      { id: 'L4', from: 'J2', to: 'R1', lengthM: 5, size: { nps: '1', schedule: '40' } },
    ],
  });
}

function readFile(file: object): NetworkFile {
  const read = readNetworkFile(file);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}
