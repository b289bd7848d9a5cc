import type { Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import { apply, identity3, transpose } from '#src/base/matrix3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromRows, rowsProblem } from '#src/crystal/lattice.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { AtomImage, MovedAtom } from './attachment.ts';
import type { AttachTarget, Binding } from './binding.ts';
import { displacementsOf, nameOf } from './binding.ts';
import { frameRotation, sameCell } from './frame-rotation.ts';
import { latticeStrain } from './lattice-maps.ts';
import { matchMolecule } from './match-molecule.ts';
import { positionFinder } from './match-positions.ts';
import type { PositionMatch } from './match-positions.ts';
import type { StructureMatch } from './match-structure.ts';
import { matchStructure, rotationOfFit } from './match-structure.ts';
import type { StructureAtoms } from './structure-atoms.ts';
import { chemicalElement } from './structure-atoms.ts';
import type { StructureFit } from './structure-fit.ts';

/** An atom of the source's structure. */
export interface SourceAtom {
  readonly label: string;
  readonly element: string;
  readonly cartesian: VecCart;
}

/** The source's atoms, and which of them each entry of the set is. */
export interface SourceStructure {
  readonly lattice: Lattice | null;
  readonly atoms: readonly SourceAtom[];
  readonly atomOfEntry: readonly (number | null)[];
}

/** The atoms of a set: all of its structure where that is known, else those with tensors. */
export function sourceOf(set: TensorSet, all: readonly SourceAtom[] | null): SourceStructure {
  if (all)
    return { lattice: set.lattice, atoms: all, atomOfEntry: set.entries.map(({ atomIndex }) => atomIndex) };
  const atoms: SourceAtom[] = [];
  const atomOfEntry = set.entries.map((entry, row) => {
    if (!entry.cartesian) return null;
    atoms.push({ label: nameOf(entry, row), element: entry.element, cartesian: entry.cartesian });
    return atoms.length - 1;
  });
  return { lattice: set.lattice, atoms, atomOfEntry };
}

interface Linked {
  readonly atom: number;
  readonly image: number;
  readonly distanceAngstrom: number;
}

function bindingOf(
  source: SourceStructure,
  links: readonly Linked[],
  about: Pick<Binding, 'rotation' | 'frameFrom' | 'repeats'> &
    Pick<Binding['mapping'], 'basis' | 'originShift' | 'strain' | 'handedness'>,
  cellsAway = 0,
): Binding {
  const imagesOf = new Map<number, number[]>();
  const furthest = new Map<number, number>();
  for (const { atom, image, distanceAngstrom } of links) {
    imagesOf.set(atom, [...(imagesOf.get(atom) ?? []), image]);
    furthest.set(atom, Math.max(furthest.get(atom) ?? 0, distanceAngstrom));
  }
  const moved = [...furthest].map(([atom, value]): MovedAtom => ({
    label: source.atoms[atom]!.label,
    value,
  }));
  const { rms, largest, doubtful } = displacementsOf(moved);
  const unmatched = source.atoms.flatMap(({ label }, atom) => (imagesOf.has(atom) ? [] : [label]));
  const { basis, originShift, strain, handedness, ...binding } = about;
  return {
    ...binding,
    images: source.atomOfEntry.map((atom) => (atom === null ? [] : (imagesOf.get(atom) ?? []))),
    cellsAway,
    mapping: {
      method: 'geometry',
      atoms: source.atoms.length,
      matched: source.atoms.length - unmatched.length,
      unmatched,
      doubtful,
      rmsDisplacementAngstrom: rms,
      maxDisplacement: largest,
      ...{ basis, originShift, strain, handedness },
    },
  };
}

/** The source's own cell and origin taken for the crystal's: each atom on the nearest one of its element. */
export function bindInPlace(
  source: SourceStructure,
  setLattice: Lattice,
  lattice: Lattice,
  target: AttachTarget,
): Binding {
  const chemical = target.images.map((image): AtomImage => ({
    ...image,
    element: chemicalElement(image.element),
  }));
  const find = positionFinder(lattice, chemical, target.periodic);
  const links: (Linked & PositionMatch)[] = [];
  source.atoms.forEach(({ cartesian, element }, atom) => {
    const match = find(apply(setLattice.toFractional, cartesian), chemicalElement(element));
    if (match) links.push({ ...match, atom, image: match.imageIndex });
  });
  const about = {
    rotation: frameRotation(setLattice, lattice),
    frameFrom: 'lattice',
    repeats: false,
    basis: identity3,
    originShift: [0, 0, 0],
    strain: latticeStrain(setLattice.rows, identity3, lattice.rows),
    handedness: 'same',
  } as const;
  return bindingOf(source, links, about, links.filter(({ isCellsAway }) => isCellsAway).length);
}

function structureAtoms(
  lattice: Lattice,
  atoms: readonly { element: string; fractional: Vec3 }[],
): StructureAtoms {
  return {
    lattice,
    positions: atoms.map(({ fractional }) => fractional as VecFrac),
    elements: atoms.map(({ element }) => chemicalElement(element)),
  };
}

/** Whether the source holds all atoms of its elements: as many a volume as the crystal has, or more. */
function isComplete(source: StructureAtoms, target: StructureAtoms): boolean {
  const count = (atoms: readonly string[]): Map<string, number> => {
    const counts = new Map<string, number>();
    for (const element of atoms) counts.set(element, (counts.get(element) ?? 0) + 1);
    return counts;
  };
  const [own, whole] = [count(source.elements), count(target.elements)];
  return [...own].every(([element, n]) => {
    const wanted = ((whole.get(element) ?? 0) * source.lattice.volume) / target.lattice.volume;
    return n > 0.8 * wanted && n < 1.25 * wanted + 1;
  });
}

function fromFit(
  source: SourceStructure,
  atoms: StructureAtoms,
  crystal: StructureAtoms,
  fit: StructureFit,
): Binding {
  const links = fit.links.map((link) => ({
    atom: link.source,
    image: link.target,
    distanceAngstrom: link.distanceAngstrom,
  }));
  return bindingOf(source, links, {
    rotation: rotationOfFit(atoms, fit.basis, crystal),
    frameFrom: 'lattice',
    repeats: true,
    basis: fit.basis,
    originShift: fit.shift,
    strain: latticeStrain(atoms.lattice.rows, fit.basis, crystal.lattice.rows),
    handedness: fit.isMirrored ? 'mirrored' : 'same',
  });
}

/** What came of comparing positions; `refusal` where no way of laying the one on the other was found. */
export interface PositionBinding {
  readonly binding: Binding | null;
  readonly refusal: Exclude<StructureMatch, { kind: 'match' }> | null;
  readonly isAmbiguous: boolean;
  readonly isTransposed: boolean;
  /** How often a wrong structure would agree as well, where structures were matched; else null. */
  readonly chance: number | null;
}

const share = ({ mapping }: Binding): number => mapping.matched / Math.max(1, mapping.atoms);
/** In place this good, Å, nothing else is looked for. */
const goodInPlaceAngstrom = 0.1;
/** Fewer atoms lie on others by chance. */
const fewestAtoms = 4;

function isBetter(fit: StructureFit, inPlace: Binding): boolean {
  const missing = 1 - share(inPlace);
  const cost = Math.hypot(
    (inPlace.mapping.rmsDisplacementAngstrom ?? 0) * Math.sqrt(1 - missing),
    0.7 * Math.sqrt(missing),
  );
  return fit.costAngstrom < 0.8 * cost - 0.01;
}

function bindWith(
  source: SourceStructure,
  setLattice: Lattice,
  target: AttachTarget,
  lattice: Lattice,
): PositionBinding {
  const plain = { refusal: null, isAmbiguous: false, isTransposed: false, chance: null };
  const inPlace = sameCell(setLattice.cell, lattice.cell)
    ? bindInPlace(source, setLattice, lattice, target)
    : null;
  const rms = inPlace?.mapping.rmsDisplacementAngstrom ?? Infinity;
  if (inPlace && share(inPlace) === 1 && rms <= goodInPlaceAngstrom) return { ...plain, binding: inPlace };
  const atoms = structureAtoms(
    setLattice,
    source.atoms.map(({ element, cartesian }) => ({
      element,
      fractional: apply(setLattice.toFractional, cartesian),
    })),
  );
  const crystal = structureAtoms(
    lattice,
    target.images.map(({ element, fractional }) => ({ element, fractional: fractional ?? [0, 0, 0] })),
  );
  const complete = isComplete(atoms, crystal);
  if (inPlace && (!complete || source.atoms.length < fewestAtoms)) return { ...plain, binding: inPlace };
  const match = matchStructure(atoms, crystal, target.operations ?? []);
  if (match.kind === 'match' && (complete || source.atoms.length >= fewestAtoms)) {
    if (inPlace && !isBetter(match.fit, inPlace)) return { ...plain, binding: inPlace };
    return {
      ...plain,
      binding: fromFit(source, atoms, crystal, match.fit),
      isAmbiguous: match.rivals.length > 0,
      chance: match.chance,
    };
  }
  const refusal =
    match.kind === 'match'
      ? ({ kind: 'other-atoms', best: match.fit, largestAngstrom: match.largestAngstrom } as const)
      : match;
  return { ...plain, binding: inPlace, refusal: inPlace ? null : refusal };
}

/**
 * Binds by position: in place where the cells are one and the atoms agree, else by matching the structures. A lattice that fits only
 * with rows and columns exchanged is taken so: lengths and angles (AᵀA) tell where the nine numbers alone do not.
 */
export function bindByPosition(
  source: SourceStructure,
  target: AttachTarget,
  lattice: Lattice,
): PositionBinding | null {
  const given = source.lattice;
  if (!given) return null;
  const found = bindWith(source, given, target, lattice);
  if (found.binding && share(found.binding) >= 0.5) return found;
  const exchanged = transpose(given.rows);
  if (exchanged.every((x, i) => Math.abs(x - given.rows[i]!) < 1e-6) || rowsProblem(exchanged)) return found;
  const turned = latticeFromRows(exchanged, `${given.frame}, rows and columns exchanged`);
  const atoms = source.atoms.map((atom) => ({
    ...atom,
    cartesian: apply(turned.toCartesian, apply(given.toFractional, atom.cartesian)) as VecCart,
  }));
  for (const candidate of [source, { ...source, atoms }]) {
    const other = bindWith(candidate, turned, target, lattice);
    if (other.binding && share(other.binding) >= 0.75) return { ...other, isTransposed: true };
  }
  return found;
}

/** One molecule on another by a rigid rotation; null where it is another molecule. */
export function bindMolecule(
  source: SourceStructure,
  positions: readonly VecCart[],
  target: AttachTarget,
): Binding | null {
  const fit = matchMolecule(
    {
      positions: source.atoms.map(({ cartesian }) => cartesian),
      elements: source.atoms.map(({ element }) => chemicalElement(element)),
    },
    { positions, elements: target.images.map(({ element }) => chemicalElement(element)) },
  );
  if (!fit) return null;
  const links = fit.links.map((link) => ({
    atom: link.source,
    image: link.target,
    distanceAngstrom: link.distanceAngstrom,
  }));
  return bindingOf(source, links, {
    rotation: fit.rotation,
    frameFrom: 'positions',
    repeats: false,
    basis: null,
    originShift: fit.shift,
    strain: null,
    handedness: fit.isMirrored ? 'mirrored' : 'same',
  });
}
