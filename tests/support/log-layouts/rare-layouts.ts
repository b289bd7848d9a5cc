import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { decoys, noise, someDecoys } from './decoys.ts';
import type { LogLayout, Place } from './log-writer.ts';
import {
  blockLines,
  cells,
  component,
  isotropic,
  LogWriter,
  positionLines,
  rounded,
  symmetricRounded,
} from './log-writer.ts';
import type { MadeAtom } from './made-system.ts';
import { efgUnits } from './units.ts';

const six: readonly Place[] = ['xx', 'yy', 'zz', 'xy', 'xz', 'yz'];

/** Contributions and total side by side, each three columns wide. */
const sideBySide: LogLayout = (system) => {
  const log = new LogWriter(system).add(...noise(system), 'Shielding at the nuclei (ppm)', '');
  for (const atom of system.atoms) {
    const total = rounded(atom.shielding, 3);
    const dia = rounded(
      total.map((v, i) => (i % 4 === 0 ? v * 0.7 : v * 0.2)),
      3,
    );
    const para = rounded(
      total.map((v, i) => v - dia[i]!),
      3,
    );
    log.add(`Atom ${atom.overall} ${atom.element}`);
    log.add('      diamagnetic                    |      paramagnetic                   |      total');
    for (let i = 0; i < 9; i += 3) {
      log.add(`  ${[dia, para, total].map((t) => cells(t.slice(i, i + 3), 3, 11)).join('  |  ')}`);
    }
    log.add('');
    log.expect(atom, 'shielding', 'ppm', total);
  }
  return log.written();
};

/** One section for each of two tasks; both are complete, the last counts. */
const twoTasks: LogLayout = (system) => {
  const log = new LogWriter(system);
  for (const task of [1, 2]) {
    log.add(`######## TASK ${task} ########`, ...positionLines(system), 'Magnetic shielding tensors [ppm]');
    for (const atom of system.atoms) {
      const tensor = rounded(atom.shielding.map((v) => (task === 1 ? v * 1.02 : v)));
      log.add(`${atom.element} ${atom.overall}`, ...blockLines(tensor));
      if (task === 2) log.expect(atom, 'shielding', 'ppm', tensor);
    }
    log.add(...noise(system));
  }
  return log.written();
};

/** Keys and values by indentation. */
const indentedKeys: LogLayout = (system) => {
  const log = new LogWriter(system).add('nmr:', '  quantity: magnetic shielding', '  unit: ppm', '  sites:');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 5);
    log.add(`    - element: ${atom.element}`, `      number: ${atom.overall}`, '      tensor:');
    [0, 3, 6].forEach((i) =>
      log.add(
        `        - [${t
          .slice(i, i + 3)
          .map((v) => v.toFixed(5))
          .join(', ')}]`,
      ),
    );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** A table for print, with its own marks between cells and at the ends of rows. */
const typesetTable: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '\\caption{Electric field gradient tensors ($10^{21}$ V m$^{-2}$)}',
    '\\hline',
  );
  log.add(`Site & ${six.map((place) => `$V_{${place}}$`).join(' & ')} \\\\`, '\\hline');
  for (const atom of system.atoms) {
    const t = symmetricRounded(
      atom.efg.map((v) => v * efgUnits['1e21V/m2']),
      3,
    );
    const numbers = six.map((place) => component(t, place).toFixed(3).replace('-', '−'));
    log.add(`${atom.element}${atom.within} & ${numbers.join(' & ')} \\\\`);
    log.expect(atom, 'efg', '1e21V/m2', t, { within: true });
  }
  return log.add('\\hline').written();
};

/** Points without a nucleus among the atoms: left out, but counted. */
const ghostsAmongAtoms: LogLayout = (system) => {
  const log = new LogWriter(system).add(...someDecoys(system, 1), 'Nuclear magnetic shielding (ppm)');
  let place = 0;
  for (const atom of system.atoms) {
    place++;
    const tensor = rounded(atom.shielding);
    log.add(`${place} ${atom.element}`, ...blockLines(tensor), '');
    log.expect({ ...atom, overall: place }, 'shielding', 'ppm', tensor);
    if (atom.overall === 2) {
      place++;
      log.add(`${place} Bq`, ...blockLines(rounded(atom.shielding.map((v) => v * 0.01))), '');
    }
  }
  return log.written();
};

/** A number that did not fit its field: that tensor is incomplete. */
const overflow: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    'EFG tensors, V/Angstrom^2',
    `  atom ${six.map((p) => `V${p}`.padStart(10)).join('')}`,
  );
  for (const [i, atom] of system.atoms.entries()) {
    const t = symmetricRounded(
      atom.efg.map((v) => v * efgUnits['V/A2']),
      3,
    );
    const texts = six.map((place) => component(t, place).toFixed(3).padStart(10));
    if (i === 0) texts[3] = ' *********';
    log.add(`  ${atom.element}${atom.overall}  ${texts.join('')}`);
    if (i > 0) log.expect(atom, 'efg', 'V/A2', t);
  }
  return log.written();
};

/** Six without names of components; the printed principal values prove their order. */
const orderByPrincipalValues: LogLayout = (system) => {
  const order: Place[] = ['xx', 'yy', 'zz', 'yz', 'xz', 'xy'];
  const log = new LogWriter(system).add('Shielding tensors, six independent components, ppm');
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.symmetricShielding);
    const { values } = symmetricEigen(t as unknown as MadeAtom['efg']);
    log.add(
      `Atom ${atom.overall} ${atom.element}`,
      `  components: ${cells(order.map((place) => component(t, place)))}`,
    );
    log.add(`  principal values: ${cells(values)}`, `  isotropic: ${isotropic(t).toFixed(4)}`, '');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** Field gradient, hyperfine coupling and shielding of one atom in one section. */
const mixedSections: LogLayout = (system) => {
  const log = new LogWriter(system).add(...positionLines(system));
  for (const atom of system.atoms) {
    const efg = symmetricRounded(atom.efg, 5);
    const sigma = rounded(atom.shielding);
    log.add(`Nucleus ${atom.element}${atom.overall}`, '------------');
    log.add('  Hyperfine A tensor (MHz)', ...blockLines(sigma.map((v) => v * 0.1 + 3)), '');
    log.add('  Electric field gradient (a.u.**-3)', ...blockLines(efg, 5), '');
    log.add('  Shielding (ppm)', ...blockLines(sigma), '');
    log.expect(atom, 'efg', 'au', efg).expect(atom, 'shielding', 'ppm', sigma);
  }
  return log.add(...decoys['g tensor']!(system)).written();
};

/** A nuclide in place of the element, with the site's number. */
const nuclides: LogLayout = (system) => {
  const mass: Record<string, number> = { H: 1, C: 13, N: 15, O: 17, Na: 23, Al: 27, Si: 29 };
  const log = new LogWriter(system).add('Absolute shielding tensors in ppm, one nuclide a block', '');
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding, 3);
    log.add(
      `nuclide ${mass[atom.element]}${atom.element}, site ${atom.within}`,
      ...blockLines(tensor, 3),
      '',
    );
    log.expect(atom, 'shielding', 'ppm', tensor, { within: true });
  }
  return log.written();
};

/** All things of a tensor's shape but the two that are wanted. */
const nothingButDecoys: LogLayout = (system) =>
  new LogWriter(system)
    .add(...Object.values(decoys).flatMap((decoy) => [...decoy(system), ...noise(system)]))
    .written();

/** Pair couplings nine on a row after a table of shieldings. */
const couplingsAfterShieldings: LogLayout = (system) => {
  const log = new LogWriter(system).add('Shielding tensors (ppm)');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 3);
    log.add(`${atom.element}${atom.overall} ${cells(t, 3, 11)}`);
    log.expect(atom, 'shielding', 'ppm', t);
  }
  log.add('', 'Indirect spin-spin coupling tensors (Hz)');
  for (const { element, overall, shielding } of system.atoms.slice(1)) {
    log.add(
      `${system.atoms[0]!.element}1 ${element}${overall} ${cells(
        shielding.map((v) => v * 0.3),
        3,
        11,
      )}`,
    );
  }
  return log.written();
};

/** The unit follows the tensors. */
const unitAfterwards: LogLayout = (system) => {
  const log = new LogWriter(system).add(...someDecoys(system, 1), 'Calculated electric field gradients:', '');
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 6);
    log.add(`  ${atom.overall}:${atom.element}`, ...blockLines(t, 6));
    log.expect(atom, 'efg', 'au', t);
  }
  return log.add('', 'All electric field gradients are in atomic units.').written();
};

export const rareLayouts: Readonly<Record<string, LogLayout>> = {
  'parts and total side by side': sideBySide,
  'a section for each task': twoTasks,
  'keys by indentation': indentedKeys,
  'typeset table': typesetTable,
  'points without a nucleus': ghostsAmongAtoms,
  'a number that overflowed': overflow,
  'order by principal values': orderByPrincipalValues,
  'three tensors in the section of an atom': mixedSections,
  'nuclides in place of elements': nuclides,
  'nothing but decoys': nothingButDecoys,
  'pair couplings after shieldings': couplingsAfterShieldings,
  'unit after the tensors': unitAfterwards,
};
