import type { NetworkNode, PipeRun } from '@riseback/network';
import { findingSummary } from '../row-findings';
import type { Column, ListContext } from './column';
import { quantityColumn, textColumn } from './column-kinds';

type Drawn = NetworkNode | PipeRun;

/** What a person calls it, where it stands, and the way to it on the drawing. */
export function nameColumns<E extends Drawn>(collection: 'nodes' | 'pipes'): Column<E>[] {
  return [
    {
      ...textColumn<Drawn>(collection, 'tag', { title: 'Tag', group: 'element', widthPx: 78, maxLength: 64 }),
      show: (element) => element.tag ?? element.id,
      derived: (element) => element.tag === undefined,
    },
    {
      key: 'drawing',
      title: 'On the drawing',
      group: 'element',
      widthPx: 30,
      face: 'drawingLink',
      value: (element) => element.id,
      show: (element) => `Show ${element.tag ?? element.id} on the drawing`,
    },
    textColumn<Drawn>(collection, 'area', {
      title: 'Area',
      group: 'element',
      widthPx: 96,
      maxLength: 80,
      suggestions: ({ document }) => distinct([...nodesOf(document), ...pipesOf(document)].map(({ area }) => area)),
    }),
  ];
}

export function elevationColumn<E extends NetworkNode>(): Column<E> {
  return quantityColumn<NetworkNode>('nodes', 'elevationM', 'length', { title: 'Elevation', widthPx: 78 });
}

export function noteColumn<E extends Drawn>(collection: 'nodes' | 'pipes'): Column<E> {
  return textColumn<Drawn>(collection, 'note', { title: 'Note', widthPx: 160, maxLength: 4_000, minor: true });
}

/** The worst finding with its word; an element that passes its checks says so where `passes` is known. */
export function findingColumn<E extends Drawn>(
  { title, widthPx }: { readonly title: string; readonly widthPx: number },
  passes: (element: E, context: ListContext) => boolean,
): Column<E> {
  return {
    key: 'finding',
    title,
    group: 'result',
    widthPx,
    face: 'verdict',
    value: (element, context) => {
      const worst = context.findings.get(element.id)?.[0];
      if (worst !== undefined) return worst.status === 'fail' ? 0 : 1;
      return passes(element, context) ? 2 : undefined;
    },
    show: (element, { findings }) => findingSummary(findings.get(element.id) ?? []),
  };
}

/** Which case an element's result is of, while each shows its own worst. */
export function caseColumn<E extends Drawn>(): Column<E> {
  return {
    key: 'case',
    title: 'Case',
    group: 'result',
    widthPx: 150,
    wanted: ({ caseNameOf }) => caseNameOf !== undefined,
    value: ({ id }, { caseNameOf }) => caseNameOf?.(id) ?? '',
  };
}

/** For suggestions: each text once, in the order of an index. */
export function distinct(texts: Iterable<string | undefined>): string[] {
  return [...new Set([...texts].filter((text) => text !== undefined))].sort((a, b) => a.localeCompare(b));
}

function nodesOf(document: ListContext['document']): NetworkNode[] {
  return Array.from(document.nodes.values(), ({ value }) => value);
}

function pipesOf(document: ListContext['document']): PipeRun[] {
  return Array.from(document.pipes.values(), ({ value }) => value);
}
