import type { Vec3 } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { DrawnAtom, ExtentInput } from './drawn-atoms.ts';
import { atomsById, copyOf, mostAtoms, nowhere, shiftKey } from './drawn-atoms.ts';

/**
 * The missing atoms of every finite molecule that some drawn atom belongs to, so that none is cut. Chains, layers and
 * frameworks stay cut. Linear in atoms and bonds.
 */
export function missingMoleculeAtoms(
  { dossier, hidden }: ExtentInput,
  drawn: readonly DrawnAtom[],
): DrawnAtom[] {
  const molecules = finiteMolecules(dossier);
  const atoms = atomsById(dossier);
  const present = new Set(drawn.map(({ atom, cellShift }) => `${atom.id} ${shiftKey(cellShift)}`));
  const seen = new Set<string>();
  const missing: DrawnAtom[] = [];
  for (const { atom, cellShift } of drawn) {
    const members = molecules.get(atom.id);
    if (!members) continue;
    const turn = subtract(cellShift, shiftOf(dossier, atom.id));
    const molecule = `${members[0]} ${shiftKey(turn)}`;
    if (seen.has(molecule)) continue;
    seen.add(molecule);
    for (const id of members) {
      const shift = add(shiftOf(dossier, id), turn);
      const known = atoms.get(id)!;
      if (hidden.has(known.site.index) || present.has(`${id} ${shiftKey(shift)}`)) continue;
      if (drawn.length + missing.length >= mostAtoms) return missing;
      missing.push(copyOf(dossier, known.atom, known.site, shift, false));
    }
  }
  return missing;
}

function shiftOf(dossier: CrystalDossier, id: string): Vec3 {
  return dossier.wholeMolecules[id] ?? nowhere;
}

/** Members of the molecule of each atom in one; atoms alone and those of endless networks are not listed. */
function finiteMolecules(dossier: CrystalDossier): ReadonlyMap<string, readonly string[]> {
  const parents = new Map<string, string>();
  const root = (id: string): string => {
    let top = id;
    for (let up = parents.get(top); up !== undefined; up = parents.get(top)) top = up;
    // shortens the way for the next one who asks
    for (let at = id; at !== top;) {
      const up = parents.get(at)!;
      parents.set(at, top);
      at = up;
    }
    return top;
  };
  const bonds = dossier.bonds.filter(({ kind }) => kind === 'bond');
  const bonded = new Set<string>();
  for (const { from, to } of bonds) {
    bonded.add(from).add(to);
    const [one, other] = [root(from), root(to)];
    if (one !== other) parents.set(one, other);
  }
  const endless = new Set<string>();
  for (const { from, to, shift } of bonds) {
    // in a whole molecule every bond joins its atoms where they have been moved to
    const joined = add(shiftOf(dossier, from), shift);
    if (shiftKey(joined) !== shiftKey(shiftOf(dossier, to))) endless.add(root(from));
  }
  const members = new Map<string, string[]>();
  for (const id of bonded) {
    const top = root(id);
    if (endless.has(top)) continue;
    const known = members.get(top);
    if (known) known.push(id);
    else members.set(top, [id]);
  }
  return new Map([...members.values()].flatMap((ids) => ids.map((id) => [id, ids] as const)));
}
