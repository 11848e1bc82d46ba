import type { CommentSubject } from '@riseback/contracts';
import {
  type FileCase,
  type FilePart,
  jsonEqual,
  keysOf,
  type NetworkFile,
  splitOverrideId,
  withTrapDefaults,
} from '@riseback/network';
import type { ComparedElement, ElementChange, KeyChange, NetworkComparison } from '@riseback/revisions';
import type { DisplayUnits, UnitSystem } from '@riseback/units';
import { STATE_WORDS } from '../../cases/case-changes';
import { propertyWord } from '../../networks/property-words';
import { KIND_WORDS, nameOf } from '../../shared/element-words';
import { compareTags, tagRuns } from './tag-runs';
import { ABSENT, keyWords, namesIn, settingTitle, settingWords, type Telling } from './value-words';

/** An element that a row tells of. */
export interface RowElement {
  readonly name: string;
  /** What a remark on it is pinned to. */
  readonly subject: CommentSubject;
  /** The element on the drawing; undefined of what is not drawn. */
  readonly elementId: string | undefined;
  /** Numbers of the open comments on it. */
  readonly comments: readonly number[];
}

/** What was changed, in words; elements that were changed alike stand in one row. */
export interface InputRow {
  readonly key: string;
  readonly kind: 'added' | 'removed' | 'changed';
  /** Tags, or runs of them. */
  readonly names: readonly string[];
  readonly quantity: string;
  readonly before: string;
  readonly after: string;
  /** Of what was added or removed as a whole: its values. */
  readonly details: string;
  readonly drawingOnly: boolean;
  readonly elements: readonly RowElement[];
}

interface Line extends Omit<InputRow, 'key' | 'names' | 'elements'> {
  readonly element: RowElement;
  /** Lines of one group with equal words are one row. */
  readonly group: string;
}

interface Sides {
  readonly before: NetworkFile;
  readonly after: NetworkFile;
}

const ORDER: Readonly<Record<ElementChange['in'], number>> = {
  nodes: 1,
  pipes: 2,
  trapModels: 3,
  cases: 4,
  overrides: 5,
  gauges: 6,
};

/** Settings first, then elements by their kind and tag; what only moves symbols comes last. */
export function inputRows(
  comparison: NetworkComparison,
  files: Sides,
  system: UnitSystem,
  commentsOf: ReadonlyMap<string, readonly number[]>,
): InputRow[] {
  const context: Context = {
    before: { names: namesIn(files.before), units: unitsOf(files.before, system) },
    after: { names: namesIn(files.after), units: unitsOf(files.after, system) },
    files,
    commentsOf,
  };
  const lines = comparison.elements
    .flatMap((change) => linesOf(change, context).map((line) => ({ line, order: ORDER[change.in] })))
    .sort(
      (a, b) =>
        Number(a.line.drawingOnly) - Number(b.line.drawingOnly) ||
        a.order - b.order ||
        compareTags(a.line.element.name, b.line.element.name),
    );
  return [...settingRows(comparison, context), ...folded(lines.map(({ line }) => line))];
}

interface Context {
  readonly before: Telling;
  readonly after: Telling;
  readonly files: Sides;
  readonly commentsOf: ReadonlyMap<string, readonly number[]>;
}

function unitsOf({ site }: NetworkFile, system: UnitSystem): DisplayUnits {
  return { system, atmosphericPressurePa: site.atmosphericPressurePa };
}

function settingRows({ settings }: NetworkComparison, context: Context): InputRow[] {
  return settings.map(({ path, from, to }) => {
    const { what, quantity } = settingTitle(path);
    return {
      key: path.join('.'),
      kind: 'changed',
      names: [what],
      quantity,
      before: settingWords(path, from, context.before.units),
      after: settingWords(path, to, context.after.units),
      details: '',
      drawingOnly: false,
      elements: [{ name: what, subject: { kind: 'whole' }, elementId: undefined, comments: [] }],
    };
  });
}

/** Equal words in one group make one row, except of elements with comments: those are looked for by themselves. */
function folded(lines: readonly Line[]): InputRow[] {
  const rows = new Map<string, { line: Line; elements: RowElement[] }>();
  for (const line of lines) {
    const { group, kind, quantity, before, after, details, element } = line;
    const own = element.comments.length > 0 ? element.name : '';
    const key = JSON.stringify([group, kind, quantity, before, after, details, own]);
    const row = rows.get(key);
    if (row === undefined) rows.set(key, { line, elements: [element] });
    else row.elements.push(element);
  }
  return [...rows].map(
    ([
      key,
      {
        line: { element: _e, group: _g, ...words },
        elements,
      },
    ]) => ({
      ...words,
      key,
      elements,
      names: tagRuns(elements.map(({ name }) => name)),
    }),
  );
}

function linesOf(change: ElementChange, context: Context): Line[] {
  const element = rowElement(change, context);
  const group = change.in === 'overrides' ? splitOverrideId(change.id).caseId : change.in;
  const whole = change.before ?? change.after;
  if (change.keys.length === 0 && change.kind !== 'changed' && whole !== undefined) {
    const details = detailsOf(change.in, whole, change.kind === 'added' ? context.after : context.before);
    const [before, after] = change.kind === 'added' ? [ABSENT, 'added'] : ['there', 'removed'];
    const { kind } = change;
    return [
      { element, group, kind, quantity: kindTitle(change.in, whole), before, after, details, drawingOnly: false },
    ];
  }
  return joined(change.keys).map(({ key, from, to, drawingOnly }) => ({
    element,
    group,
    kind: 'changed',
    quantity: propertyWord(key.title),
    before: drawingOnly ? '' : keyWords(key.from, from, context.before),
    after: drawingOnly ? 'moved' : keyWords(key.to, to, context.after),
    details: '',
    drawingOnly,
  }));
}

/** Keys of which an element has the one or the other; the first gives both their name. */
const ALTERNATIVES: readonly (readonly [string, ...string[]])[] = [
  ['size', 'insideDiameterM'],
  ['pressurePa', 'vented'],
  ['node', 'pipe'],
];

interface JoinedKey extends Omit<KeyChange, 'key'> {
  readonly key: { readonly from: string; readonly to: string; readonly title: string };
}

/** A key that took another's place is one change: from a nominal size to a bore. */
function joined(keys: readonly KeyChange[]): JoinedKey[] {
  const taken = new Set<KeyChange>();
  return keys.flatMap((change): JoinedKey[] => {
    if (taken.has(change)) return [];
    const pair = ALTERNATIVES.find((names) => names.includes(change.key));
    const other = keys.find(({ key }) => key !== change.key && pair?.includes(key));
    if (pair === undefined || other === undefined || (change.to === undefined) === (other.to === undefined)) {
      return [{ ...change, key: { from: change.key, to: change.key, title: change.key } }];
    }
    taken.add(other);
    const [gone, come] = change.to === undefined ? [change, other] : [other, change];
    return [{ ...come, from: gone.from, key: { from: gone.key, to: come.key, title: pair[0] } }];
  });
}

function rowElement(change: ElementChange, { files, after, before, commentsOf }: Context): RowElement {
  const { in: list, id } = change;
  if (list === 'overrides') {
    const { caseId, nodeId } = splitOverrideId(id);
    const ofCase = [...files.after.cases, ...files.before.cases].find((one) => one.id === caseId);
    const tag = files.after.nodes.some((node) => node.id === nodeId) ? after.names(nodeId) : before.names(nodeId);
    return {
      name: `${ofCase?.name ?? caseId}: ${tag}`,
      subject: { kind: 'result', elementId: nodeId, caseId },
      elementId: nodeId,
      comments: commentsOf.get(nodeId) ?? [],
    };
  }
  const drawn = list === 'nodes' || list === 'pipes' || list === 'gauges';
  return {
    name: elementName(list, id, change.after ?? change.before),
    subject: drawn ? { kind: 'element', elementId: id } : { kind: 'whole' },
    elementId: list === 'gauges' ? undefined : drawn ? id : undefined,
    comments: drawn ? (commentsOf.get(id) ?? []) : [],
  };
}

function elementName(list: ElementChange['in'], id: string, element: ComparedElement | undefined): string {
  if (list === 'cases' && element !== undefined && 'name' in element) return `Case ${element.name}`;
  if (list === 'trapModels' && element !== undefined && 'name' in element) return `Model ${element.name}`;
  return element === undefined || !('id' in element) ? id : nameOf(element);
}

function kindTitle(list: ElementChange['in'], element: ComparedElement): string {
  const word =
    'kind' in element
      ? KIND_WORDS[element.kind]
      : { nodes: '', pipes: 'pipe', trapModels: 'trap model', cases: 'operating case', overrides: '', gauges: 'gauge' }[
          list
        ];
  return word.charAt(0).toUpperCase() + word.slice(1);
}

const UNTOLD = new Set(['id', 'kind', 'tag', 'name', 'position', 'bends', 'overrides']);

/** The values that an element was given, without its defaults: "load 500 lb/h, inlet pressure 150 psig". */
function detailsOf(list: ElementChange['in'], element: ComparedElement, telling: Telling): string {
  const defaults = defaultsOf(list, element);
  const given = Object.entries(element).filter(
    ([key, value]) => !UNTOLD.has(key) && value !== undefined && !jsonEqual(value, defaults.get(key)),
  );
  const words = given.map(([key, value]) => `${propertyWord(key).toLowerCase()} ${keyWords(key, value, telling)}`);
  return [...words, ...('overrides' in element ? overrideWords(element, telling) : [])].join('; ');
}

/** What an added or removed case changes, by element: "TR-114 failed open". */
function overrideWords({ overrides }: FileCase, telling: Telling): string[] {
  return overrides.map(({ node, state, ...values }) => {
    const words = Object.entries(values).map(
      ([key, value]) => `${propertyWord(key).toLowerCase()} ${keyWords(key, value, telling)}`,
    );
    return [telling.names(node), ...(state === undefined ? [] : [STATE_WORDS[state].toLowerCase()]), ...words].join(
      ' ',
    );
  });
}

/** Of a trap they hang on its type and on what else it says. */
function defaultsOf(list: ElementChange['in'], element: ComparedElement): ReadonlyMap<string, unknown> {
  if ('kind' in element && element.kind === 'trap') {
    const { loadTolerance: _l, subcoolingK: _k, discharge: _d, peakFactor: _p, service: _s, ...given } = element;
    const defaults = withTrapDefaults({ ...given, sizingFactor: undefined });
    return new Map(Object.entries(defaults).filter(([key]) => key === 'sizingFactor' || !(key in given)));
  }
  const parts: Partial<Record<ElementChange['in'], FilePart>> = { pipes: 'pipe', cases: 'case', gauges: 'gauge' };
  const part = 'kind' in element ? element.kind : parts[list];
  return new Map(part === undefined ? [] : keysOf(part).map((key) => [key.key, key.default]));
}
