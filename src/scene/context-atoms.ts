import type { Vec3 } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import { electronegativity, elementClass } from '#src/data/radii.ts';
import type { DrawnAtom, ExtentInput } from './drawn-atoms.ts';
import { atomsById, copiesById, copyOf, shiftKey } from './drawn-atoms.ts';

/**
 * Atoms outside that complete the coordination of drawn ones, each once: anions about cations, and either partner of a bond
 * between alike non-metals. A cation outside is not added to an anion inside, which would only fray the picture. Their own
 * bonds to one another are not wanted.
 */
export function bondedNeighbours(input: ExtentInput, drawn: readonly DrawnAtom[]): DrawnAtom[] {
  return missingPartners(input, drawn, (inside, outside) => completes(inside.site.element, outside));
}

/** Atoms outside that are bonded to drawn atoms of the given elements: corners of their coordination polyhedra. */
export function missingLigands(
  input: ExtentInput,
  drawn: readonly DrawnAtom[],
  elements: readonly string[],
): DrawnAtom[] {
  return missingPartners(
    input,
    drawn,
    ({ site, context }, outside) => !context && elements.includes(site.element) && outside !== site.element,
  );
}

function missingPartners(
  { dossier, hidden }: ExtentInput,
  drawn: readonly DrawnAtom[],
  isWanted: (inside: DrawnAtom, outside: string) => boolean,
): DrawnAtom[] {
  const atoms = atomsById(dossier);
  const copies = copiesById(drawn);
  const added = new Map<string, DrawnAtom>();
  const addMissing = (inside: DrawnAtom, id: string, cellShift: Vec3) => {
    if (copies.at(id, cellShift)) return;
    const known = atoms.get(id);
    if (!known || hidden.has(known.site.index) || !isWanted(inside, known.site.element)) return;
    const name = `${id} ${shiftKey(cellShift)}`;
    if (!added.has(name)) added.set(name, copyOf(dossier, known.atom, known.site, cellShift, true));
  };
  for (const bond of dossier.bonds) {
    if (bond.kind !== 'bond') continue;
    for (const from of copies.of(bond.from)) {
      addMissing(from, bond.to, add(from.cellShift, bond.shift));
    }
    for (const to of copies.of(bond.to)) {
      addMissing(to, bond.from, subtract(to.cellShift, bond.shift));
    }
  }
  return [...added.values()];
}

/** Difference of electronegativity (Pauling's scale) beyond which a bond has a cation and an anion. Our own choice. */
const ionicDifference = 1;

/** Whether an atom outside belongs to the coordination of one inside. */
function completes(inside: string, outside: string): boolean {
  if (elementClass(outside) === 'metal') return elementClass(inside) === 'metal';
  const [one, other] = [electronegativity(inside), electronegativity(outside)];
  if (one === null || other === null || elementClass(outside) === 'hydrogen') return true;
  return one - other <= ionicDifference;
}
