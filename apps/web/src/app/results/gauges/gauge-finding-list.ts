import type { GaugeFinding } from '@riseback/diagnosis';
import type { NetworkDocument } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { nameOf } from '../../shared/element-words';
import type { Finding } from '../finding-list';
import { findingWords } from '../finding-words';

/** What is said of gauges, as notes of the list of findings: they tell of instruments, not of the plant. */
export function gaugeNotes(
  document: NetworkDocument,
  found: ReadonlyMap<string, readonly GaugeFinding[]>,
  units: DisplayUnits,
): Finding[] {
  return [...found].flatMap(([id, findings]) => {
    const gauge = document.gauges.get(id)?.value;
    if (gauge === undefined) return [];
    const node = document.nodes.get(gauge.node ?? document.pipes.get(gauge.pipe ?? '')?.value.from ?? '');
    return findings.map(({ code, text, remedy }) => ({
      id: `gauges/${id}/${code}`,
      severity: 'note' as const,
      element: { in: 'gauges' as const, id },
      tag: nameOf(gauge),
      position: node?.value.position ?? null,
      code,
      what: findingWords(text, units),
      remedy: findingWords(remedy, units),
    }));
  });
}
