import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { matrixFromRows, rowsOf, scaleMatrix } from '#src/base/matrix3.ts';
import { length, scale } from '#src/base/vector3.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { cellFromRows, rowsProblem } from '#src/crystal/lattice.ts';
import type { LatticeFinding } from './lattice-lines.ts';
import { angstromIn } from './length-words.ts';
import type { ScaleFinding } from './scale-lines.ts';

/** One way to read a lattice: rows in Å, and the length in Å that scaled coordinates are multiples of. */
export interface LatticeReading {
  readonly rows: Mat3;
  readonly scaleAngstrom: number | null;
  readonly words: string;
}

/** A lattice with all readings its words allow, likeliest first; where there are several, the atoms decide. */
export interface LatticeChoice {
  readonly line: number;
  readonly kind: LatticeFinding['kind'];
  readonly readings: readonly LatticeReading[];
}

/** Longest vectors, as printed, that may be multiples of a length without a word that says so. */
const longestScaled = 3;

/** All lattices of a text; lengths and angles that repeat printed vectors are left out, since only vectors carry a frame. */
export function latticeChoices(
  findings: readonly LatticeFinding[],
  scales: readonly ScaleFinding[],
): LatticeChoice[] {
  const named = findings.some(({ kind }) => kind !== 'bare');
  const choices = findings
    .filter(({ kind }) => kind !== 'bare' || !named)
    .map((finding) => ({ line: finding.line, kind: finding.kind, readings: readingsOf(finding, scales) }))
    .filter(({ readings }) => readings.length > 0);
  const cells = choices
    .filter(({ kind }) => kind === 'vectors')
    .flatMap(({ readings }) => readings.map(({ rows }) => cellFromRows(rows)));
  return choices.filter(
    ({ kind, readings }) =>
      kind !== 'constants' || !cells.some((cell) => sameShape(cell, cellFromRows(readings[0]!.rows))),
  );
}

/** The lattices a list of atoms may stand in: the nearest before it, or the nearest after it where none is before. */
export function latticesFor(choices: readonly LatticeChoice[], line: number): LatticeChoice | null {
  return choices.filter((choice) => choice.line <= line).at(-1) ?? choices[0] ?? null;
}

function readingsOf(finding: LatticeFinding, scales: readonly ScaleFinding[]): LatticeReading[] {
  const scaleFound = scales.filter(({ line }) => line <= finding.line).at(-1) ?? scales[0] ?? null;
  const plain = (unit: 'angstrom' | 'bohr' | 'nm'): LatticeReading => ({
    rows: scaleMatrix(angstromIn[unit], finding.rows),
    scaleAngstrom: scaleFound ? (scaledUnits(scaleFound)[0] ?? null) : null,
    words: `${finding.words} (${unitWords[unit]})`,
  });
  const { unit } = finding;
  const found: LatticeReading[] = [];
  if (unit !== null && unit !== 'scale') found.push(plain(unit));
  if (unit === 'scale' || (unit === null && looksScaled(finding.rows)))
    found.push(...scaledReadings(finding, scaleFound));
  if (unit === null) found.push(plain('angstrom'), plain('bohr'));
  return found.filter(({ rows }) => rowsProblem(rows) === null);
}

const unitWords = { angstrom: 'Å', bohr: 'bohr', nm: 'nm' } as const;

function looksScaled(rows: Mat3): boolean {
  return Math.max(...rowsOf(rows).map(length)) < longestScaled;
}

function scaledReadings(finding: LatticeFinding, found: ScaleFinding | null): LatticeReading[] {
  if (!found) return [];
  return scaledUnits(found).map((factor) => {
    const [p, q, r] = rowsOf(finding.rows);
    const f: Vec3 = found.factors.map((value) => (value / found.factors[0]) * factor) as unknown as Vec3;
    return {
      rows: matrixFromRows(scale(f[0], p), scale(f[1], q), scale(f[2], r)),
      scaleAngstrom: factor,
      words: `${finding.words}, multiples of the length in line ${found.line}`,
    };
  });
}

/** Å of the first factor; atomic units first where no unit is named. */
function scaledUnits({ factors, unit }: ScaleFinding): number[] {
  if (unit !== null && unit !== 'scale') return [factors[0] * angstromIn[unit]];
  return [factors[0] * angstromIn.bohr, factors[0]];
}

/** Same angles and same ratios of lengths, whatever the unit. */
function sameShape(p: CellConstants, q: CellConstants): boolean {
  const factor = q.a / p.a;
  const lengths = [p.b * factor - q.b, p.c * factor - q.c].every((d) => Math.abs(d) < 0.002 * q.a);
  const angles = [p.alpha - q.alpha, p.beta - q.beta, p.gamma - q.gamma].every((d) => Math.abs(d) < 0.05);
  return lengths && angles;
}
