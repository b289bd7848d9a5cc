import type { MadeAtom } from './made-system.ts';
import { decoys, noise, someDecoys } from './decoys.ts';
import type { LogLayout } from './log-writer.ts';
import {
  blockLines,
  cells,
  isotropic,
  LogWriter,
  positionLines,
  rounded,
  symmetricRounded,
} from './log-writer.ts';
import { efgUnits } from './units.ts';

/** Three rows below the name of the atom, partial contributions before the total. */
const blocksAfterNames: LogLayout = (system) => {
  const log = new LogWriter(system).add(...positionLines(system), ...decoys.susceptibility!(system));
  for (const part of ['Diamagnetic contribution (ppm)', 'Paramagnetic contribution (ppm)']) {
    log.add(part);
    for (const { element, overall, shielding } of system.atoms) {
      log.add(
        ` nucleus ${overall} ${element}`,
        ...blockLines(shielding.map((v) => v * (0.4 + 0.1 * system.random()))),
        '',
      );
    }
  }
  log.add('Total magnetic shielding tensors (ppm)');
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding);
    log.add(
      ` nucleus ${atom.overall} ${atom.element}    isotropic: ${isotropic(tensor).toFixed(4)}`,
      ...blockLines(tensor),
      '',
    );
    log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.add(...someDecoys(system)).written();
};

/** The name of the atom beside the first row. */
const blocksBesideNames: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...someDecoys(system),
    'Chemical shielding, sigma in ppm, full tensors',
    '-'.repeat(50),
  );
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding, 3);
    const [first, second, third] = blockLines(tensor, 3, '');
    const name = `${atom.element}${atom.overall}`.padEnd(8);
    log.add(`${name}${first}`, `        ${second}`, `        ${third}`);
    log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.add(...noise(system)).written();
};

/** Rows named x, y, z below a header x, y, z. */
const axisNamedRows: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...decoys.stress!(system),
    'Electric field gradients at the nuclei, atomic units',
    '',
  );
  for (const atom of system.atoms) {
    const tensor = symmetricRounded(atom.efg, 6);
    log.add(`Site ${atom.overall} : ${atom.element}`, '              x            y            z');
    'xyz'.split('').forEach((axis, i) => log.add(`   ${axis}  ${cells(tensor.slice(3 * i, 3 * i + 3), 6)}`));
    log.add('');
    log.expect(atom, 'efg', 'au', tensor);
  }
  return log.add(...someDecoys(system)).written();
};

/** Shielding and field gradient of an atom in one section. */
const bothInOneSection: LogLayout = (system) => {
  const log = new LogWriter(system).add(...positionLines(system));
  for (const atom of system.atoms) {
    const sigma = rounded(atom.shielding);
    const efg = symmetricRounded(atom.efg, 6);
    log.add(
      `***** ATOM ${atom.overall} (${atom.element}) *****`,
      'Shielding tensor [ppm]',
      ...blockLines(sigma),
    );
    log.add(
      `  sigma_iso = ${isotropic(sigma).toFixed(4)}`,
      'Electric field gradient [a.u.]',
      ...blockLines(efg, 6),
      '',
    );
    log.expect(atom, 'shielding', 'ppm', sigma).expect(atom, 'efg', 'au', efg);
  }
  return log.add(...decoys.dielectric!(system)).written();
};

/** Atom numbers from 0. */
const countedFromZero: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...someDecoys(system),
    'NMR shielding tensors, ppm (atoms count from 0)',
  );
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding);
    log.add(`atom ${atom.overall - 1}, ${atom.element}:`, ...blockLines(tensor, 4, ''), '');
    log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.written();
};

/** Numbers within the element, written behind a low line. */
const countedWithinElement: LogLayout = (system) => {
  const log = new LogWriter(system).add('Absolute shielding tensors / ppm', '');
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding, 2);
    log.add(
      `[ ${atom.element}_${atom.within} ]`,
      ...blockLines(tensor, 2),
      `  trace/3 = ${isotropic(tensor).toFixed(2)}`,
      '',
    );
    log.expect(atom, 'shielding', 'ppm', tensor, { within: true });
  }
  return log.add(...someDecoys(system)).written();
};

/** The whole section once for each cycle; the last counts. */
const cyclesBeforeTheLast: LogLayout = (system) => {
  const log = new LogWriter(system).add(...positionLines(system));
  for (let cycle = 1; cycle <= 3; cycle++) {
    log.add(`Cycle ${cycle} of the response, shielding tensors in ppm`);
    for (const atom of system.atoms) {
      const tensor = rounded(atom.shielding.map((v) => v * (1 + (3 - cycle) * 0.01)));
      log.add(`  ${atom.element}  ${atom.overall}`, ...blockLines(tensor));
      if (cycle === 3) log.expect(atom, 'shielding', 'ppm', tensor);
    }
    log.add(...noise(system));
  }
  return log.written();
};

/** Raw tensors, then symmetrised ones. */
const rawAndSymmetrised: LogLayout = (system) => {
  const log = new LogWriter(system);
  const section = (title: string, tensorOf: (atom: MadeAtom) => number[], allowed: boolean): void => {
    log.add(title);
    for (const atom of system.atoms) {
      const tensor = tensorOf(atom);
      log.add(`  Atom ${atom.overall} ${atom.element}`, ...blockLines(tensor), '');
      log.expect(atom, 'shielding', 'ppm', tensor, { onlyAllowed: allowed });
    }
  };
  section('Shielding tensors (ppm), unsymmetrised', ({ shielding }) => rounded(shielding), false);
  section('Shielding tensors (ppm), symmetrised', ({ symmetricShielding: s }) => symmetricRounded(s), true);
  return log.add(...decoys['Born charges']!(system)).written();
};

/** Fixed width without room for the sign. */
const runTogether: LogLayout = (system) => {
  const log = new LogWriter(system).add(...someDecoys(system), 'EFG tensors in V/Angstrom^2');
  for (const atom of system.atoms) {
    const tensor = symmetricRounded(
      atom.efg.map((v) => v * efgUnits['V/A2']),
      4,
    );
    const width = Math.max(...tensor.map((v) => Math.abs(v).toFixed(4).length)) + 1;
    log.add(`ion ${atom.overall} ${atom.element}`);
    for (let i = 0; i < 9; i += 3) log.add(`  ${cells(tensor.slice(i, i + 3), 4, width)}`);
    log.expect(atom, 'efg', 'V/A2', tensor);
  }
  return log.written();
};

/** The nuclear charge in place of a symbol. */
const byNuclearCharge: LogLayout = (system) => {
  const log = new LogWriter(system).add(...noise(system), 'Nuclear shielding tensors (ppm)');
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding);
    log.add(`Centre ${atom.overall}   Z = ${atom.atomicNumber}`, ...blockLines(tensor), '');
    log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.add(...decoys['g tensor']!(system)).written();
};

/** Titled shift, but the values are shieldings and named sigma. */
const shieldingsTitledShift: LogLayout = (system) => {
  const log = new LogWriter(system).add('Total chemical shifts in ppm', '');
  for (const atom of system.atoms) {
    const tensor = rounded(atom.shielding);
    log.add(
      `Nucleus ${atom.overall} ${atom.element}   total sigma: ${isotropic(tensor).toFixed(2)}`,
      ...blockLines(tensor),
      '',
    );
    log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.add(...someDecoys(system)).written();
};

/** One component of one atom was not computed: that tensor is incomplete, the others are not. */
const missingComponents: LogLayout = (system) => {
  const log = new LogWriter(system).add('Magnetic shielding tensors (ppm)');
  for (const [i, atom] of system.atoms.entries()) {
    const tensor = rounded(atom.shielding);
    const lines = blockLines(tensor);
    if (i === 1)
      lines[1] = `   ${tensor[3]!.toFixed(4).padStart(13)}          N/A${tensor[5]!.toFixed(4).padStart(13)}`;
    log.add(`atom ${atom.overall} ${atom.element}`, ...lines, '');
    if (i !== 1) log.expect(atom, 'shielding', 'ppm', tensor);
  }
  return log.written();
};

export const blockLayouts: Readonly<Record<string, LogLayout>> = {
  'blocks after names, contributions before totals': blocksAfterNames,
  'blocks beside names': blocksBesideNames,
  'rows named by their axis': axisNamedRows,
  'shielding and field gradient in one section': bothInOneSection,
  'atoms counted from 0': countedFromZero,
  'atoms counted within the element': countedWithinElement,
  'a section for each cycle': cyclesBeforeTheLast,
  'raw and symmetrised': rawAndSymmetrised,
  'run-together minus signs': runTogether,
  'nuclear charge in place of a symbol': byNuclearCharge,
  'shieldings titled shift': shieldingsTitledShift,
  'a component that was not computed': missingComponents,
};
