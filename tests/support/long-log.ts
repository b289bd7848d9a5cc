import { seededRandom } from '#src/base/seeded-random.ts';

type Write = (line: string) => void;
type Random = () => number;

const settings = [
  'kinetic cutoff          : 60.0',
  'grid spacing            : 0.12',
  'mixing of densities     : 0.35',
  'smearing                : none',
  'charge of the cell      : 0',
  'number of bands         : 96',
];

/** A number in a field of fixed width. */
function field(random: Random, size: number, digits = 6, width = 12): string {
  return ((random() - 0.5) * 2 * size).toFixed(digits).padStart(width);
}

function iterations(write: Write, random: Random): void {
  write('  Self-consistency');
  write('  cycle        energy / a.u.        change      seconds');
  for (let cycle = 1; cycle <= 24; cycle++) {
    const energy = (-412 - random()).toFixed(8).padStart(20);
    const seconds = (cycle * 3.7).toFixed(1).padStart(10);
    write(
      `  ${String(cycle).padStart(5)} ${energy} ${(random() * 10 ** -(cycle / 3)).toExponential(3)} ${seconds}`,
    );
  }
  write('  Self-consistency was reached.');
  write('');
}

function levels(write: Write, random: Random): void {
  for (let point = 1; point <= 8; point++) {
    write(`  Levels at point ${point} of 8, in eV`);
    let level = -22;
    for (let row = 0; row < 12; row++) {
      const values = Array.from({ length: 8 }, () => (level += random() * 0.4).toFixed(4).padStart(10));
      write(`  ${values.join('')}`);
    }
    write('');
  }
}

function forces(write: Write, random: Random, atoms: number): void {
  write('  Forces on the atoms, hartree per bohr');
  for (let atom = 1; atom <= atoms; atom++) {
    const values = [0, 1, 2].map(() => field(random, 0.02, 8, 14)).join('');
    write(`  ${String(atom).padStart(4)} ${atom % 3 === 0 ? 'Si' : 'O '} ${values}`);
  }
  write('');
}

function coefficients(write: Write, random: Random): void {
  write('  Coefficients of the orbitals');
  for (let row = 1; row <= 120; row++) {
    const name = ['s', 'px', 'py', 'pz'][row % 4]!;
    const values = Array.from({ length: 6 }, () => field(random, 1, 5, 11)).join('');
    write(`  ${String(row).padStart(4)} ${name.padEnd(3)} ${values}`);
  }
  write('');
}

function timings(write: Write, random: Random): void {
  write('  Times of the parts of this step');
  for (const part of ['density', 'potential', 'transforms', 'projectors', 'mixing', 'output to disk']) {
    const calls = Math.floor(random() * 500);
    write(
      `    ${part.padEnd(16)} called ${String(calls).padStart(5)} times: ${(random() * 90).toFixed(2)} s`,
    );
  }
  write('  ------------------------------------------------------------');
}

function tensors(write: Write, random: Random, atoms: number): void {
  write('  Shielding tensors, ppm');
  for (let atom = 1; atom <= atoms; atom++) {
    write(`  Atom ${atom} ${atom % 3 === 0 ? 'Si' : 'O'}`);
    for (let row = 0; row < 3; row++) {
      write(
        `  ${[0, 1, 2].map((k) => field(() => random() * 0.2 + (k === row ? 0.8 : 0.4), 300, 3)).join('')}`,
      );
    }
  }
  write('');
}

/** An invented log of about so many characters: sections of a long run, few of which hold tensors. */
export function longLog(characters: number): string {
  const random = seededRandom(9);
  const lines: string[] = [];
  let length = 0;
  const write: Write = (line) => {
    lines.push(line);
    length += line.length + 1;
  };
  for (let step = 1; length < Math.min(characters, 1e6); step++) {
    write(`  Step ${step} of the run`);
    settings.forEach((line) => write(`  ${line}`));
    iterations(write, random);
    levels(write, random);
    forces(write, random, 36);
    coefficients(write, random);
    timings(write, random);
    if (step % 10 === 0) tensors(write, random, 6);
  }
  const part = `${lines.join('\n')}\n`;
  return part.repeat(Math.max(1, Math.round(characters / part.length)));
}
