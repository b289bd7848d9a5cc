import type { Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromRows, toCartesian, toFractional } from '#src/crystal/lattice.ts';
import type { AtomTable } from './atom-table.ts';
import type { BondFit } from './bond-fit.ts';
import { bondFit } from './bond-fit.ts';
import type { LatticeChoice, LatticeReading } from './lattice-choices.ts';
import { angstromIn } from './length-words.ts';

/** Positions of a table in one of the ways it can be read. */
export interface PositionReading {
  readonly lattice: Lattice | null;
  readonly fractional: readonly VecFrac[] | null;
  readonly cartesian: readonly VecCart[] | null;
  /** One unit of the last printed digit, Å. */
  readonly stepAngstrom: number;
  readonly words: string;
}

interface Way {
  readonly kind: 'fractional' | 'cartesian';
  /** Å in one of the printed units. */
  readonly factor: number;
  readonly triple: number;
  readonly words: string;
}

/** Nearest neighbours, over the sum of covalent radii, between which positions are believed. */
const believedWithWords = { least: 0.4, most: 3 };
const believedWithout = { least: 0.65, most: 1.6 };

/**
 * Positions of the atoms of a table. Words decide between fractional and Cartesian and the unit; what they leave open is
 * decided by the distances between neighbours. null where no reading gives distances between atoms that are believed.
 */
export function positionReading(
  table: AtomTable,
  elements: readonly string[],
  choice: LatticeChoice | null,
): PositionReading | null {
  const real = elements.map((element, i) => (element === 'X' ? -1 : i)).filter((i) => i >= 0);
  const kept = real.map((i) => elements[i]!);
  const readings: (LatticeReading | null)[] = choice ? [...choice.readings] : [null];
  const limits = table.evidence.areCoordinates === 'yes' ? believedWithWords : believedWithout;
  let best: { reading: PositionReading; cost: number } | null = null;
  for (const [r, reading] of readings.entries()) {
    const lattice = reading ? latticeFromRows(reading.rows, frameWords(choice!)) : null;
    for (const [w, way] of waysOf(table, reading).entries()) {
      const made = positions(table, way, lattice, reading);
      const { cartesian } = made;
      const fit =
        cartesian &&
        bondFit(
          kept,
          real.map((i) => cartesian[i]!),
          lattice?.rows ?? null,
        );
      if (fit && !(fit.median > limits.least && fit.median < limits.most)) continue;
      const cost = costOf(fit) + 0.02 * w + 0.02 * r;
      if (!best || cost < best.cost) best = { reading: made, cost };
    }
  }
  return best?.reading ?? null;
}

/** 0 for neighbours at their usual distance; atoms on top of each other weigh much. */
function costOf(fit: BondFit | null): number {
  if (!fit) return 0.5;
  return Math.abs(Math.log(fit.median)) + (fit.least < 0.55 ? 0.5 : 0);
}

function frameWords(choice: LatticeChoice): string {
  return choice.kind === 'constants' ? 'from lengths and angles: the frame is assumed' : 'as printed';
}

function waysOf(table: AtomTable, lattice: LatticeReading | null): Way[] {
  const copies = lengthCopies(table);
  if (copies) return [copies];
  const { frame, units } = table.evidence;
  const ways: Way[] = [];
  const unit = units[0];
  if (frame === 'fractional' || (frame === null && unit === undefined && lattice)) {
    ways.push({ kind: 'fractional', factor: 1, triple: 0, words: 'fractional' });
    if (frame === 'fractional') return ways;
  }
  const cartesian = (factor: number, words: string): Way => ({ kind: 'cartesian', factor, triple: 0, words });
  if (unit === 'scale') {
    const factor = lattice?.scaleAngstrom ?? null;
    return factor === null ? [] : [cartesian(factor, 'Cartesian, multiples of a length')];
  }
  if (unit !== undefined) return [cartesian(angstromIn[unit], `Cartesian (${unit})`)];
  ways.push(cartesian(1, 'Cartesian, unit not named: Å by the distances'));
  ways.push(cartesian(angstromIn.bohr, 'Cartesian, unit not named: bohr by the distances'));
  if (lattice?.scaleAngstrom)
    ways.push(cartesian(lattice.scaleAngstrom, 'Cartesian, multiples of a length by the distances'));
  return ways;
}

/** The same positions printed in bohr and in Å side by side: the Å ones. */
function lengthCopies({ rows }: AtomTable): Way | null {
  if ((rows[0]?.triples.length ?? 0) < 2) return null;
  const same = (factor: number): boolean =>
    rows.every(({ triples: [p, q] }) =>
      p!.every((value, i) => Math.abs(value * factor - q![i]!) < 2e-3 + 1e-4 * Math.abs(value)),
    );
  const spread = rows.some(({ triples: [p] }) => Math.hypot(...p!) > 0.5);
  if (!spread) return null;
  const words = 'Cartesian, in bohr and Å side by side';
  if (same(angstromIn.bohr)) return { kind: 'cartesian', factor: 1, triple: 1, words };
  return same(1 / angstromIn.bohr) ? { kind: 'cartesian', factor: 1, triple: 0, words } : null;
}

function positions(
  table: AtomTable,
  way: Way,
  lattice: Lattice | null,
  reading: LatticeReading | null,
): PositionReading {
  const printed: readonly Vec3[] = table.rows.map(({ triples }) => triples[way.triple]!);
  const longest = lattice ? Math.max(lattice.cell.a, lattice.cell.b, lattice.cell.c) : 1;
  const unit = way.kind === 'fractional' ? longest : way.factor;
  const stepAngstrom = 10 ** -table.decimals[way.triple]! * unit;
  const words = [way.words, reading ? `lattice: ${reading.words}` : ''].filter((w) => w !== '').join('; ');
  if (way.kind === 'fractional') {
    const fractional = printed as readonly VecFrac[];
    const cartesian = lattice && fractional.map((p) => toCartesian(lattice, p));
    return { lattice, fractional, cartesian, stepAngstrom, words };
  }
  const cartesian = printed.map((p) => scale(way.factor, p) as VecCart);
  const fractional = lattice && cartesian.map((p) => toFractional(lattice, p));
  return { lattice, fractional, cartesian, stepAngstrom, words };
}
