import type { Vec3 } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { decoys, noise, someDecoys } from './decoys.ts';
import type { LogLayout, Place } from './log-writer.ts';
import {
  cells,
  component,
  isotropic,
  LogWriter,
  positionLines,
  rounded,
  symmetricRounded,
} from './log-writer.ts';

const nine: readonly Place[] = ['xx', 'xy', 'xz', 'yx', 'yy', 'yz', 'zx', 'zy', 'zz'];

/** A table with a header row, cells apart by a mark. */
function separated(
  mark: string,
  name: (place: Place) => string,
  number: (value: number) => string,
): LogLayout {
  return (system) => {
    const log = new LogWriter(system);
    log.add(['label', 'element', 'iso_ppm', ...nine.map(name)].join(mark));
    for (const atom of system.atoms) {
      const t = rounded(atom.shielding, 3);
      const numbers = [isotropic(t), ...nine.map((place) => component(t, place))].map((v) => number(v));
      log.add([`${atom.element}${atom.overall}`, atom.element, ...numbers].join(mark));
      log.expect(atom, 'shielding', 'ppm', t);
    }
    return log.written();
  };
}

/** Pasted from a spreadsheet: a title, an empty row, empty cells, CR LF. */
const spreadsheetPaste: LogLayout = (system) => {
  const log = new LogWriter(system).add('EFG tensors (a.u.), all atoms\t\t\t\t\t\t\t', '\t\t\t\t\t\t\t');
  log.add(['Site', 'Vxx', 'Vyy', 'Vzz', 'Vxy', 'Vxz', 'Vyz', 'comment'].join('\t'));
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 5);
    const six = (['xx', 'yy', 'zz', 'xy', 'xz', 'yz'] as const).map((place) =>
      component(t, place).toFixed(5),
    );
    log.add([`${atom.element}${atom.within}`, ...six, atom.overall === 1 ? 'checked' : ''].join('\t'));
    log.expect(atom, 'efg', 'au', t, { within: true });
  }
  return log.written('\r\n');
};

/** A table between bars. */
const barredTable: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '## Shielding tensors, ppm',
    '',
    `| atom | ${nine.map((p) => `σ${p}`).join(' | ')} |`,
  );
  log.add(`|${'---|'.repeat(10)}`);
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 2);
    log.add(
      `| ${atom.element}${atom.overall} | ${nine.map((place) => component(t, place).toFixed(2)).join(' | ')} |`,
    );
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

/** Principal values with a direction for each. */
const principalWithDirections: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...positionLines(system),
    ...someDecoys(system),
    'Principal components of the shielding (ppm) and their axes',
  );
  for (const atom of system.atoms) {
    const { values, vectors } = symmetricEigen(atom.symmetricShielding);
    log.add(
      `  ${atom.element} ${atom.overall}    isotropic shielding ${isotropic(atom.symmetricShielding).toFixed(4)} ppm`,
    );
    [0, 1, 2].forEach((i) => {
      const axis = vectors[i]!;
      log.add(
        `     sigma_${i + 1}${i + 1} = ${values[i]!.toFixed(4).padStart(11)}   axis = (${cells(axis, 8, 13)} )`,
      );
    });
    log.add('');
    log.expect(atom, 'shielding', 'ppm', again(values, vectors), { tolerance: 1e-3 });
  }
  return log.add(...noise(system)).written();
};

/** Σ value · axis axisᵀ */
function again(values: readonly number[], axes: readonly Vec3[]): number[] {
  const out = Array<number>(9).fill(0);
  values.forEach((value, k) => {
    for (let i = 0; i < 9; i++) out[i]! += value * axes[k]![Math.floor(i / 3)]! * axes[k]![i % 3]!;
  });
  return out;
}

/** Elements in angle brackets, the atom in attributes. */
const angleBrackets: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    '<?xml version="1.0"?>',
    '<results>',
    '  <shieldingTensors unit="ppm">',
  );
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding, 5);
    log.add(`    <atom element="${atom.element}" number="${atom.overall}">`);
    [0, 3, 6].forEach((i) =>
      log.add(
        `      <row>${t
          .slice(i, i + 3)
          .map((v) => v.toFixed(5))
          .join(' ')}</row>`,
      ),
    );
    log.add('    </atom>');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.add('  </shieldingTensors>', '</results>').written();
};

/** Lists in square brackets. */
const bracketedLists: LogLayout = (system) => {
  const log = new LogWriter(system).add('{ "electric_field_gradient": { "unit": "a.u.", "atoms": [');
  for (const atom of system.atoms) {
    const t = symmetricRounded(atom.efg, 6);
    const rows = [0, 3, 6].map(
      (i) =>
        `[${t
          .slice(i, i + 3)
          .map((v) => v.toFixed(6))
          .join(', ')}]`,
    );
    const comma = atom.overall === system.atoms.length ? '' : ',';
    log.add(
      `  {"element": "${atom.element}", "index": ${atom.overall}, "tensor": [${rows.join(', ')}]}${comma}`,
    );
    log.expect(atom, 'efg', 'au', t);
  }
  return log.add('] } }').written();
};

/** Shifts, named so, in the order in which they are usually tabulated. */
const shifts: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...decoys.forces!(system),
    'Chemical shift tensors delta (ppm), referenced to the standard of each nucleus',
  );
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding.map((v, i) => (i % 4 === 0 ? 180 : 0) - v));
    log.add(`  ${atom.element}${atom.overall}   delta_iso = ${isotropic(t).toFixed(4)}`);
    [0, 3, 6].forEach((i) => log.add(`    ${cells(t.slice(i, i + 3))}`));
    log.expect(atom, 'shift', 'ppm', t);
  }
  return log.written();
};

export const tableLayouts: Readonly<Record<string, LogLayout>> = {
  'comma-separated': separated(
    ',',
    (place) => `sigma_${place}`,
    (value) => value.toFixed(3),
  ),
  'tab-separated': separated(
    '\t',
    (place) => `sigma ${place.toUpperCase()} (ppm)`,
    (value) => value.toFixed(3),
  ),
  'semicolons and decimal commas': separated(
    ';',
    (place) => `Shielding ${place}`,
    (value) => value.toFixed(3).replace('.', ','),
  ),
  'spreadsheet paste': spreadsheetPaste,
  'table between bars': barredTable,
  'principal values with directions': principalWithDirections,
  'angle brackets': angleBrackets,
  'lists in brackets': bracketedLists,
  shifts,
};
