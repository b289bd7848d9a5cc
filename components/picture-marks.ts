import type { Vec3 } from '#src/store/dossier-types.ts';
import type { MeasuredAtom } from '#src/scene/measurement.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { PickedAtom, Selection } from '#src/store/state.ts';

export type { PickedAtom } from '#src/store/state.ts';

export function pickedAtom(entry: PickEntry | null): PickedAtom | null {
  if (entry?.kind !== 'atom') return null;
  const { atomId, cellShift, siteIndex } = entry;
  return { atomId, cellShift, siteIndex };
}

export function isSameAtom(one: MeasuredAtom, other: MeasuredAtom): boolean {
  return one.atomId === other.atomId && one.cellShift.join() === other.cellShift.join();
}

/** Atoms taken one after another: one that is there already goes, as a second press takes a mark away. */
export function toggled(atoms: readonly PickedAtom[], atom: PickedAtom): PickedAtom[] {
  const rest = atoms.filter((one) => !isSameAtom(one, atom));
  return rest.length < atoms.length ? rest : [...rest, atom];
}

/** Where the drawn copies of atoms stand, Å; of those that are drawn. */
function drawnPositions(scene: Scene, wanted: (entry: PickEntry) => boolean): Vec3[] {
  const found: Vec3[] = [];
  const { centres, pickIds, count } = scene.quadrics;
  let last = 0;
  for (let i = 0; i < count; i++) {
    const pickId = pickIds[i]!;
    const entry = scene.picks[pickId - 1];
    if (!entry || pickId === last || !wanted(entry)) continue;
    last = pickId;
    found.push([centres[3 * i]!, centres[3 * i + 1]!, centres[3 * i + 2]!]);
  }
  return found;
}

export function selectionOf({ siteIndex, atomId }: Extract<PickEntry, { kind: 'atom' }>): Selection {
  return { siteIndex, atomId };
}

/** The atoms a selection means: the one, or all of the site; of a site that is not drawn, those on its position. */
export function atomIds({ picks, drawnInstead }: Scene, selection: Selection | null): string[] {
  if (!selection) return [];
  const instead = drawnInstead?.get(selection.siteIndex);
  if (selection.atomId !== null && instead === undefined) return [selection.atomId];
  const wanted = instead ?? selection.siteIndex;
  const ids = picks.flatMap((pick) => (pick.kind === 'atom' && pick.siteIndex === wanted ? pick.atomId : []));
  return [...new Set(ids)];
}

/** Middle of some points; null of none. */
export function middleOf(points: readonly Vec3[]): Vec3 | null {
  const n = points.length;
  if (n === 0) return null;
  const [x, y, z] = points.reduce<Vec3>((sum, p) => [sum[0] + p[0], sum[1] + p[1], sum[2] + p[2]], [0, 0, 0]);
  return [x / n, y / n, z / n];
}

/** Where the picked atoms stand, or all drawn atoms of the selected site. */
export function selectedPositions(
  scene: Scene,
  marks: readonly PickedAtom[],
  selection: Selection | null,
): Vec3[] {
  const ids = new Set(atomIds(scene, selection));
  return drawnPositions(scene, (entry) => {
    if (entry.kind !== 'atom') return false;
    return marks.length > 0 ? marks.some((mark) => isSameAtom(mark, entry)) : ids.has(entry.atomId);
  });
}
