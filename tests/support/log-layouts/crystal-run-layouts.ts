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
import type { MadeAtom } from './made-system.ts';
import { crystalRun, cycles, forcesAndStress, kPoints, settings, timings } from './run-up.ts';
import { efgUnits } from './units.ts';

const scaled = (nine: readonly number[], factor: number): number[] => nine.map((v) => v * factor);

/** Core, valence and rest before the total of each atom, under a title that says shift. */
const partsUnderShift: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...crystalRun(system),
    ' Chemical shift tensors (ppm)',
    ' ----------',
    '',
  );
  for (const atom of system.atoms) {
    const total = rounded(atom.shielding, 4);
    const core = rounded(
      [1, 0, 0, 0, 1, 0, 0, 0, 1].map((v) => v * isotropic(total) * 0.8),
      4,
    );
    const rest = rounded(
      total.map((v, i) => v - core[i]!),
      4,
    );
    log.add(` Atom ${atom.overall} (${atom.element})`, '', '   core electrons', ...blockLines(core), '');
    log.add('   valence electrons', ...blockLines(rest), '', '   total', ...blockLines(total), '');
    log.add(`   isotropic value   ${isotropic(total).toFixed(4)}`, '');
    log.expect(atom, 'shielding', 'ppm', total);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** The order of the six is told once, far above many tensors. */
const orderFarAbove: LogLayout = (system) => {
  const order: Place[] = ['xx', 'xy', 'yy', 'xz', 'yz', 'zz'];
  const log = new LogWriter(system).add(
    ...crystalRun(system, 'angstrom'),
    ' Electric field gradients at the nuclei in V/Angstrom**2',
    ' components are given in the order  xx  xy  yy  xz  yz  zz',
    '',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['V/A2']));
    const values = order.map((place) => component(t, place));
    log.add(` ion ${String(atom.overall).padStart(4)} ${cells(values, 4, 12)}`);
    log.expect(atom, 'efg', 'V/A2', t);
  }
  return log
    .add('', ...timings(system))
    .printsStructure()
    .written();
};

/** Six in the notation of engineers. */
const voigt: LogLayout = (system) => {
  const order: Place[] = ['xx', 'yy', 'zz', 'yz', 'xz', 'xy'];
  const log = new LogWriter(system).add(
    ...crystalRun(system),
    ' EFG TENSORS, Voigt notation (11, 22, 33, 23, 13, 12), units of 10^21 V/m^2',
    ' ------------------------------------------------------------------------------',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['1e21V/m2']));
    log.add(
      `  ${atom.element}_${atom.within}`.padEnd(10) +
        cells(
          order.map((place) => component(t, place)),
          4,
          11,
        ),
    );
    log.expect(atom, 'efg', '1e21V/m2', t, { within: true });
  }
  return log
    .add('', ...timings(system))
    .printsStructure()
    .written();
};

/** One tensor in atomic units, and again as a frequency: the second is no field gradient. */
const alsoAsFrequency: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ' Electric field gradient', '');
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 6);
    log.add(` nucleus ${atom.overall - 1}: ${atom.element}`, '   tensor [a.u.]', ...blockLines(t, 6));
    log.add('   times eQ/h [MHz]', ...blockLines(scaled(t, 17.3), 6), '');
    log.expect(atom, 'efg', 'au', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Heads of pages fall between a name and its numbers, and between rows. */
const pageHeads: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...crystalRun(system, 'angstrom'),
    ' Absolute magnetic shielding, ppm',
    '',
  );
  let page = 3;
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 3);
    const rows = blockLines(t, 3);
    const head = [
      '',
      `\f job 4711       2031-04-17 09:12:44                              page ${page++}`,
      '',
    ];
    log.add(`  Site ${atom.element}${atom.overall}`);
    if (atom.overall % 3 === 1) log.add(...head);
    log.add(rows[0]!, rows[1]!);
    if (atom.overall % 3 === 2) log.add(...head);
    log.add(rows[2]!, '');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.printsStructure().written();
};

/** A run that ends in the middle of a tensor, after a complete one in the same file. */
const secondRunBroke: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ' Magnetic shielding tensors / ppm', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(`  atom ${atom.overall}   ${atom.element}`, ...blockLines(t));
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add('', ...timings(system), '', ...settings(system), ...kPoints(system, 8), ...cycles(system, 6))
    .add(' Magnetic shielding tensors / ppm', '', `  atom 1   ${system.atoms[0]!.element}`)
    .add(blockLines(scaled(system.atoms[0]!.shielding, 1.01))[0]!)
    .printsStructure()
    .written();
};

/** Principal values with their directions, one on a line, and no tensor. */
const valuesAndDirections: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...crystalRun(system),
    ' Field gradient tensors, principal axis system',
    '',
  );
  for (const atom of system.atoms) {
    const { values, vectors } = symmetricEigen(atom.efg);
    const si = values.map((v) => v * efgUnits['1e21V/m2']);
    log.add(`  ${atom.element} ${atom.overall}       V (10^21 V/m^2)          direction cosines`);
    values.forEach((_, k) => {
      log.add(
        `      V${['xx', 'yy', 'zz'][k]}   ${cells([si[k]!], 6, 14)}     (${cells(vectors[k]!, 7, 12)} )`,
      );
    });
    log.add('');
    log.expect(atom, 'efg', '1e21V/m2', scaled(atom.efg, efgUnits['1e21V/m2']), { tolerance: 2e-5 });
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Blocks of several atoms side by side under one line of their names. */
const atomsSideBySide: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...crystalRun(system),
    ' Shielding tensors in ppm, several atoms a line',
    '',
  );
  for (let from = 0; from < system.atoms.length; from += 3) {
    const few = system.atoms.slice(from, from + 3);
    const tensors = few.map((atom) => rounded(atom.shielding, 2));
    log.add(few.map((atom) => `   atom ${atom.overall} (${atom.element})`.padEnd(36)).join(''));
    for (const i of [0, 3, 6])
      log.add(tensors.map((t) => cells(t.slice(i, i + 3), 2, 10) + '      ').join(''));
    log.add('');
    few.forEach((atom, k) => log.expect(atom, 'shielding', 'ppm', tensors[k]!));
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Two structures, each with its tensors: the last is relaxed. */
const twoCalculations: LogLayout = (system) => {
  const moved = {
    ...system,
    atoms: system.atoms.map((atom): MadeAtom => ({
      ...atom,
      position: [atom.position[0] + 0.03, atom.position[1], atom.position[2]],
    })),
  };
  const log = new LogWriter(system);
  for (const [k, now] of [moved, system].entries()) {
    log.add(
      ...crystalRun(now),
      ...decoys['Born charges']!(system),
      ' NMR shielding',
      '   sigma (ppm), full tensor',
      '',
    );
    for (const atom of now.atoms) {
      const t = rounded(scaled(atom.shielding, k === 0 ? 1.004 : 1));
      log.add(`   [${atom.overall}] ${atom.element}`, ...blockLines(t, 4, '      '), '');
      if (k === 1) log.expect(atom, 'shielding', 'ppm', t);
    }
    log.add(...timings(system), '');
  }
  return log.printsStructure(2).written();
};

/** Five numbers on a line of fixed width, the other four on the next. */
const wrappedNumbers: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...crystalRun(system),
    ' Chemical shielding tensor for each atom (ppm)',
    '',
  );
  for (const atom of system.atoms) {
    const t = atom.shielding.map((v) => Number(v.toExponential(8)));
    const texts = t.map((v) =>
      v
        .toExponential(8)
        .toUpperCase()
        .replace(/E([+-])(\d)$/, 'E$10$2')
        .padStart(17),
    );
    log.add(
      `  atom: ${atom.element} ${atom.within}`,
      texts.slice(0, 5).join(''),
      texts.slice(5).join(''),
      '',
    );
    log.expect(atom, 'shielding', 'ppm', t, { within: true });
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Sections of a kind of atom, the atoms counted in each. */
const bySpecies: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ' EFG (atomic units)', '');
  for (const element of new Set(system.atoms.map((atom) => atom.element))) {
    log.add(` Species ${element}`, ' '.padEnd(14, '-'));
    for (const atom of system.atoms.filter((own) => own.element === element)) {
      const t = symmetricRounded(atom.efg, 7);
      const texts = blockLines(t, 7);
      log.add(`   atom ${atom.within}`, ...texts);
      log.add(`   Vzz ${symmetricEigen(atom.efg).values[2]!.toFixed(5)}`, '');
      log.expect(atom, 'efg', 'au', t, { within: true });
    }
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Both quantities, each with forms and a mean of the cell behind. */
const bothWithForms: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ...decoys.dielectric!(system));
  log.add(' *** Magnetic shielding tensors, ppm ***', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(` ${atom.element}(${atom.within})`, '   Full tensor', ...blockLines(t), '   Symmetric part');
    log.add(
      ...blockLines(t.map((v, i) => (v + t[(i % 3) * 3 + Math.floor(i / 3)]!) / 2)),
      '   Antisymmetric part',
    );
    log.add(...blockLines(t.map((v, i) => (v - t[(i % 3) * 3 + Math.floor(i / 3)]!) / 2)), '');
    log.expect(atom, 'shielding', 'ppm', t, { within: true });
    const half = rounded(t.map((v, i) => (v + t[(i % 3) * 3 + Math.floor(i / 3)]!) / 2));
    log.expect(atom, 'shielding', 'ppm', half, { within: true, onlyAllowed: true, tolerance: 1.1e-4 });
  }
  log.add(' *** Electric field gradient tensors, 1E21 V/m^2 ***', '');
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['1e21V/m2']));
    log.add(` ${atom.element}(${atom.within})`, ...blockLines(t), '');
    log.expect(atom, 'efg', '1e21V/m2', t, { within: true });
  }
  return log
    .add(...forcesAndStress(system), ...timings(system))
    .printsStructure()
    .written();
};

/** Numbers of the rows before them and of the columns above. */
const numberedRowsAndColumns: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ' Shielding (ppm)', '');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 5);
    log.add(`   Nucleus:  ${atom.overall}  ${atom.element}`, '               1             2             3');
    for (const i of [0, 3, 6]) log.add(`     ${i / 3 + 1} ${cells(t.slice(i, i + 3), 5, 14)}`);
    log.add(`   1/3 trace: ${isotropic(t).toFixed(5)}`, '');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log
    .add(...timings(system))
    .printsStructure()
    .written();
};

/** Things of a tensor's shape for each atom and none of them ours. */
const onlyDecoysInRun: LogLayout = (system) => {
  const log = new LogWriter(system).add(...crystalRun(system), ...decoys['Born charges']!(system));
  log.add(' Anisotropic displacement parameters (Angstrom^2), U11 U22 U33 U23 U13 U12');
  for (const { element, overall } of system.atoms)
    log.add(
      `   ${element}${overall} ${cells(
        [
          ...randomNine(system.random, 0.004)
            .slice(0, 3)
            .map((v) => 0.01 + v),
          0.001,
          0.002,
          -0.001,
        ],
        5,
        10,
      )}`,
    );
  log.add('', ' Force constants between atoms (hartree/bohr^2)');
  for (const { element, overall } of system.atoms.slice(1))
    log.add(
      `   1 ${system.atoms[0]!.element} -- ${overall} ${element}`,
      ...blockLines(randomNine(system.random, 0.1, 0.2), 6),
    );
  log.add('', ' Atomic dipole-dipole tensors of the polarizability (bohr^3)');
  for (const { element, overall } of system.atoms)
    log.add(`   ${overall} ${element}`, ...blockLines(randomNine(system.random, 1, 8), 4));
  return log
    .add('', ...timings(system))
    .printsStructure()
    .written();
};

export const crystalRunLayouts: Readonly<Record<string, LogLayout>> = {
  'run: parts and total under a title of shift': partsUnderShift,
  'run: order of six told far above': orderFarAbove,
  'run: six in the notation of engineers': voigt,
  'run: field gradient again as a frequency': alsoAsFrequency,
  'run: heads of pages within tensors': pageHeads,
  'run: a second one that broke off': secondRunBroke,
  'run: principal values with directions only': valuesAndDirections,
  'run: blocks of three atoms side by side': atomsSideBySide,
  'run: two calculations after each other': twoCalculations,
  'run: numbers wrapped at a fixed width': wrappedNumbers,
  'run: sections of a species': bySpecies,
  'run: both quantities in several forms': bothWithForms,
  'run: numbered rows and columns': numberedRowsAndColumns,
  'run: nothing of ours': onlyDecoysInRun,
};
