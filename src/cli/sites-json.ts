import { nested } from '#src/base/matrix3.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Problem } from '#src/base/problem.ts';
import type { BegunDossier, CrystalHead } from '#src/dossier/derive-dossier.ts';
import type { EfgDossier, ShieldingDossier, ShiftDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { watchUndefined } from './undefined-notes.ts';

const list = (v: Vec3 | null): number[] | null => (v ? [...v] : null);

function shieldingJson(shielding: ShieldingDossier | null) {
  if (!shielding) return null;
  return {
    tensor: nested(shielding.tensor),
    isotropic: shielding.isotropic,
    components: list(shielding.components),
    axes: shielding.axes.map(list),
    span: shielding.span,
    skew: shielding.skew,
    reducedAnisotropy: shielding.reducedAnisotropy,
    anisotropy: shielding.anisotropy,
    asymmetry: shielding.asymmetry,
    antisymmetricNorm: shielding.antisymmetricNorm,
    symmetryResidual: shielding.symmetryResidual,
    equivalentSpread: shielding.equivalentSpread,
    symmetrised: nested(shielding.projected),
    undefinedBecause: shielding.undefinedBecause,
    source: { file: shielding.source.file, line: shielding.source.line },
  };
}

function shiftJson(shift: ShiftDossier | null) {
  if (!shift) return null;
  return {
    isotropic: shift.isotropic,
    components: list(shift.components),
    axes: shift.axes.map(list),
    span: shift.span,
    skew: shift.skew,
    reducedAnisotropy: shift.reducedAnisotropy,
    anisotropy: shift.anisotropy,
    asymmetry: shift.asymmetry,
    reference: shift.reference,
    undefinedBecause: shift.undefinedBecause,
  };
}

function efgJson(efg: EfgDossier | null) {
  if (!efg) return null;
  return {
    tensor: nested(efg.tensor),
    unitGiven: efg.unitGiven ?? null,
    components: list(efg.components),
    axes: efg.axes.map(list),
    asymmetry: efg.asymmetry,
    isotope: efg.isotope,
    quadrupoleMomentBarn: efg.quadrupoleMomentBarn,
    quadrupoleMomentSource: efg.quadrupoleMomentSource,
    couplingMHz: efg.couplingMHz,
    productMHz: efg.productMHz,
    quadrupoleFrequencyMHz: efg.quadrupoleFrequencyMHz,
    signDetermined: efg.signDetermined,
    antisymmetricNorm: efg.antisymmetricNorm,
    trace: efg.trace,
    symmetryResidual: efg.symmetryResidual,
    equivalentSpread: efg.equivalentSpread,
    symmetrised: nested(efg.projected),
    undefinedBecause: efg.undefinedBecause,
    source: { file: efg.source.file, line: efg.source.line },
  };
}

function siteJson(site: SiteDossier) {
  return {
    label: site.label,
    element: site.element,
    isotope: site.isotope,
    occupancy: site.occupancy,
    fractional: list(site.fractional),
    cartesian: list(site.cartesian),
    multiplicity: site.multiplicity,
    siteSymmetryOrder: site.siteSymmetryOrder,
    wyckoff: site.wyckoff,
    siteSymmetry: site.siteSymmetry,
    distinctOrientations: site.distinctOrientations,
    forced: site.forced,
    equivalents: site.equivalents.map(({ operation, fractional }) => ({
      operation,
      fractional: list(fractional),
    })),
    shielding: shieldingJson(site.shielding),
    shift: shiftJson(site.shift),
    efg: efgJson(site.efg),
    source: { file: site.source.file, line: site.source.line },
  };
}

function crystalJson(dossier: CrystalHead) {
  const { lattice, symmetry } = dossier;
  return {
    name: dossier.name,
    cell: lattice ? { ...lattice.cell, volume: lattice.volume } : null,
    lattice: lattice ? nested(lattice.rows) : null,
    frame: lattice?.frame ?? null,
    symmetry: {
      number: symmetry.number,
      hermannMauguin: symmetry.hermannMauguin,
      ...(symmetry.named !== undefined && { named: symmetry.named }),
      hall: symmetry.hall,
      operations: symmetry.operations.length,
      source: symmetry.source,
      reason: symmetry.reason,
    },
    atoms: dossier.atomsInCell,
    composition: dossier.composition,
  };
}

/**
 * The document of `ellipsite sites --json`, schema `ellipsite/sites/1`, in pieces of one site each, which are made one after
 * the other, so that a crystal of any size can be written; notes say why what is null is so. Without a crystal, where no structure was read, it tells the
 * problems of reading.
 */
export function* sitesJson(begun: BegunDossier | null, ofReading: readonly Problem[]): Generator<string> {
  const crystal = begun ? crystalJson(begun.head) : null;
  yield `{\n "schema": "ellipsite/sites/1",\n "crystal": ${JSON.stringify(crystal, null, 1)},\n "sites": [`;
  let separator = '\n';
  const nulls = begun && watchUndefined(begun.head, begun.crystal.place);
  for (let index = 0; begun && index < begun.siteCount; index += 1) {
    const site = begun.site(index);
    nulls?.see(site);
    yield separator + JSON.stringify(siteJson(site), null, 1);
    separator = ',\n';
  }
  begun?.reportBonds();
  const problems = [...(begun?.problems() ?? ofReading), ...(nulls?.notes() ?? [])];
  yield `],\n "problems": ${JSON.stringify(problems, null, 1)}\n}\n`;
}
