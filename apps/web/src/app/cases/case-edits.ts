import {
  type EditOp,
  inOrder,
  newElementId,
  nextOrdinal,
  type NetworkDocument,
  type OperatingCase,
  overrideId,
  type OverrideKey,
  removalOps,
  setOp,
  splitOverrideId,
} from '@riseback/network';
import { nameOf } from '../shared/element-words';
import { countChanges, keyWord } from './case-changes';

/** One edit of the cases: one batch, one step of undo. */
export interface CaseEdit {
  readonly label: string;
  readonly ops: readonly EditOp[];
}
export type NewCase = CaseEdit & { readonly id: string };

const MAXIMUM_NAME_LENGTH = 80;

/** A case at full load, everything else as drawn. */
export function newCase(document: NetworkDocument, wanted?: string): NewCase {
  const name =
    wanted === undefined
      ? freeName(document, (count) => `Case ${String(document.cases.size + count)}`)
      : freeCaseName(document, wanted);
  return made(document, { name, loadFactor: 1, inletPressureFactor: 1 }, `case ${name} made`);
}

/** The same factors and settings under a name of its own. */
export function copyOfCase(document: NetworkDocument, source: OperatingCase): NewCase {
  const name = freeCaseName(document, source.name, ', copy');
  return copyUnderName(document, source, name, `case ${source.name} copied`);
}

export function copyUnderName(
  document: NetworkDocument,
  { id: from, ...source }: OperatingCase,
  name: string,
  words: string,
): NewCase {
  const { id, label, ops } = made(document, { ...source, name }, words);
  const overrides = inOrder(document.overrides)
    .filter(([existing]) => splitOverrideId(existing).caseId === from)
    .map(([, { ordinal, value }]): EditOp => {
      return { op: 'add', in: 'overrides', id: overrideId(id, value.node), ordinal, value: { ...value } };
    });
  return { id, label, ops: [...ops, ...overrides] };
}

/** A name that no case has: the stem with its ending, and a number from the second on. */
export function freeCaseName(document: NetworkDocument, stem: string, ending = ''): string {
  return freeName(document, (count) => {
    const end = count === 1 ? ending : `${ending} ${String(count)}`;
    return `${stem.slice(0, MAXIMUM_NAME_LENGTH - end.length).trimEnd()}${end}`;
  });
}

/** Gives a case another name, or says why it cannot have it: two cases of one name could not be told apart in a result. */
export function renameCase(
  document: NetworkDocument,
  { id, name: from }: OperatingCase,
  name: string | undefined,
): CaseEdit | { readonly refusal: string } {
  if (name === undefined) return { refusal: 'A case needs a name.' };
  if (name.length > MAXIMUM_NAME_LENGTH) return { refusal: `At most ${String(MAXIMUM_NAME_LENGTH)} letters.` };
  const taken = [...document.cases.values()].some(({ value }) => value.id !== id && value.name === name);
  if (taken) return { refusal: 'Another case has this name.' };
  return { label: `case ${from} renamed ${name}`.slice(0, 120), ops: [setOp(document, 'cases', id, 'name', name)] };
}

export function setFactor(
  document: NetworkDocument,
  { id, name }: OperatingCase,
  key: 'loadFactor' | 'inletPressureFactor',
  to: number,
): CaseEdit {
  const what = key === 'loadFactor' ? 'load' : 'inlet pressure factor';
  return { label: `${what} of case ${name}`, ops: [setOp(document, 'cases', id, key, to)] };
}

/** Sets one value at one element in a case. */
export function setChange(
  document: NetworkDocument,
  { id: caseId, name }: OperatingCase,
  nodeId: string,
  key: OverrideKey,
  to: number | string,
): CaseEdit {
  const id = overrideId(caseId, nodeId);
  const label = labelOf(document, nodeId, key, `in ${name}`);
  if (document.overrides.has(id)) return { label, ops: [setOp(document, 'overrides', id, key, to)] };
  const ordinal = nextOrdinal(document, 'overrides');
  return { label, ops: [{ op: 'add', in: 'overrides', id, ordinal, value: { node: nodeId, [key]: to } }] };
}

/** Lets an element be as drawn again in one respect; with the last one the override goes. */
export function clearChange(
  document: NetworkDocument,
  { id: caseId, name }: OperatingCase,
  nodeId: string,
  key: OverrideKey,
): CaseEdit {
  const id = overrideId(caseId, nodeId);
  const label = labelOf(document, nodeId, key, `as drawn again in ${name}`);
  const override = document.overrides.get(id)?.value;
  const others = Object.keys(override ?? {}).filter((other) => other !== key && other !== 'node');
  const op: EditOp =
    others.length === 0 ? { op: 'remove', in: 'overrides', id } : setOp(document, 'overrides', id, key, undefined);
  return { label, ops: [op] };
}

/** A case's deletion, with what goes along in words. */
export function deletionOfCase(
  document: NetworkDocument,
  { id, name }: OperatingCase,
): CaseEdit & { readonly along: readonly string[] } {
  const count = countChanges(document, id);
  return {
    label: `case ${name} deleted`,
    along: [
      ...(count === 0 ? [] : [`${String(count)} ${count === 1 ? 'setting' : 'settings'} of its own`]),
      'Its results, here and in the worst of all',
      ...(document.cases.size === 1 ? ['The last case: the plain network is then solved as drawn'] : []),
    ],
    ops: removalOps(document, { cases: [id] }),
  };
}

function made(document: NetworkDocument, value: Omit<OperatingCase, 'id'>, label: string): NewCase {
  const id = newElementId(document, 'C');
  const ordinal = nextOrdinal(document, 'cases');
  return { id, label: label.slice(0, 120), ops: [{ op: 'add', in: 'cases', ordinal, value: { id, ...value } }] };
}

function freeName(document: NetworkDocument, candidate: (count: number) => string): string {
  const taken = new Set(Array.from(document.cases.values(), ({ value }) => value.name));
  let count = 1;
  while (taken.has(candidate(count))) count += 1;
  return candidate(count);
}

function labelOf(document: NetworkDocument, nodeId: string, key: OverrideKey, ending: string): string {
  const node = document.nodes.get(nodeId)?.value;
  return `${keyWord(key).toLowerCase()} of ${node === undefined ? nodeId : nameOf(node)} ${ending}`.slice(0, 120);
}
