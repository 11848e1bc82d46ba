import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { CaseOutcome, REVISION_STATES } from '@riseback/contracts';
import { fileCanonicalText, type NetworkFile, readNetworkFile } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { beforeAll, describe, expect, it } from 'vitest';
import * as z from 'zod';
import { makePdf } from '../../server/src/reports/pdf/make-pdf';
import type { FrozenState, ReportContent } from '../../server/src/reports/report-content';
import { caseIdsOf, solveCases } from '../../server/src/solve/solve-cases';
import { readPdf, type ReadPdf } from './pdf-reading';

const plant = fileOf(JSON.parse(readFileSync(new URL('../fixtures/tern-quay.json', import.meta.url), 'utf8')));
const AT = '2026-03-01T08:00:00.000Z';
const FROZEN: FrozenState = {
  kind: 'revision',
  id: 'r',
  letter: 'B',
  title: 'Second',
  reason: 'A larger header',
  state: 'approved',
  version: 4,
  createdAt: AT,
  createdByName: 'Dee Signer',
  resultsHash: 'c'.repeat(64),
  events: [],
  signatures: [],
  editsSince: 0,
  presentEngineVersion: '1',
};

function fileOf(json: unknown): NetworkFile {
  const read = readNetworkFile(json);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function contentOf(file: NetworkFile, more: Partial<ReportContent> = {}): ReportContent {
  const solved = solveCases({ file, caseIds: caseIdsOf(file), partial: true, bands: false });
  return {
    siteName: 'Quay',
    networkName: file.name,
    paper: 'a4',
    reader: { name: 'Ines Keel', units: 'us', timeZone: 'Europe/London' },
    madeAt: AT,
    state: { kind: 'working', version: 3, changedAt: AT, changedByName: 'Dee Signer' },
    file,
    fileHash: createHash('sha256').update(fileCanonicalText(file)).digest('hex'),
    solverHash: 'b'.repeat(64),
    engineVersion: '1',
    outcomes: z.array(CaseOutcome).parse(JSON.parse(JSON.stringify(solved))),
    ledgersOf: [],
    ...more,
  };
}

async function pdfOf(content: ReportContent): Promise<ReadPdf> {
  return readPdf(await makePdf(content, () => undefined, new AbortController().signal));
}

function small(change: object): NetworkFile {
  return fileOf({
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.05 },
      { id: 'R1', kind: 'receiver', elevationM: 3, vented: true },
    ],
    pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 10, insideDiameterM: 0.025 }],
    ...change,
  });
}

describe.each(['us', 'si'] as const)('the report of a plant in %s units', (system) => {
  let content: ReportContent;
  let pdf: ReadPdf;
  beforeAll(async () => {
    content = contentOf(plant, { reader: { name: 'Ines Keel', units: system, timeZone: 'Europe/London' } });
    pdf = await pdfOf(content);
  });

  it('tells of every trap in every case what the screen tells', () => {
    const units = { system, atmosphericPressurePa: plant.site.atmosphericPressurePa };
    const lines = pdf.pages.flat();
    for (const outcome of content.outcomes) {
      if (outcome.status === 'refused') continue;
      const caseName = plant.cases.find(({ id }) => id === outcome.caseId)?.name ?? '';
      const from = lines.indexOf(`Trap results: ${caseName}`);
      expect(from, caseName).toBeGreaterThan(0);
      for (const trap of outcome.result.traps) {
        const node = plant.nodes.find(({ id }) => id === trap.id);
        const back = formatQuantity(trap.backPressurePa, 'pressure', units);
        const differential = formatQuantity(trap.differentialPa, 'pressureDifference', units);
        const parts = [trap.staticPa, trap.frictionPa, trap.flashPa].map((pa) =>
          formatQuantity(pa, 'pressureDifference', units),
        );
        const line = lines.slice(from).find((text) => text.startsWith(`${node?.tag ?? trap.id} ${back} `));
        expect(line, `${trap.id} in ${caseName}`).toContain(` ${differential} `);
        expect(line).toContain(` ${parts.join(' ')} `);
      }
    }
  });

  it('bears the hash of its inputs and its number on every page, and says on each that it is a draft', () => {
    pdf.pages.forEach((lines, index) => {
      const page = lines.join('\n');
      expect(page).toContain(`Inputs, SHA-256 ${content.fileHash}`);
      expect(page).toContain(`Page ${String(index + 1)} of ${String(pdf.pages.length)}`);
      expect(lines[0]).toContain('DRAFT: the network as it stands at version 3');
      expect(page).toContain('does not replace local codes');
    });
  });

  it('has its parts in order', () => {
    const heads = ['Calculation report', 'Scope and cautions', 'Drawing, case Design', 'Inputs', 'Method', 'Results'];
    const last = ['Lift and ledger: ', 'Findings'];
    const firsts = pdf.pages.map((lines) => lines[1] ?? '');
    const places = [...heads, ...last].map((head) => firsts.findIndex((line) => line.startsWith(head)));
    expect(places.every((place) => place >= 0)).toBe(true);
    expect(places).toEqual(places.toSorted((a, b) => a - b));
  });

  it('repeats the head of a table that runs over pages', () => {
    const traps = pdf.pages.filter((lines) => lines.some((line) => line.startsWith('Tag Type Model')));
    expect(traps.length).toBeGreaterThan(1);
  });

  it('is tagged: headings, paragraphs, tables and figures, in English', () => {
    expect(pdf.tagged).toBe(true);
    expect(pdf.language).toBe('en');
    for (const role of ['Document', 'H1', 'H2', 'P', 'Table', 'TR', 'TH', 'TD', 'Figure', 'Formula']) {
      expect(pdf.structure).toContain(role);
    }
  });

  it('adds up in its ledgers as printed', () => {
    const lines = pdf.pages.find((page) => page[1]?.startsWith('Lift and ledger') === true) ?? [];
    const number = (text: string) => (text === '–' ? 0 : Number(text.replaceAll(',', '').replace('−', '-')));
    const closing = lines.find((line) => / Back pressure \d/.test(line))?.split(' ') ?? [];
    const [lift, friction, flash, running] = closing.slice(-6, -2).map(number);
    const opening = number((lines.find((line) => line.includes('Opening: ')) ?? '').split(' ').at(-1) ?? '');
    const sum = opening + (lift ?? NaN) + (friction ?? NaN) + (flash ?? NaN);
    expect(Math.abs(sum - (running ?? NaN))).toBeLessThan(1e-9);
  });
});

describe('how a report stands', () => {
  const words: Readonly<Record<(typeof REVISION_STATES)[number], string>> = {
    draft: 'DRAFT: revision B',
    underReview: 'NOT APPROVED: revision B',
    returned: 'NOT APPROVED: revision B',
    approved: 'Revision B, approved',
    superseded: 'SUPERSEDED: revision B',
    withdrawn: 'WITHDRAWN: revision B',
  };
  it.each(REVISION_STATES)('is said on each page: %s', async (state) => {
    const { pages } = await pdfOf(contentOf(small({}), { state: { ...FROZEN, state } }));
    for (const lines of pages) expect(lines[0]).toContain(words[state]);
  });

  it('tells who did what and signed, and what seals it', async () => {
    const by = { personId: 'p', personName: 'Rhea Quill', at: AT };
    const statement = {
      statement: '{}',
      statementHash: 'd'.repeat(64),
      auditHead: '1 e',
      signature: 'AA==',
      keyId: 'f'.repeat(64),
    };
    const state: FrozenState = {
      ...FROZEN,
      events: [{ ...by, seq: 1, state: 'approved', note: 'Good' }],
      signatures: [{ ...by, ...statement, seq: 1, meaning: 'approved', role: 'reviewer' }],
    };
    const { pages } = await pdfOf(contentOf(small({}), { state }));
    const cover = pages[0]?.join(' ') ?? '';
    expect(cover).toContain('Approved by Rhea Quill: Good');
    expect(cover).toContain('Signed as approved by Rhea Quill, reviewer');
    // broken over two lines, beside the other column's
    expect(cover.match(/d{10,}/g)?.join('')).toBe('d'.repeat(64));
    expect(cover.match(/c{10,}/g)?.join('')).toBe(FROZEN.resultsHash);
  });

  it('ends its cover above the foot, however much was done with it', async () => {
    const event = {
      personId: 'p',
      personName: 'Rhea Quill',
      at: AT,
      state: 'returned',
      note: 'Once more. '.repeat(60),
    } as const;
    const events = Array.from({ length: 40 }, (_, seq) => ({ ...event, seq }));
    const { pages } = await pdfOf(contentOf(small({}), { state: { ...FROZEN, reason: 'Why. '.repeat(150), events } }));
    // nothing stands under the foot's two lines
    for (const lines of pages) expect(lines.at(-1)).toContain('Inputs, SHA-256');
    expect(pages[0]?.join(' ')).toMatch(/\d+ earlier steps stand in the history/);
  });

  it('says what changed since the revision before', async () => {
    const before = contentOf(small({}));
    const wider = small({ pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 12, insideDiameterM: 0.04 }] });
    const { file, outcomes } = before;
    const previous = {
      letter: 'A',
      title: 'First',
      state: 'approved',
      createdAt: AT,
      engineVersion: '1',
      file,
      outcomes,
    } as const;
    const { pages } = await pdfOf(contentOf(wider, { state: FROZEN, previous }));
    const comparison = pages.find((lines) => lines[1]?.startsWith('Comparison with revision A') === true) ?? [];
    // 12 m and 10 m in feet, by hand
    expect(comparison.some((line) => /L1 Changed Length, ft 32\.8\d* 39\.3\d*/.test(line))).toBe(true);
    expect(comparison).toContain('Changed results');
  });
});

describe('names that mean ill', () => {
  const names = [
    'W'.repeat(60),
    'ren\u202Eder\u2066ed',
    'a\u0000b\u0007c',
    '\u200B\u200D\uFEFF',
    'Überkreuz Łódź Кран Δρ',
    'مصيدة 水錘 🔥',
    '%PDF-1.7 (trap) \\( << /JS >> endobj',
    '<script>alert(1)</script>',
    '=1+1',
  ];
  it.each(names)('are printed or replaced, and break nothing: %j', async (name) => {
    const tagged = {
      name,
      nodes: [
        {
          id: 'T1',
          kind: 'trap',
          tag: name,
          area: name,
          note: `${name}\n${name}`.repeat(20),
          elevationM: 0,
          inletPressurePa: 6e5,
          loadKgS: 0.05,
        },
        { id: 'R1', kind: 'receiver', tag: name, elevationM: 3, vented: true },
      ],
      cases: [{ id: 'c', name }],
    };
    const { pages } = await pdfOf(
      contentOf(small(tagged), { siteName: name, state: { ...FROZEN, title: name, reason: name } }),
    );
    const text = pages.flat().join('\n');
    expect(text).not.toMatch(/[\u202A-\u202E\u2066-\u2069\u200B-\u200F]/u);
    expect(text).toContain(`Page ${String(pages.length)} of ${String(pages.length)}`);
  });

  it('keeps what its typeface has: latin, greek and cyrillic', async () => {
    const { pages } = await pdfOf(contentOf(small({ name: 'Überkreuz Łódź Кран Δρ' })));
    expect(pages[0]?.join('\n')).toContain('Überkreuz Łódź Кран Δρ');
  });
});

it('is called off between two parts', async () => {
  const calledOff = new AbortController();
  const made = makePdf(contentOf(small({})), () => calledOff.abort(), calledOff.signal);
  await expect(made).rejects.toThrow();
});
