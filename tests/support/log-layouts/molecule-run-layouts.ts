import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { decoys } from './decoys.ts';
import type { LogLayout, Place } from './log-writer.ts';
import {
  blockLines,
  cells,
  component,
  isotropic,
  LogWriter,
  randomNine,
  rounded,
  symmetricRounded,
} from './log-writer.ts';
import { moleculeRun, timings } from './run-up.ts';

const axes = ['x', 'y', 'z'] as const;
const mass: Readonly<Record<string, number>> = { H: 1, C: 13, N: 15, O: 17, Na: 23, Al: 27, Si: 29 };

/** A blank line after each row of an axis. */
const airyRows: LogLayout = (system) => {
  const log = new LogWriter(system).add(...moleculeRun(system), ' NMR shielding tensors [ppm]', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(` ${mass[atom.element]}${atom.element}  number ${atom.overall}`, '');
    axes.forEach((axis, i) => log.add(`     ${axis}   ${cells(t.slice(3 * i, 3 * i + 3))}`, ''));
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Rows grow by one number: the lower half only. */
const lowerHalf: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ' Electric field gradient at each nucleus (atomic units)',
    '',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 6);
    log.add(`  Atom ${atom.element}${atom.overall}`, '                x            y            z');
    axes.forEach((axis, i) => log.add(`     ${axis} ${cells(t.slice(3 * i, 3 * i + i + 1), 6)}`));
    log.add('');
    log.expect(atom, 'efg', 'au', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** The name stands beside the middle row of a matrix between bars. */
const besideMiddleRow: LogLayout = (system) => {
  const log = new LogWriter(system).add(...moleculeRun(system), ' Absolute shieldings, ppm', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 3);
    const rows = [0, 3, 6].map((i) => `|${cells(t.slice(i, i + 3), 3, 11)} |`);
    log.add(
      `                 ${rows[0]}`,
      `  sigma(${atom.element}${atom.overall})`.padEnd(14) + ` = ${rows[1]}`,
      `                 ${rows[2]}`,
      '',
    );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Number of the atom and both places in one bracket. */
const threeIndices: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ' EFG tensor elements V(atom,i,j) in a.u.',
    '',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 8);
    t.forEach((value, at) =>
      log.add(
        `  V(${String(atom.overall).padStart(2)},${Math.floor(at / 3) + 1},${(at % 3) + 1}) = ${value.toExponential(10).replace('e', 'D').padStart(20)}`,
      ),
    );
    log.add('');
    log.expect(atom, 'efg', 'au', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Diamagnetic and paramagnetic parts after the total, each with its isotropic value. */
const totalFirst: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ...decoys.susceptibility!(system),
    ' CHEMICAL SHIELDINGS (ppm)',
    '',
  );
  for (const atom of system.atoms) {
    const total = rounded(atom.shielding, 3);
    const dia = rounded(
      total.map((v, i) => (i % 4 === 0 ? v * 1.3 : v * 0.4)),
      3,
    );
    const para = rounded(
      total.map((v, i) => v - dia[i]!),
      3,
    );
    log.add(` Nucleus ${atom.overall - 1}${atom.element} :`, '');
    for (const [name, t] of [
      ['Total', total],
      ['Diamagnetic', dia],
      ['Paramagnetic', para],
    ] as const)
      log.add(`   ${name} tensor:`, ...blockLines(t, 3), `     iso = ${isotropic(t).toFixed(3)}`, '');
    log.expect(atom, 'shielding', 'ppm', total);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Names of elements in full, numbers in words of their own. */
const fullNames: LogLayout = (system) => {
  const names: Record<string, string> = {
    H: 'Hydrogen',
    C: 'Carbon',
    N: 'Nitrogen',
    O: 'Oxygen',
    Na: 'Sodium',
    Al: 'Aluminium',
    Si: 'Silicon',
  };
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ' Nuclear magnetic shielding tensor',
    ' (parts per million)',
    '',
  );
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(`  ${names[atom.element]} no. ${atom.within}`, '  ----', ...blockLines(t), '');
    log.expect(atom, 'shielding', 'ppm', t, { within: true });
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Named components, three on a line, in small letters and with exponents. */
const namedThreeALine: LogLayout = (system) => {
  const lines: Place[][] = [
    ['xx', 'yy', 'zz'],
    ['xy', 'xz', 'yz'],
  ];
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ' Field gradient integrals, sum of nuclei and electrons',
    '',
  );
  for (const atom of system.atoms) {
    const nuclear = randomNine(system.random, 0.4);
    const total = symmetricRounded(atom.efg, 6);
    log.add(`  center ${atom.overall}  charge ${atom.atomicNumber}.0`);
    for (const [name, t] of [
      ['nuclear', nuclear],
      ['electronic', total.map((v, i) => v - nuclear[i]!)],
      ['total', total],
    ] as const)
      for (const places of lines)
        log.add(
          `    ${name.padEnd(11)}${places.map((place) => `${place} = ${component(t, place).toFixed(6).padStart(11)}`).join('   ')}`,
        );
    log.add('');
    log.expect(atom, 'efg', 'au', total);
  }
  return log
    .add(' all values in atomic units', ...timings(system))
    .printsStructure()
    .written();
};

/** Some atoms only, and components that were not computed. */
const someNotComputed: LogLayout = (system) => {
  const log = new LogWriter(system).add(...moleculeRun(system), ' sigma tensors / ppm', '');
  for (const atom of system.atoms.filter(({ overall }) => overall !== 2)) {
    const t = rounded(atom.shielding, 3);
    const rows = blockLines(t, 3);
    if (atom.overall === 1) rows[2] = `${'N/A'.padStart(16)}${'N/A'.padStart(13)}${'N/A'.padStart(13)}`;
    log.add(`  ${atom.element} (atom ${atom.overall})`, ...rows, '');
    if (atom.overall !== 1) log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Directions and values in columns: three values over three vectors, after the tensor. */
const analysisAfterwards: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...moleculeRun(system),
    ' Shielding tensors (ppm) and their analysis',
    '',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.symmetricShielding);
    const { values, vectors } = symmetricEigen(atom.symmetricShielding);
    log.add(` ${String(atom.overall).padStart(3)} ${atom.element}   tensor`, ...blockLines(t));
    log.add(
      '   principal components and axes',
      cells(values, 3, 16),
      ...axes.map(
        (axis, i) =>
          `   ${axis}${cells(
            vectors.map((v) => v[i]!),
            6,
            13,
          )}`,
      ),
    );
    log.add(`   span ${(values[2]! - values[0]!).toFixed(3)}   iso ${isotropic(t).toFixed(3)}`, '');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Shielding with spin-spin couplings of pairs of the same shape behind. */
const pairsAfterwards: LogLayout = (system) => {
  const log = new LogWriter(system).add(...moleculeRun(system), ' === MAGNETIC SHIELDINGS (ppm) ===', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(` @ ${atom.element}${atom.overall} total shielding tensor`, ...blockLines(t, 4, ' @ '), '');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  log.add(' === INDIRECT SPIN-SPIN COUPLINGS (Hz) ===', '');
  for (const atom of system.atoms.slice(1)) {
    log.add(
      ` @ ${system.atoms[0]!.element}1 - ${atom.element}${atom.overall} coupling tensor`,
      ...blockLines(randomNine(system.random, 20, 40), 4, ' @ '),
      '',
    );
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

export const moleculeRunLayouts: Readonly<Record<string, LogLayout>> = {
  'molecule: blank lines between the rows': airyRows,
  'molecule: the lower half': lowerHalf,
  'molecule: the name beside the middle row': besideMiddleRow,
  'molecule: atom and places in one bracket': threeIndices,
  'molecule: the total first': totalFirst,
  'molecule: names of elements in full': fullNames,
  'molecule: nuclear and electronic parts by name': namedThreeALine,
  'molecule: not all computed': someNotComputed,
  'molecule: analysis after each tensor': analysisAfterwards,
  'molecule: pairs afterwards': pairsAfterwards,
};
