import { elementError, type BatchError, type Drafts } from './batch-draft';
import { quoted } from './mistakes';
import type { NetworkDocument } from './network-document';
import { MAXIMUM_ELEMENTS, type Gauge } from './network-file';
import { misfitDetail, misfitKeys, overrideId, splitOverrideId } from './override-keys';

/**
 * Ids and references of what a batch touched, in the document after it. What it did not touch was sound before; only a removal can
 * break it, and only then is the rest of the network looked through.
 */
export function referenceErrors(next: NetworkDocument, drafts: Drafts): BatchError[] {
  return [
    ...sharedIds(next, drafts),
    ...brokenPipes(next, drafts),
    ...brokenTraps(next, drafts),
    ...brokenOverrides(next, drafts),
    ...brokenGauges(next, drafts),
    ...leftBehind(next, drafts),
    ...tooMany(next, drafts),
  ];
}

/** Nodes and pipes share one name space. */
function sharedIds(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const [id, draft] of [...drafts.nodes, ...drafts.pipes]) {
    if (draft.before === undefined && next.nodes.has(id) && next.pipes.has(id)) {
      errors.push(elementError(id, draft, 'id', `The id ${quoted(id)} is in use; a node and a pipe cannot share one`));
    }
  }
  return errors;
}

function brokenPipes(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const [id, draft] of drafts.pipes) {
    const pipe = next.pipes.get(id)?.value;
    if (pipe === undefined) continue;
    for (const key of ['from', 'to'] as const) {
      if (!next.nodes.has(pipe[key]))
        errors.push(elementError(id, draft, key, `There is no node ${quoted(pipe[key])}`));
    }
  }
  return errors;
}

function brokenTraps(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const [id, draft] of drafts.nodes) {
    const node = next.nodes.get(id)?.value;
    if (node?.kind !== 'trap' || node.trapModel === undefined || next.trapModels.has(node.trapModel)) continue;
    errors.push(elementError(id, draft, 'trapModel', `There is no trap model ${quoted(node.trapModel)}`));
  }
  return errors;
}

function brokenOverrides(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const [id, draft] of drafts.overrides) {
    const override = next.overrides.get(id)?.value;
    if (override === undefined) continue;
    const { caseId } = splitOverrideId(id);
    const node = next.nodes.get(override.node)?.value;
    if (id !== overrideId(caseId, override.node)) {
      errors.push(elementError(id, draft, 'node', `The override's id ${quoted(id)} is not that of its case and node`));
    } else if (!next.cases.has(caseId)) {
      errors.push(elementError(id, draft, undefined, `There is no case ${quoted(caseId)}`));
    } else if (node === undefined) {
      errors.push(elementError(id, draft, 'node', `There is no node ${quoted(override.node)}`));
    } else {
      for (const key of misfitKeys(override, node.kind)) {
        errors.push(elementError(id, draft, key, misfitDetail(key, override.node, node.kind)));
      }
    }
  }
  return errors;
}

function brokenGauges(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const [id, draft] of drafts.gauges) {
    const gauge = next.gauges.get(id)?.value;
    if (gauge?.node !== undefined && !next.nodes.has(gauge.node)) {
      errors.push(elementError(id, draft, 'node', `There is no node ${quoted(gauge.node)}`));
    }
    if (gauge?.pipe !== undefined && !next.pipes.has(gauge.pipe)) {
      errors.push(elementError(id, draft, 'pipe', `There is no pipe ${quoted(gauge.pipe)}`));
    }
  }
  return errors;
}

/** Untouched elements that refer to one which the batch removed, or whose node it replaced by one of another kind. */
function leftBehind(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  const gone = {
    nodes: removed(drafts, 'nodes'),
    pipes: removed(drafts, 'pipes'),
    trapModels: removed(drafts, 'trapModels'),
    cases: removed(drafts, 'cases'),
  };
  const report = (collection: keyof typeof gone, id: string, user: string): void => {
    const draft = drafts[collection].get(id);
    if (draft !== undefined)
      errors.push(elementError(id, draft, undefined, `${id} cannot be removed: ${user} refers to it`));
  };
  if (gone.nodes.size > 0) {
    for (const [id, { value: pipe }] of next.pipes) {
      if (drafts.pipes.has(id)) continue;
      for (const end of new Set([pipe.from, pipe.to])) if (gone.nodes.has(end)) report('nodes', end, `pipe ${id}`);
    }
  }
  if (gone.nodes.size > 0 || gone.pipes.size > 0) {
    for (const [id, { value: gauge }] of next.gauges) {
      if (drafts.gauges.has(id)) continue;
      if (refersTo(gauge.node, gone.nodes)) report('nodes', gauge.node, `gauge ${id}`);
      if (refersTo(gauge.pipe, gone.pipes)) report('pipes', gauge.pipe, `gauge ${id}`);
    }
  }
  if (gone.trapModels.size > 0) {
    for (const [id, { value: node }] of next.nodes) {
      if (drafts.nodes.has(id) || node.kind !== 'trap') continue;
      if (refersTo(node.trapModel, gone.trapModels)) report('trapModels', node.trapModel, `trap ${id}`);
    }
  }
  const replaced = replacedNodes(next, drafts);
  if (gone.nodes.size > 0 || gone.cases.size > 0 || replaced.size > 0) {
    for (const [id, { value: override }] of next.overrides) {
      if (drafts.overrides.has(id)) continue;
      const { caseId } = splitOverrideId(id);
      if (gone.nodes.has(override.node)) report('nodes', override.node, `an override of case ${caseId}`);
      if (gone.cases.has(caseId)) report('cases', caseId, `its override for ${override.node}`);
      const draft = drafts.nodes.get(override.node);
      const node = next.nodes.get(override.node)?.value;
      if (draft === undefined || node === undefined || !replaced.has(override.node)) continue;
      for (const key of misfitKeys(override, node.kind)) {
        const detail = `In case ${caseId}, ${misfitDetail(key, override.node, node.kind)}`;
        errors.push(elementError(override.node, draft, 'kind', detail));
      }
    }
  }
  return errors;
}

function refersTo(id: Gauge['node'], gone: ReadonlySet<string>): id is string {
  return id !== undefined && gone.has(id);
}

function removed(drafts: Drafts, collection: keyof Drafts): Set<string> {
  const ids = new Set<string>();
  for (const [id, draft] of drafts[collection]) if (draft.before !== undefined && draft.keys === undefined) ids.add(id);
  return ids;
}

function replacedNodes(next: NetworkDocument, drafts: Drafts): Set<string> {
  const ids = new Set<string>();
  for (const [id, { before }] of drafts.nodes) {
    const kind = next.nodes.get(id)?.value.kind;
    if (before !== undefined && 'kind' in before.value && kind !== undefined && before.value.kind !== kind) ids.add(id);
  }
  return ids;
}

/** What an edit leaves can be written to a file and read again. */
function tooMany(next: NetworkDocument, drafts: Drafts): BatchError[] {
  const errors: BatchError[] = [];
  for (const collection of ['nodes', 'pipes', 'trapModels', 'cases', 'gauges'] as const) {
    const maximum = MAXIMUM_ELEMENTS[collection];
    const last = [...drafts[collection]].at(-1);
    if (last === undefined || next[collection].size <= maximum) continue;
    errors.push(elementError(last[0], last[1], undefined, `A network has at most ${maximum} ${collection}`));
  }
  return errors;
}
