import type { LogLayout, Place } from './log-writer.ts';
import { cells, component, isotropic, LogWriter, rounded, symmetricRounded } from './log-writer.ts';
import { noise } from './decoys.ts';
import { efgUnits } from './units.ts';

const nine: readonly Place[] = ['xx', 'xy', 'xz', 'yx', 'yy', 'yz', 'zx', 'zy', 'zz'];
const six: readonly Place[] = ['xx', 'yy', 'zz', 'xy', 'xz', 'yz'];
const scaled = (values: readonly number[], factor: number): number[] => values.map((v) => v * factor);
const letters = 'abc';

/** One component a row. */
const tidyTable: LogLayout = (system) => {
  const log = new LogWriter(system).add('site,element,quantity,component,value,unit');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 3);
    for (const place of nine)
      log.add(
        `${atom.element}${atom.overall},${atom.element},shielding,${place},${component(t, place).toFixed(3)},ppm`,
      );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** Everything of one atom on one line, with brackets in brackets. */
const oneLineObjects: LogLayout = (system) => {
  const log = new LogWriter(system).add('{"property": "magnetic shielding", "unit": "ppm", "atoms": [');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 4);
    const rows = [0, 3, 6].map((i) => `[${t.slice(i, i + 3).join(', ')}]`);
    log.add(
      `  {"species": "${atom.element}", "index": ${atom.overall - 1}, "tensor": [${rows.join(', ')}], "iso": ${isotropic(t).toFixed(4)}},`,
    );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.add(']}').written();
};

/** The same with a line for each number. */
const oneNumberALine: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '{',
    '  "electric_field_gradients": {',
    '    "unit": "V/Angstrom^2",',
    '    "atoms": [',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['V/A2']));
    log.add('      {', `        "label": "${atom.element}${atom.overall}",`, '        "tensor": [');
    for (const i of [0, 3, 6])
      log.add(
        '          [',
        ...t.slice(i, i + 3).map((v, k) => `            ${v.toFixed(4)}${k < 2 ? ',' : ''}`),
        `          ]${i < 6 ? ',' : ''}`,
      );
    log.add('        ]', '      },');
    log.expect(atom, 'efg', 'V/A2', t);
  }
  return log.add('    ]', '  }', '}').written();
};

/** Lines of a script for a calculator. */
const scriptLines: LogLayout = (system) => {
  const log = new LogWriter(system).add('% shielding tensors in ppm, rows are the field of the nucleus');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 3);
    const rows = [0, 3, 6].map((i) =>
      t
        .slice(i, i + 3)
        .map((v) => v.toFixed(3))
        .join(' '),
    );
    log.add(`sigma_${atom.element}${atom.overall} = [${rows.join('; ')}];`);
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** Nested brackets over three lines, as an interpreter echoes a matrix. */
const echoedMatrices: LogLayout = (system) => {
  const log = new LogWriter(system).add(...noise(system), 'EFG, atomic units');
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 6);
    const rows = [0, 3, 6].map((i) => `[${cells(t.slice(i, i + 3), 6, 10)}]`);
    log.add(`${atom.overall - 1} ${atom.element}`, `[${rows[0]}`, ` ${rows[1]}`, ` ${rows[2]}]`);
    log.expect(atom, 'efg', 'au', t);
  }
  return log.written();
};

/** Markup with nine numbers in an element of their own. */
const markupWithText: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '<?xml version="1.0"?>',
    '<run>',
    ' <property name="shielding" units="ppm">',
  );
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 4);
    log.add(`  <atom id="${atom.overall}" element="${atom.element}">`, '   <tensor>');
    for (const i of [0, 3, 6])
      log.add(
        `    ${t
          .slice(i, i + 3)
          .map((v) => v.toFixed(4))
          .join(' ')}`,
      );
    log.add('   </tensor>', '  </atom>');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.add(' </property>', '</run>').written();
};

/** A heading of two lines, the unit in a line under the names. */
const unitUnderNames: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    'Table S4. Calculated electric field gradient tensors of the title compound.',
    '',
    `${'Site'.padEnd(10)}${six.map((p) => `V_${p}`.padStart(10)).join('')}`,
    `${' '.padEnd(10)}${six.map(() => 'V/A^2'.padStart(10)).join('')}`,
    '-'.repeat(70),
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['V/A2']), 3);
    log.add(
      `${atom.element}(${atom.within})`.padEnd(10) +
        cells(
          six.map((p) => component(t, p)),
          3,
          10,
        ),
    );
    log.expect(atom, 'efg', 'V/A2', t, { within: true });
  }
  return log.add('-'.repeat(70)).written();
};

/** Semicolons and decimal commas, shifts under their own name with negative values, a column of comments. */
const decimalCommas: LogLayout = (system) => {
  const log = new LogWriter(system).add(`Atom;Nr;${nine.map((p) => `sigma_${p} [ppm]`).join(';')};Bemerkung`);
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 2);
    log.add(
      `${atom.element};${atom.overall};${nine.map((p) => component(t, p).toFixed(2).replace('.', ',')).join(';')};`,
    );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written('\r\n');
};

/** Sites with a letter after the number; two of one number are two sites. */
const letteredSites: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    'Table 2: principal and Cartesian components of the shielding tensors (ppm)',
    '',
  );
  log.add(`site     iso      ${six.map((p) => p.padStart(9)).join('')}`);
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.symmetricShielding, 2);
    const label = `${atom.element}${Math.ceil(atom.within / 2)}${letters[(atom.within - 1) % 2]}`;
    log.add(
      `${label.padEnd(7)}${cells([isotropic(t)], 2, 9)} ${cells(
        six.map((p) => component(t, p)),
        2,
        9,
      )}`,
    );
    log.expect({ ...atom, within: Math.ceil(atom.within / 2) }, 'shielding', 'ppm', t, { within: true });
  }
  return log.written();
};

/** Markdown with a heading of its own for each atom. */
const headingsPerAtom: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '# Results',
    '',
    '## Electric field gradients',
    '',
    'All tensors in 10^21 V m^-2.',
    '',
  );
  for (const atom of system.atoms) {
    const t = symmetricRounded(scaled(atom.efg, efgUnits['1e21V/m2']), 3);
    log.add(`### ${atom.element}${atom.overall}`, '', '|   | x | y | z |', '|---|---|---|---|');
    for (const i of [0, 3, 6])
      log.add(
        `| ${'xyz'[i / 3]} | ${t
          .slice(i, i + 3)
          .map((v) => v.toFixed(3))
          .join(' | ')} |`,
      );
    log.add('');
    log.expect(atom, 'efg', '1e21V/m2', t);
  }
  return log.written();
};

/** Assignments of single components, the atom in the name. */
const assignments: LogLayout = (system) => {
  const log = new LogWriter(system).add('# unit: ppm', '# quantity: shielding');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 4);
    for (const place of nine)
      log.add(`atom${atom.overall}.${atom.element}.sigma.${place} = ${component(t, place).toFixed(4)}`);
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** Isotropic values, anisotropies and asymmetries: no tensor can be made of them. */
const valuesOnly: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    'Chemical shielding, ppm',
    '',
    ' site       iso        aniso      eta      alpha     beta     gamma',
  );
  for (const atom of system.atoms) {
    log.add(
      ` ${atom.element}${atom.overall}`.padEnd(8) +
        cells(
          [
            isotropic(atom.shielding),
            system.random() * 40,
            system.random(),
            system.random() * 180,
            system.random() * 180,
            system.random() * 360,
          ],
          2,
          10,
        ),
    );
  }
  log.add('', 'Quadrupolar parameters', ' site    C_Q/MHz    eta_Q');
  for (const atom of system.atoms)
    log.add(
      ` ${atom.element}${atom.overall}`.padEnd(8) + cells([system.random() * 9, system.random()], 3, 10),
    );
  return log.written();
};

export const paperLayouts: Readonly<Record<string, LogLayout>> = {
  'paper: one component a row': tidyTable,
  'paper: an object a line': oneLineObjects,
  'paper: one number a line': oneNumberALine,
  'paper: lines of a script': scriptLines,
  'paper: echoed matrices': echoedMatrices,
  'paper: markup with text': markupWithText,
  'paper: unit under the names': unitUnderNames,
  'paper: decimal commas': decimalCommas,
  'paper: lettered sites': letteredSites,
  'paper: a heading for each atom': headingsPerAtom,
  'paper: assignments': assignments,
  'paper: values only': valuesOnly,
};
