/** The dossier's types as the components see them: components know the store, not the engine. */
export type { Mat3, Vec3 } from '#src/base/matrix3.ts';
export type { Place, Problem, Severity } from '#src/base/problem.ts';
export type { CellConstants, Lattice } from '#src/crystal/lattice.ts';
export type {
  Axis,
  CrystalDossier,
  DossierSettings,
  EfgDossier,
  EquivalentAtom,
  NoiseFigures,
  Reference,
  ShieldingDossier,
  ShiftDossier,
  SiteDossier,
} from '#src/dossier/dossier.ts';
