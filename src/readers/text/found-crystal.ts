import { identity3 } from '#src/base/matrix3.ts';
import type { VecCart } from '#src/base/matrix3.ts';
import type { Crystal, CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { FoundStructure } from './found-structure.ts';

/** A structure in a text names no symmetry: identity only, and a gap rather than P 1. */
const unstatedSymmetry: CrystalSymmetry = {
  operations: [{ rotation: identity3, translation: [0, 0, 0] }],
  number: null,
  hermannMauguin: null,
  hall: null,
  source: 'none',
  reason: 'the atoms were found in a text: every atom of the cell is listed',
  stated: false,
};

/** A structure that was found in a text as a crystal or, without a lattice, a molecule. */
export function foundCrystal(found: FoundStructure, file: string): Crystal {
  const { atoms, lattice, line } = found;
  const sites = atoms.map(({ label, element, fractional, cartesian, line: at }, index): Site => {
    const own = cartesian ?? (lattice && fractional ? toCartesian(lattice, fractional) : null);
    return {
      index,
      label,
      ...(label === `${element}${index + 1}` && { isNumbered: true as const }),
      element,
      species: [{ element, occupancy: 1 }],
      occupancy: 1,
      charge: null,
      fractional,
      cartesian: own ?? ([0, 0, 0] as unknown as VecCart),
      displacement: null,
      disorder: null,
      calcFlag: null,
      refinementFlags: null,
      attachedHydrogens: 0,
      place: { file, line: at },
    };
  });
  return {
    name: `${file}, line ${line}`,
    lattice,
    periodic: [lattice !== null, lattice !== null, lattice !== null],
    symmetry: unstatedSymmetry,
    sites,
    formula: { sum: null, units: null },
    temperatureK: null,
    place: { file, line },
  };
}
