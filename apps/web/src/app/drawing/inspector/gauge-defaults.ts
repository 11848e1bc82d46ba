import { gaugeTap } from '@riseback/diagnosis';
import { inOrder, type NetworkDocument, toFile } from '@riseback/network';
import { nameOf } from '../../shared/element-words';
import { nextTag } from '../../shared/next-tag';
import type { GaugeDraft } from '../model/gauge-draft';
import type { DraftDefaults } from './draft-defaults';

/** What gauges of one plant mostly share. */
const SHARED_KEYS = ['rangeLowPa', 'rangeHighPa', 'accuracy', 'resolutionPa', 'waterLeg'] as const;

/** The next tag, the height of the tap, and the dial of the last gauge. */
export function gaugeDefaults(draft: GaugeDraft, document: NetworkDocument, pattern?: string): DraftDefaults {
  const gauges = inOrder(document.gauges).map(([, { value }]) => value);
  const tags = gauges.flatMap(({ tag }) => tag ?? []);
  const last = gauges.findLast(({ retired }) => !retired);
  const tap = gaugeTap(toFile(document), draft);
  const values: Record<string, unknown> = {
    tag: nextTag('gauge', tags, new Set(tags), pattern),
    ...('pipe' in draft ? { distanceM: draft.distanceM } : {}),
    ...(tap === undefined ? {} : { elevationM: tap.elevationM }),
  };
  const hints: Record<string, string> = tap === undefined ? {} : { elevationM: 'As its tap' };
  for (const key of SHARED_KEYS) {
    const value = last?.[key];
    if (last === undefined || value === undefined) continue;
    values[key] = value;
    hints[key] = `As ${nameOf(last)}`;
  }
  return { values, hints };
}
