import type { Vec3 } from '#src/base/matrix3.ts';
import type { PickEntry } from './scene.ts';

/**
 * The picks of a scene as arrays that cross a worker's border without a copy: tens of thousands of objects would hold up the
 * page that receives them. An atom's id, `site.image` as cellAtoms gives it, is two numbers here.
 */
export interface PackedPicks {
  /** One a pick: see `kinds`. */
  readonly kinds: Uint8Array;
  /** Six a pick. An atom: site, image, shift along a, b, c, 0. A bond: site and image of either end, 0, 0. */
  readonly numbers: Int32Array;
  /** One a pick: length of a bond, Å. */
  readonly lengths: Float64Array;
}

const kinds = { atom: 0, context: 1, bond: 2, hydrogen: 3 } as const;
const perPick = 6;

/** Site and position in its orbit of an atom's id. */
function partsOf(atomId: string): readonly [site: number, image: number] {
  const dot = atomId.indexOf('.');
  return [Number(atomId.slice(0, dot)), Number(atomId.slice(dot + 1))];
}

export function packPicks(picks: readonly PickEntry[]): PackedPicks {
  const packed: PackedPicks = {
    kinds: new Uint8Array(picks.length),
    numbers: new Int32Array(perPick * picks.length),
    lengths: new Float64Array(picks.length),
  };
  picks.forEach((pick, i) => {
    if (pick.kind === 'atom') {
      packed.kinds[i] = pick.context ? kinds.context : kinds.atom;
      packed.numbers.set([pick.siteIndex, partsOf(pick.atomId)[1], ...pick.cellShift], perPick * i);
      return;
    }
    packed.kinds[i] = kinds[pick.bond];
    packed.numbers.set([...partsOf(pick.fromAtomId), ...partsOf(pick.toAtomId)], perPick * i);
    packed.lengths[i] = pick.lengthAngstrom;
  });
  return packed;
}

const nowhere: Vec3 = [0, 0, 0];

export function unpackPicks({ kinds: kindOf, numbers, lengths }: PackedPicks): PickEntry[] {
  const picks: PickEntry[] = [];
  for (let i = 0; i < kindOf.length; i++) {
    const kind = kindOf[i]!;
    const at = perPick * i;
    const first = atomId(numbers, at);
    if (kind > kinds.context) {
      const bond = kind === kinds.bond ? 'bond' : 'hydrogen';
      const toAtomId = atomId(numbers, at + 2);
      picks.push({ kind: 'bond', bond, fromAtomId: first, toAtomId, lengthAngstrom: lengths[i]! });
      continue;
    }
    const siteIndex = numbers[at]!;
    const cellShift = shiftAt(numbers, at + 2);
    picks.push({ kind: 'atom', atomId: first, siteIndex, cellShift, context: kind === kinds.context });
  }
  return picks;
}

function atomId(numbers: Int32Array, at: number): string {
  return `${numbers[at]!}.${numbers[at + 1]!}`;
}

function shiftAt(numbers: Int32Array, at: number): Vec3 {
  const shift: Vec3 = [numbers[at]!, numbers[at + 1]!, numbers[at + 2]!];
  return shift.every((cells) => cells === 0) ? nowhere : shift;
}
