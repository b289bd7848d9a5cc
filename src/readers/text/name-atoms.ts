import type { FoundAtom, FoundStructure } from './found-structure.ts';
import type { RawTensor } from './raw-tensor.ts';

/** Which atom each tensor of a group belongs to. */
export interface NamedAtoms {
  readonly structureIndex: number | null;
  readonly names: readonly AtomName[];
}

export interface AtomName {
  readonly label: string | null;
  readonly element: string | null;
  readonly index: number | null;
  readonly atomIndex: number | null;
}

type Finder = (tensor: RawTensor, index: number | null) => number;

/**
 * Names of the atoms of a group, elements and rows taken from the text's own structure: the last one before the group that
 * holds all its atoms, else the first after it. Numbers that start from 0 are counted from 1.
 */
export function nameAtoms(
  tensors: readonly RawTensor[],
  structures: readonly FoundStructure[],
  speciesOf: (count: number, line: number) => readonly string[] | null,
): NamedAtoms {
  const first = tensors[0]?.line ?? 0;
  const fromZero = tensors.some(({ atom }) => atom?.index === 0);
  const shift = fromZero ? 1 : 0;
  const indices = tensors.map(({ atom }, at) =>
    atom?.index === undefined || atom.index === null
      ? isUnnumbered(tensors)
        ? at + 1
        : null
      : atom.index + shift,
  );
  const order = structures
    .map((structure, at) => ({ structure, at }))
    .sort((p, q) => rank(p.structure, first) - rank(q.structure, first));
  for (const { structure, at } of order) {
    const rows = rowsIn(structure, tensors, indices);
    if (rows)
      return {
        structureIndex: at,
        names: tensors.map((raw, i) => nameOf(raw, indices[i]!, rows[i]!, structure)),
      };
  }
  const bare = tensors.every(({ atom }) => atom?.element === null && atom.label === null);
  const most = Math.max(0, ...indices.map((index) => index ?? 0));
  const elements = bare && most > 1 ? speciesOf(most, first) : null;
  return {
    structureIndex: null,
    names: tensors.map((raw, i) => {
      const element = elements?.[(indices[i] ?? 0) - 1];
      const named =
        element === undefined || raw.atom === null ? raw : { ...raw, atom: { ...raw.atom, element } };
      return nameOf(named, indices[i]!, null, null);
    }),
  };
}

/** Structures before the group come first, the nearest of them ahead. */
function rank({ line }: FoundStructure, first: number): number {
  return line <= first ? first - line : 1e12 + line;
}

function isUnnumbered(tensors: readonly RawTensor[]): boolean {
  return tensors.every(({ atom }) => atom?.index === null);
}

function rowsIn(
  structure: FoundStructure,
  tensors: readonly RawTensor[],
  indices: readonly (number | null)[],
): number[] | null {
  const byIndex = new Map<string, number>();
  const byNumber = new Map<number, number>();
  const byLabel = new Map<string, number>();
  const counts = new Map<string, number>();
  structure.atoms.forEach(({ element, index, label }, row) => {
    const count = (counts.get(element) ?? 0) + 1;
    counts.set(element, count);
    byIndex.set(`${element}:${count}`, row);
    byNumber.set(structure.countsWithinElement ? row + 1 : index, row);
    byLabel.set(label, byLabel.has(label) ? -1 : row);
  });
  const fits = (row: number | undefined, raw: RawTensor): number => {
    const atom = row === undefined ? undefined : structure.atoms[row];
    const element = raw.atom?.element ?? null;
    return atom && (element === null || element === atom.element) ? row! : -1;
  };
  const overall: Finder = (raw, index) => fits(index === null ? undefined : byNumber.get(index), raw);
  const within: Finder = (raw, index) => fits(byIndex.get(`${raw.atom?.element ?? ''}:${index}`), raw);
  const labelled: Finder = (raw) => fits(byLabel.get(raw.atom?.label ?? ''), raw);
  const orders = structure.countsWithinElement ? [labelled, within, overall] : [labelled, overall, within];
  for (const find of orders) {
    const rows = tensors.map((raw, at) => find(raw, indices[at] ?? null));
    if (rows.every((row) => row >= 0) && new Set(rows).size === rows.length) return rows;
  }
  return null;
}

function nameOf(
  raw: RawTensor,
  index: number | null,
  row: number | null,
  structure: FoundStructure | null,
): AtomName {
  const own: FoundAtom | undefined = row === null ? undefined : structure?.atoms[row];
  const element = raw.atom?.element ?? own?.element ?? null;
  const glued = raw.atom?.label ?? null;
  const hasNumber = glued !== null && /^[A-Za-z]+_?\d/.test(glued);
  const numbered = index === null ? null : `${element ?? ''}${index}`;
  return {
    label: hasNumber ? glued : (numbered ?? glued ?? own?.label ?? null),
    element,
    index,
    atomIndex: row,
  };
}
