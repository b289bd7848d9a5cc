import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, identity3, scaleMatrix } from '#src/base/matrix3.ts';
import { add, cross, distance, length, scale, subtract } from '#src/base/vector3.ts';
import { rigidRotation } from './rigid-rotation.ts';

export interface MoleculeAtoms {
  readonly positions: readonly Vec3[];
  readonly elements: readonly string[];
}

/** y = R x + shift takes the source to the molecule, each atom to at most one. */
export interface MoleculeFit {
  readonly rotation: Mat3;
  readonly shift: Vec3;
  readonly links: readonly {
    readonly source: number;
    readonly target: number;
    readonly distanceAngstrom: number;
  }[];
  readonly rmsAngstrom: number;
  readonly isMirrored: boolean;
}

/** Å: atoms farther apart are not one; two distances of a triple may differ by this much. */
const reach = 0.7;
const tripleTolerance = 0.35;
const mostTriples = 20_000;
const excellentAngstrom = 0.02;

function linksOf(source: MoleculeAtoms, target: MoleculeAtoms, rotation: Mat3, shift: Vec3) {
  const pairs: { source: number; target: number; distanceAngstrom: number }[] = [];
  source.positions.forEach((position, s) => {
    const at = add(apply(rotation, position), shift);
    target.positions.forEach((other, t) => {
      if (source.elements[s] !== target.elements[t]) return;
      const distanceAngstrom = distance(at, other);
      if (distanceAngstrom <= reach) pairs.push({ source: s, target: t, distanceAngstrom });
    });
  });
  pairs.sort((p, q) => p.distanceAngstrom - q.distanceAngstrom);
  const [usedSource, usedTarget] = [new Set<number>(), new Set<number>()];
  return pairs.filter(({ source: s, target: t }) => {
    if (usedSource.has(s) || usedTarget.has(t)) return false;
    usedSource.add(s);
    usedTarget.add(t);
    return true;
  });
}

/** Best rotation and shift of paired points (Kabsch 1976, by quaternions: Horn 1987), and the links they give. */
function refined(
  source: MoleculeAtoms,
  target: MoleculeAtoms,
  pairs: readonly { readonly source: number; readonly target: number }[],
  isMirrored: boolean,
): MoleculeFit {
  let links = pairs;
  let fit: MoleculeFit | null = null;
  for (let round = 0; round < 4; round += 1) {
    const sign = isMirrored ? -1 : 1;
    const from = links.map(({ source: s }) => scale(sign, source.positions[s]!));
    const onto = links.map(({ target: t }) => target.positions[t]!);
    const { rotation: proper, shift } = rigidRotation(from, onto);
    const rotation = scaleMatrix(sign, proper);
    const next = linksOf(source, target, rotation, shift);
    const squares = next.reduce((sum, { distanceAngstrom: d }) => sum + d * d, 0);
    const better = {
      rotation,
      shift,
      links: next,
      isMirrored,
      rmsAngstrom: Math.sqrt(squares / Math.max(1, next.length)),
    };
    if (fit && cost(better, source) >= cost(fit, source) - 1e-9) break;
    fit = better;
    if (next.length < 3) break;
    links = next;
  }
  return fit!;
}

function cost({ links, rmsAngstrom }: MoleculeFit, { positions }: MoleculeAtoms): number {
  const missing = positions.length - links.length;
  return Math.sqrt((rmsAngstrom ** 2 * links.length + missing * reach ** 2) / positions.length);
}

/** Three atoms of rare elements far from one line; fewer where there are no three. */
function triple({ positions, elements }: MoleculeAtoms): number[] {
  const counts = new Map<string, number>();
  for (const element of elements) counts.set(element, (counts.get(element) ?? 0) + 1);
  const rare = elements
    .map((_e, i) => i)
    .sort((p, q) => counts.get(elements[p]!)! - counts.get(elements[q]!)! || p - q);
  const first = rare[0]!;
  const second = rare.find((i) => distance(positions[i]!, positions[first]!) > 0.9);
  if (second === undefined) return [first];
  const u = subtract(positions[second]!, positions[first]!);
  const third = rare.find(
    (i) => length(cross(u, subtract(positions[i]!, positions[first]!))) > 0.6 * length(u),
  );
  return third === undefined ? [first, second] : [first, second, third];
}

function* candidatePairs(source: MoleculeAtoms, target: MoleculeAtoms) {
  const chosen = triple(source);
  const ofElement = (i: number): number[] =>
    target.elements.flatMap((element, t) => (element === source.elements[i] ? [t] : []));
  const gap = (atoms: MoleculeAtoms, i: number, j: number): number =>
    distance(atoms.positions[i]!, atoms.positions[j]!);
  const agrees = (p: number, q: number, tp: number, tq: number): boolean =>
    tp !== tq && Math.abs(gap(source, p, q) - gap(target, tp, tq)) < tripleTolerance;
  const [a, b, c] = chosen;
  for (const ta of ofElement(a!)) {
    if (b === undefined) yield [{ source: a!, target: ta }];
    for (const tb of b === undefined ? [] : ofElement(b)) {
      if (!agrees(a!, b!, ta, tb)) continue;
      const two = [
        { source: a!, target: ta },
        { source: b!, target: tb },
      ];
      if (c === undefined) yield two;
      for (const tc of c === undefined ? [] : ofElement(c)) {
        if (agrees(a!, c!, ta, tc) && agrees(b!, c!, tb, tc)) yield [...two, { source: c!, target: tc }];
      }
    }
  }
}

/**
 * Lays one molecule on another by a rigid rotation, with atoms linked by element and distance: three atoms of rare elements
 * are laid on all triples of like distances, each superposition refined over all atoms. A mirror image is taken only where no
 * rotation does as well. Null where less than three quarters of the atoms are found or they lie more than 0.4 Å off.
 */
export function matchMolecule(source: MoleculeAtoms, target: MoleculeAtoms): MoleculeFit | null {
  if (source.positions.length === 0) return null;
  const direct = linksOf(source, target, identity3, [0, 0, 0]);
  const squares = direct.reduce((sum, { distanceAngstrom: d }) => sum + d * d, 0);
  const rmsAngstrom = Math.sqrt(squares / Math.max(1, direct.length));
  let best: MoleculeFit = {
    rotation: identity3,
    shift: [0, 0, 0],
    links: direct,
    rmsAngstrom,
    isMirrored: false,
  };
  for (const isMirrored of [false, true]) {
    let tried = 0;
    for (const pairs of candidatePairs(source, target)) {
      if (cost(best, source) < excellentAngstrom || (tried += 1) > mostTriples) break;
      const fit = refined(source, target, pairs, isMirrored);
      if (cost(fit, source) < cost(best, source) - (isMirrored ? 0.02 : 1e-9)) best = fit;
    }
  }
  return best.links.length >= 0.75 * source.positions.length && cost(best, source) <= 0.4 ? best : null;
}
