import { type NetworkDocument, splitOverrideId } from '@riseback/network';
import { nameOf } from '../shared/element-words';
import type { Place } from './place';

/** What people call the element at a place; undefined where the document does not have it. */
export function placeName(place: Place, document: NetworkDocument): string | undefined {
  switch (place.in) {
    case 'network':
      return 'The network';
    case 'overrides': {
      const { caseId, nodeId } = splitOverrideId(place.id);
      const node = document.nodes.get(nodeId)?.value;
      const operatingCase = document.cases.get(caseId)?.value;
      if (node === undefined || operatingCase === undefined) return undefined;
      return `${nameOf(node)} in ${operatingCase.name}`;
    }
    case 'cases':
    case 'trapModels':
      return document[place.in].get(place.id)?.value.name;
    case 'nodes':
    case 'pipes':
    case 'gauges': {
      const element = document[place.in].get(place.id)?.value;
      return element === undefined ? undefined : nameOf(element);
    }
  }
}
