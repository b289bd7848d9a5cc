import type { DossierSettings } from './dossier.ts';

/** What holds until the user decides otherwise. Distances in Å. */
export const defaultSettings: DossierSettings = {
  isotopes: {},
  references: {},
  quadrupoleMomentsBarn: {},
  symmetry: 'auto',
  symmetryToleranceAngstrom: 0.01,
  mergeDistanceAngstrom: 0.1,
  frame: null,
};
