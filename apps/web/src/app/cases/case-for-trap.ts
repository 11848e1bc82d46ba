import { applyBatch, type NetworkDocument, type OperatingCase, overrideId, type Trap } from '@riseback/network';
import { nameOf } from '../shared/element-words';
import { copyUnderName, freeCaseName, newCase, type NewCase, setChange } from './case-edits';

/** What a case made for one trap sets apart. */
export type TrapSetting = 'failedOpen' | 'isolated' | 'load';

const ENDINGS: Readonly<Record<TrapSetting, string>> = {
  failedOpen: ' failed open',
  isolated: ' isolated',
  load: ' at its own load',
};

/**
 * A case out of a present one, with one trap set apart in it; its own load begins as what it is there.
 * @param from null while there are no cases: the network as drawn then becomes one beside the new one, so that its results stay
 */
export function caseForTrap(
  document: NetworkDocument,
  from: OperatingCase | null,
  trap: Trap,
  setting: TrapSetting,
): NewCase {
  const drawn = from === null ? newCase(document, 'As drawn') : null;
  const before = drawn === null ? document : withOps(document, drawn);
  const source = from ?? before.cases.get(drawn?.id ?? '')?.value;
  if (source === undefined) throw new Error('the case as drawn was not made');
  const name = freeCaseName(before, nameOf(trap), ENDINGS[setting]);
  const copy = copyUnderName(before, source, name, `case ${name} made`);
  const copied = withOps(before, copy);
  const made = { ...source, id: copy.id, name };
  const set =
    setting === 'load'
      ? setChange(copied, made, trap.id, 'loadKgS', loadIn(document, source, trap))
      : setChange(copied, made, trap.id, 'state', setting);
  return { id: copy.id, label: copy.label, ops: [...(drawn?.ops ?? []), ...copy.ops, ...set.ops] };
}

function loadIn(document: NetworkDocument, { id, loadFactor }: OperatingCase, trap: Trap): number {
  return document.overrides.get(overrideId(id, trap.id))?.value.loadKgS ?? trap.loadKgS * loadFactor;
}

function withOps(document: NetworkDocument, { ops }: NewCase): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(applied.errors.map(({ detail }) => detail).join(' '));
  return applied.document;
}
