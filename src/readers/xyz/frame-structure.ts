import type { Crystal, CrystalSymmetry, Site, Species } from '#src/crystal/crystal.ts';
import { identity3 } from '#src/base/matrix3.ts';
import type { VecCart } from '#src/base/matrix3.ts';
import type { Place } from '#src/base/problem.ts';
import { toFractional } from '#src/crystal/lattice.ts';
import type { FrameCell } from './frame-cell.ts';
import type { RowAtom } from './frame-rows.ts';

/** XYZ names no symmetry: identity only, and a gap rather than P 1. */
const unstatedSymmetry: CrystalSymmetry = {
  operations: [{ rotation: identity3, translation: [0, 0, 0] }],
  number: null,
  hermannMauguin: null,
  hall: null,
  source: 'none',
  reason: 'an XYZ file names no symmetry: every atom of the cell is listed',
  stated: false,
};

/**
 * The labels of a frame's atoms: the `site` column, else species fields such as `Si1` where no two are alike, else the
 * element with a running number.
 */
export function labelsOf(atoms: readonly RowAtom[]): string[] {
  const seen = new Set<string>();
  const repeated = new Set<string>();
  for (const { species, speciesText } of atoms) {
    if (!species.labelled) continue;
    if (seen.has(speciesText)) repeated.add(speciesText);
    seen.add(speciesText);
  }
  const running = new Map<string, number>();
  return atoms.map(({ site, species, speciesText }) => {
    const number = (running.get(species.element) ?? 0) + 1;
    running.set(species.element, number);
    if (site !== null) return site;
    return species.labelled && repeated.size === 0 ? speciesText : `${species.element}${number}`;
  });
}

/** One frame as a crystal or, without a cell, a molecule. */
export function frameStructure(
  name: string,
  atoms: readonly RowAtom[],
  labels: readonly string[],
  { lattice, periodic }: FrameCell,
  place: Place,
): Crystal {
  const fullSites = new Map<string, readonly Species[]>();
  const sites = atoms.map((atom, index): Site => {
    const { element, charge } = atom.species;
    const cartesian: VecCart = atom.cartesian ?? [0, 0, 0];
    return {
      index,
      label: labels[index] ?? element,
      ...(isNumbered(atom, labels[index]) && { isNumbered: true as const }),
      element,
      species: sharedSpecies(fullSites, element),
      occupancy: 1,
      charge,
      fractional: lattice === null ? null : toFractional(lattice, cartesian),
      cartesian,
      displacement: null,
      disorder: null,
      calcFlag: null,
      refinementFlags: null,
      attachedHydrogens: 0,
      place: atom.place,
    };
  });
  return {
    name,
    lattice,
    periodic,
    symmetry: unstatedSymmetry,
    sites,
    formula: { sum: null, units: null },
    temperatureK: null,
    place,
  };
}

/** True where a label is neither that of the `site` column nor the species field as it stands. */
function isNumbered({ site, species, speciesText }: RowAtom, label: string | undefined): boolean {
  return site === null && !(species.labelled && label === speciesText);
}

/** One list an element, shared by its sites: a file of a million atoms keeps a handful. */
function sharedSpecies(known: Map<string, readonly Species[]>, element: string): readonly Species[] {
  const found = known.get(element) ?? [{ element, occupancy: 1 }];
  known.set(element, found);
  return found;
}
