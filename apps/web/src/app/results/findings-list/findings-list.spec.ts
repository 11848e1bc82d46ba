import { TestBed } from '@angular/core/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Finding } from '../finding-list';
import { FindingsList } from './findings-list';

const FINDINGS: readonly Finding[] = [
  {
    id: 'nodes/T1/differential',
    severity: 'fail',
    element: { in: 'nodes', id: 'T1' },
    tag: 'TR-9',
    position: { x: 1, y: 2 },
    code: 'differential',
    what: 'Nothing drives the condensate out.',
    remedy: 'Lower the return.',
  },
  {
    id: 'network/noSource',
    severity: 'note',
    element: null,
    tag: '',
    position: null,
    code: 'noSource',
    what: 'Nothing flows.',
  },
];

describe('FindingsList', () => {
  let element: HTMLElement;
  const shown = async (inputs: Record<string, unknown>) => {
    const fixture = TestBed.createComponent(FindingsList);
    for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
    await fixture.whenStable();
    element = fixture.nativeElement as HTMLElement;
    return fixture;
  };

  beforeEach(() => TestBed.configureTestingModule({}));

  it('says shape, word, place, what is wrong and what would mend it', async () => {
    await shown({ findings: FINDINGS, zoneOf: () => 'C2' });
    const rows = [...element.querySelectorAll('tbody tr')].map((row) =>
      [...row.children].map((cell) => cell.textContent.replace(/\s+/g, ' ').trim()).join(' '),
    );
    expect(rows).toEqual([
      'Fail TR-9 C2 Differential. Nothing drives the condensate out. Lower the return. Try',
      'Note Network – No source. Nothing flows. –',
    ]);
    expect(element.querySelector('.count')?.textContent).toBe('1 fail, 0 watch, 1 note');
  });

  it('says in which cases each is so, where the findings of several stand together', async () => {
    const [first, second] = FINDINGS;
    const of = (...cases: string[]) => ({ ...first, id: cases.join('+'), cases });
    const caseName = (id: string) => ({ a: 'Design', b: 'Start-up', c: 'Turndown' })[id] ?? id;
    await shown({ findings: [of('a', 'b', 'c'), of('a', 'c'), second], caseName, caseCount: 3 });
    expect([...element.querySelectorAll('tbody .case')].map((cell) => cell.textContent)).toEqual([
      'All cases',
      'Design, Turndown',
      'Any',
    ]);
    await shown({ findings: [], caseName, caseCount: 3 });
    expect(element.textContent).toContain('No findings in any case');
  });

  it('leads to the element', async () => {
    const fixture = await shown({ findings: FINDINGS, currentId: 'T1' });
    const opened: string[] = [];
    fixture.componentInstance.opened.subscribe((id) => opened.push(id));
    const button = element.querySelector('button');
    button?.click();
    expect(opened).toEqual(['T1']);
    expect(button?.getAttribute('aria-current')).toBe('true');
    expect(button?.getAttribute('aria-label')).toBe('Show TR-9: Differential');
  });

  it('does not take silence for a pass before anything is solved', async () => {
    await shown({ findings: [], unsolved: true });
    expect(element.textContent).toContain('this case is not solved');
    await shown({ findings: [] });
    expect(element.textContent).toContain('No findings in this case');
  });
});
