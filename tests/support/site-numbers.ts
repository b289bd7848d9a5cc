import { frobeniusNorm, multiply, subtractMatrices, transpose } from '#src/base/matrix3.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';

const fixed = (value: number, digits: number): string => {
  const text = value.toFixed(digits);
  return Number(text) === 0 ? (0).toFixed(digits) : text;
};

/** Every number of a site that the choice of cell, origin of the list or order of rows may not change. */
function siteNumbers(site: SiteDossier, cells: number) {
  const shielding = site.shielding!;
  return {
    element: site.element,
    multiplicity: site.multiplicity / cells,
    equivalents: site.equivalents.length / cells,
    order: site.siteSymmetryOrder,
    wyckoff: site.wyckoff,
    siteSymmetry: site.siteSymmetry,
    orientations: site.distinctOrientations,
    // Directions are named in the given axes; what is forced is not.
    forced: site.forced.replaceAll(/\[[^\]]*\]/g, '[]'),
    values: [shielding.isotropic, ...shielding.components, shielding.span, shielding.antisymmetricNorm].map(
      (x) => fixed(x, 4),
    ),
    skew: shielding.skew === null ? null : fixed(shielding.skew, 4),
    asymmetry: shielding.asymmetry === null ? null : fixed(shielding.asymmetry, 4),
    unprojected: fixed(frobeniusNorm(subtractMatrices(shielding.tensor, shielding.projected)), 4),
    residual: fixed(shielding.symmetryResidual, 4),
    spread: fixed(shielding.equivalentSpread ?? 0, 4),
  };
}

/** The sites of a crystal as sorted texts, multiplicities counted per small cell. */
export function numbers(dossier: CrystalDossier, cells: number): string[] {
  return dossier.sites.map((site) => JSON.stringify(siteNumbers(site, cells))).sort();
}

/** The tensor of every atom in the common Cartesian frame, with how many of `cells` small cells' atoms have it. */
export function field(dossier: CrystalDossier, cells: number): string[] {
  const counts = new Map<string, number>();
  for (const site of dossier.sites) {
    for (const { rotation } of site.equivalents) {
      const turned = multiply(multiply(rotation, site.shielding!.projected), transpose(rotation));
      const key = `${site.element} ${turned.map((x) => fixed(x, 3)).join(' ')}`;
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
  }
  return [...counts].map(([key, count]) => `${key}: ${count / cells}`).sort();
}
