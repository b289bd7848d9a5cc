import { apply, inverse, transpose } from '#src/base/matrix3.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import { cells, randomNine, randomVector } from './log-writer.ts';
import type { MadeSystem } from './made-system.ts';

const bohr = 0.529177210544;

export function fractionalOf({ lattice }: MadeSystem, position: Vec3): Vec3 {
  return apply(transpose(inverse(lattice)), position);
}

/** Settings, timings and memory as any long calculation tells them at its beginning. */
export function settings({ random, atoms }: MadeSystem): string[] {
  return [
    '==============================================================================',
    ' started 2031-04-17 08:12:55   on 16 processes x 4 threads',
    '==============================================================================',
    ' plane-wave cutoff          =   60.0000 hartree      (1632.68 eV)',
    ' density cutoff             =  240.0000 hartree',
    ` electrons                  =   ${(atoms.length * 8).toFixed(2)}`,
    ' exchange and correlation   =   gradient-corrected',
    ' spin polarisation          =   none',
    ' smearing                   =   0.0050 eV',
    ` random seed                =   ${Math.floor(random() * 99999)}`,
    '',
  ];
}

export function latticeInBohr({ lattice }: MadeSystem): string[] {
  return [
    ' Lattice vectors (bohr)',
    ...[0, 3, 6].map(
      (i) =>
        `   ${'abc'[i / 3]} = ${cells(
          lattice.slice(i, i + 3).map((v) => v / bohr),
          7,
          14,
        )}`,
    ),
    '',
  ];
}

export function latticeInAngstrom({ lattice }: MadeSystem): string[] {
  const [a, b, c] = [0, 3, 6].map((i) => Math.hypot(...lattice.slice(i, i + 3)));
  return [
    ' Unit cell, vectors in Angstrom',
    ...[0, 3, 6].map((i) => `   ${cells(lattice.slice(i, i + 3), 7, 14)}`),
    ` lengths ${cells([a!, b!, c!], 5, 11)}`,
    '',
  ];
}

/** Kinds of atoms with mass and valence electrons. */
export function speciesTable({ atoms }: MadeSystem): string[] {
  const kinds = [...new Map(atoms.map((atom) => [atom.element, atom])).values()];
  return [
    ' species   Z     valence      mass (u)     radius (bohr)   atoms',
    ...kinds.map(
      ({ element, atomicNumber }) =>
        `   ${element.padEnd(6)}${String(atomicNumber).padStart(3)}${cells([atomicNumber % 8 || 2, atomicNumber * 2.02, 1.4 + atomicNumber / 40], 4, 12)}${String(
          atoms.filter((other) => other.element === element).length,
        ).padStart(8)}`,
    ),
    '',
  ];
}

export function fractionalPositions(system: MadeSystem): string[] {
  return [
    ' Fractional coordinates of the atoms',
    ...system.atoms.map(
      ({ element, overall, position }) =>
        `   ${String(overall).padStart(3)}  ${element.padEnd(3)}${cells(fractionalOf(system, position), 7, 13)}`,
    ),
    '',
  ];
}

export function cartesianPositions({ atoms }: MadeSystem): string[] {
  return [
    ' Geometry (x, y, z in Angstrom)',
    ...atoms.map(({ element, position }) => `   ${element.padEnd(3)}${cells(position, 6, 13)}`),
    '',
  ];
}

export function kPoints({ random }: MadeSystem, count = 24): string[] {
  return [
    ` ${count} k-points (fractions of the reciprocal vectors), weights`,
    ...Array.from(
      { length: count },
      (_, i) =>
        `  k(${String(i + 1).padStart(3)}) = (${cells(randomVector(random, 0.5), 5, 10)} ), w = ${(1 / count).toFixed(6)}`,
    ),
    '',
  ];
}

export function cycles({ random }: MadeSystem, count = 14): string[] {
  return [
    ' cycle      total energy (Ha)        change           residual      seconds',
    ...Array.from(
      { length: count },
      (_, i) =>
        `  ${String(i + 1).padStart(3)}   ${(-312.4 - random() / 10 ** i).toFixed(10).padStart(18)}   ${(-random() / 10 ** i).toExponential(4)}   ${(random() / 10 ** i).toExponential(3)}   ${((i + 1) * 3.21).toFixed(2).padStart(8)}`,
    ),
    ` converged after ${count} cycles`,
    '',
  ];
}

export function forcesAndStress({ atoms, random }: MadeSystem): string[] {
  return [
    ' Forces (hartree/bohr)',
    ...atoms.map(
      ({ element, overall }) =>
        `   ${element.padEnd(3)}${String(overall).padStart(3)}${cells(randomVector(random, 0.003), 6, 13)}`,
    ),
    '   sum   ' + cells(randomVector(random, 0.0001), 6, 13),
    '',
    ' Stress tensor (GPa)              volume 417.221 Angstrom^3',
    ...[0, 3, 6].map((i) => `   ${cells(randomNine(random, 0.4, 1).slice(i, i + 3), 5)}`),
    ' pressure = 0.912 GPa',
    '',
  ];
}

export function charges({ atoms, random }: MadeSystem): string[] {
  return [
    ' Charges and populations',
    '  atom         s         p         d      total    charge',
    ...atoms.map(
      ({ element, overall }) =>
        `  ${element.padEnd(3)}${String(overall).padStart(4)}${cells([...randomVector(random, 3).map(Math.abs), 5 + random(), random() - 0.5], 4, 10)}`,
    ),
    '',
  ];
}

export function orbitals({ random }: MadeSystem, count = 40): string[] {
  return [
    ' Orbital energies (hartree)',
    ...Array.from(
      { length: count },
      (_, i) =>
        `  ${String(i + 1).padStart(4)}  ${i < count / 2 ? '2.0000' : '0.0000'}  ${(-20 + i + random()).toFixed(6).padStart(12)}  ${((-20 + i) * 27.2114).toFixed(4).padStart(12)}`,
    ),
    '',
  ];
}

export function bondTable({ atoms, random }: MadeSystem): string[] {
  return [
    ' Distances (Angstrom)',
    ...atoms
      .slice(1)
      .map(
        ({ element, overall }) =>
          `   ${atoms[0]!.element}1 - ${element}${overall}   ${(1 + random() * 2).toFixed(4)}`,
      ),
    '',
  ];
}

export function timings({ random }: MadeSystem): string[] {
  return [
    ' Timing (s)                 calls       wall        cpu',
    ...['setup', 'iteration', 'response', 'current', 'exchange', 'total'].map(
      (name) =>
        `   ${name.padEnd(22)}${String(Math.floor(random() * 400)).padStart(6)}${cells([random() * 900, random() * 3600], 2, 12)}`,
    ),
    ' peak memory 1843.2 MB',
    ' finished 2031-04-17 09:40:11',
  ];
}

/** All that a periodic calculation prints before its properties; the structure is the system's. */
export function crystalRun(system: MadeSystem, lengths: 'bohr' | 'angstrom' = 'bohr'): string[] {
  return [
    ...settings(system),
    ...(lengths === 'bohr' ? latticeInBohr(system) : latticeInAngstrom(system)),
    ...speciesTable(system),
    ...fractionalPositions(system),
    ...kPoints(system),
    ...cycles(system),
    ...forcesAndStress(system),
    ...charges(system),
  ];
}

/** All that a calculation of a molecule prints before its properties. */
export function moleculeRun(system: MadeSystem): string[] {
  return [
    ...settings(system),
    ...cartesianPositions(system),
    ...bondTable(system),
    ...cycles(system),
    ...orbitals(system),
    ...charges(system),
    ' Dipole moment (debye):     x    0.1342   y   -1.2230   z    0.0021   total   1.2303',
    ' Traceless quadrupole moment (debye Angstrom)',
    '   xx   1.2031   xy  -0.2211   yy   -2.0012   xz   0.0210   yz   0.0923   zz   0.7981',
    '',
  ];
}
