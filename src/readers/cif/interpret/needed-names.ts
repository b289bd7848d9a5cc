import { levelName } from './block-view.ts';

/** How the names start from which structures and tensors are read; all others belong to loops nobody asks for. */
const neededStarts = [
  '_atom_',
  '_cell_',
  '_space_group',
  '_symmetry',
  '_chemical_',
  '_exptl_crystal_',
  '_diffrn_ambient_',
  '_audit_',
  '_ellipsite_',
] as const;

/** True for a name whose values the interpretation may ask for, in either dialect and any case. */
export function isNeededName(name: string): boolean {
  const levelled = levelName(name);
  return neededStarts.some((start) => levelled.startsWith(start));
}
