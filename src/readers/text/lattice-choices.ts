import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { matrixFromRows, rowsOf, scaleMatrix, transpose } from '#src/base/matrix3.ts';
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
  const constants = findings
    .filter(({ kind }) => kind === 'constants')
    .map((finding) => ({ line: finding.line, cell: cellFromRows(finding.rows) }));
  const choices = findings
    .filter(({ kind }) => kind !== 'bare' || !named)
    .map((finding) => upright(finding, constants))
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

/**
 * The lattice of a list of atoms between two lines: the nearer one of the last before and the first after it, since some
 * texts print the cell of a step above its atoms and some below.
 */
export function latticeFor(
  choices: readonly LatticeChoice[],
  first: number,
  last: number,
): LatticeChoice | null {
  const before = choices.filter(({ line }) => line <= first).at(-1);
  const after = choices.find(({ line }) => line > last);
  if (!before || !after) return before ?? after ?? null;
  return after.line - last < first - before.line ? after : before;
}

/** Lines within which lengths and angles speak of the same vectors. */
const sameCellLines = 60;

/** Vectors printed as columns: turned, where lengths and angles close by fit the columns and not the rows. */
function upright(
  finding: LatticeFinding,
  constants: readonly { line: number; cell: CellConstants }[],
): LatticeFinding {
  if (finding.kind !== 'vectors') return finding;
  const near = constants.find(({ line }) => Math.abs(line - finding.line) <= sameCellLines);
  const columns = transpose(finding.rows);
  if (!near || sameShape(near.cell, cellFromRows(finding.rows))) return finding;
  if (!sameShape(near.cell, cellFromRows(columns))) return finding;
  return {
    ...finding,
    rows: columns,
    words: `${finding.words}, as columns by the lengths and angles in line ${near.line}`,
  };
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
