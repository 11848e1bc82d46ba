import type { SavedLibraryModel } from '@riseback/contracts';
import { type NetworkDocument, type TrapModel, type TrapType } from '@riseback/network';
import type { LibraryService } from '../src/library/library-service';

/** What each of the plant's models is; invented makers, invented figures. */
const TYPES: Readonly<Record<string, TrapType>> = {
  MB40: 'invertedBucket',
  MB15: 'invertedBucket',
  MB15L: 'invertedBucket',
  MF50: 'floatThermostatic',
  MF20: 'floatThermostatic',
  MD10: 'thermodynamic',
  MT8: 'thermostatic',
};

/** Differentials at which the library gives capacities, Pa: 1, 5, 10, 25, 50 and 100 psi. */
const DIFFERENTIALS_PA = [6_895, 34_474, 68_948, 172_369, 344_738, 689_476] as const;

/** Models that the plant has in its library but not in this network. */
const OTHERS: readonly SavedLibraryModel[] = [
  {
    name: 'Marl B25 1/4',
    trapType: 'invertedBucket',
    orificeDiameterM: 0.00635,
    maximumDifferentialPa: 1_034_214,
    bodyPressurePa: 1_825_014,
    bodyTemperatureK: 505,
    capacity: capacityOf([0.0502, 0.1123, 0.1588, 0.251, 0.355, 0.502]),
  },
  {
    name: 'Pell F80',
    trapType: 'floatThermostatic',
    orificeDiameterM: 0.0175,
    maximumDifferentialPa: 448_159,
    bodyPressurePa: 1_480_276,
    bodyTemperatureK: 490,
    capacity: capacityOf([0.381, 0.853, 1.206, 1.907, 2.697]),
  },
  {
    name: 'Sker D15',
    trapType: 'thermodynamic',
    orificeDiameterM: 0.0055,
    maximumDifferentialPa: 4_136_854,
    bodyPressurePa: 4_238_179,
    bodyTemperatureK: 600,
    maximumBackPressureFraction: 0.8,
    capacity: capacityOf([0.0377, 0.0842, 0.1191, 0.1883, 0.2663, 0.3766]),
  },
];
const RETIRED: SavedLibraryModel = {
  name: 'Holm T4',
  trapType: 'thermostatic',
  orificeDiameterM: 0.004,
  maximumDifferentialPa: 861_845,
  bodyPressurePa: 1_136_325,
  bodyTemperatureK: 480,
  capacity: capacityOf([0.0199, 0.0446, 0.063, 0.0996, 0.1409]),
};

/** Of the one model that was tested anew since the network was drawn: what it passed, over what its sheet promised. */
const TESTED_ANEW = { id: 'MB40', share: 0.94 } as const;

/**
 * Fills the demo's library with the plant's models and a few more. One of them has a newer version than the network's copy.
 * @returns the plant's network, its models copies of version 1
 */
export function seedLibrary(
  library: LibraryService,
  siteId: string,
  by: { readonly id: string },
  plant: NetworkDocument,
): NetworkDocument {
  const trapModels = new Map(
    Array.from(plant.trapModels, ([id, { ordinal, value }]) => {
      const { id: libraryId, version } = library.addFor(siteId, by, savedModel(value));
      if (id === TESTED_ANEW.id) library.saveFor(siteId, by, libraryId, version, testedAnew(value));
      return [id, { ordinal, value: { ...value, libraryId, libraryVersion: version } }] as const;
    }),
  );
  for (const model of OTHERS) library.addFor(siteId, by, model);
  const { id, version } = library.addFor(siteId, by, RETIRED);
  library.saveFor(siteId, by, id, version, { ...RETIRED, retired: true });
  return { ...plant, trapModels };
}

function savedModel({ id, ...content }: TrapModel): SavedLibraryModel {
  const trapType = TYPES[id];
  return { ...content, ...(trapType === undefined ? {} : { trapType }) };
}

function testedAnew(model: TrapModel): SavedLibraryModel {
  const capacity = model.capacity?.map(({ differentialPa, flowKgS }) => {
    return { differentialPa, flowKgS: Number((flowKgS * TESTED_ANEW.share).toPrecision(5)) };
  });
  return { ...savedModel(model), ...(capacity === undefined ? {} : { capacity }) };
}

function capacityOf(flowsKgS: readonly number[]): NonNullable<SavedLibraryModel['capacity']> {
  return flowsKgS.flatMap((flowKgS, i) => {
    const differentialPa = DIFFERENTIALS_PA[i];
    return differentialPa === undefined ? [] : [{ differentialPa, flowKgS }];
  });
}
