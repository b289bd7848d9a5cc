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
import { efgUnits } from './units.ts';

/** Nine numbers on a row, unit of the field gradient in the heading. */
const nineOnARow: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...someDecoys(system),
    'Field gradient tensors (10^21 V/m^2), row by row',
  );
  for (const atom of system.atoms) {
    const tensor = symmetricRounded(
      atom.efg.map((v) => v * efgUnits['1e21V/m2']),
      5,
    );
    log.add(`${String(atom.overall).padStart(4)}  ${atom.element.padEnd(3)}${cells(tensor, 5, 12)}`);
    log.expect(atom, 'efg', '1e21V/m2', tensor);
  }
  return log.add(...noise(system)).written();
};

/** Keyword rows; what unit belongs to which keyword stands on a row of its own. */
const keywordRows: LogLayout = (system) => {
  const log = new LogWriter(system).add('<tensors>', 'units sigma ppm');
  for (const atom of system.atoms) {
    const tensor = atom.shielding.map((v) => Number(v.toExponential(10)));
    log.add(
      `sigma ${atom.element} ${atom.within} ${tensor.map((v) => v.toExponential(10).padStart(19)).join('')}`,
    );
    log.expect(atom, 'shielding', 'ppm', tensor, { within: true });
  }
  log.add('units efg au');
  for (const atom of system.atoms) {
    const tensor = atom.efg.map((v) => Number(v.toExponential(10)));
    log.add(
      `efg ${atom.element} ${atom.within} ${tensor.map((v) => v.toExponential(10).padStart(19)).join('')}`,
    );
    log.expect(atom, 'efg', 'au', tensor, { within: true, tolerance: 1e-9 });
  }
  return log.add('</tensors>').written();
};

/** D exponents, as Fortran prints double precision. */
const dExponents: LogLayout = (system) => {
  const log = new LogWriter(system).add(
    ...decoys.hyperfine!(system),
    'electric field gradient, atomic units',
  );
  for (const atom of system.atoms) {
    const tensor = atom.efg.map((v) => Number(v.toExponential(8)));
    const text = tensor.map((v) =>
      v
        .toExponential(8)
        .replace('e', 'D')
        .replace(/([+-])(\d)$/, '$10$2')
        .padStart(17),
    );
    log.add(`  ${atom.element}${atom.within}:  ${text.join('')}`);
    log.expect(atom, 'efg', 'au', tensor, { within: true, tolerance: 1e-9 });
  }
  return log.add(...noise(system)).written();
};

/** Six numbers on a row in an order that the header names. */
function sixUnderHeader(order: readonly Place[], head: (place: Place) => string, title: string): LogLayout {
  return (system) => {
    const log = new LogWriter(system).add(
      ...positionLines(system),
      ...someDecoys(system),
      title,
      '='.repeat(60),
    );
    log.add(`  atom  ${order.map((place) => head(place).padStart(12)).join('')}`, '='.repeat(60));
    for (const atom of system.atoms) {
      const tensor = symmetricRounded(
        atom.efg.map((v) => v * efgUnits['V/A2']),
        3,
      );
      log.add(
        `  ${String(atom.overall).padEnd(4)}  ${cells(
          order.map((place) => component(tensor, place)),
          3,
          12,
        )}`,
      );
      log.expect(atom, 'efg', 'V/A2', tensor);
    }
    return log.add('='.repeat(60), ...noise(system)).written();
  };
}

/** Six of a shielding, with the element beside the number. */
const sixOfShielding: LogLayout = (system) => {
  const order: Place[] = ['xx', 'xy', 'xz', 'yy', 'yz', 'zz'];
  const log = new LogWriter(system).add('Symmetric part of the shielding (ppm)');
  log.add(` El  No  ${order.map((place) => `s_${place}`.padStart(11)).join('')}    iso`);
  for (const atom of system.atoms) {
    const tensor = symmetricRounded(atom.symmetricShielding, 3);
    const six = cells(
      order.map((place) => component(tensor, place)),
      3,
      11,
    );
    log.add(
      ` ${atom.element.padEnd(3)} ${String(atom.within).padEnd(3)} ${six} ${isotropic(tensor).toFixed(3).padStart(10)}`,
    );
    log.expect(atom, 'shielding', 'ppm', tensor, { within: true });
  }
  return log.add(...someDecoys(system)).written();
};

/** Species and their counts come first; rows carry only a running number. */
const speciesWithCounts: LogLayout = (system) => {
  const elements = [...new Set(system.atoms.map(({ element }) => element))];
  const counts = elements.map((element) => system.atoms.filter((atom) => atom.element === element).length);
  const log = new LogWriter(system);
  for (const element of elements) log.add(`  kind of atom: ${element}`);
  log.add(`  atoms of each kind = ${counts.join(' ')}`, '', ...noise(system));
  log.add('field gradients, V/Angstrom**2', ' ion     xx        yy        zz        xy        xz        yz');
  for (const atom of system.atoms) {
    const tensor = symmetricRounded(
      atom.efg.map((v) => v * efgUnits['V/A2']),
      3,
    );
    const six = (['xx', 'yy', 'zz', 'xy', 'xz', 'yz'] as const).map((place) => component(tensor, place));
    log.add(`${String(atom.overall).padStart(4)}${cells(six, 3, 10)}`);
    log.expect(atom, 'efg', 'V/A2', tensor);
  }
  return log.written();
};

/** Components by name, down the columns, as a matrix of names. */
const namedDownColumns: LogLayout = (system) => {
  const log = new LogWriter(system).add(...decoys.susceptibility!(system), 'Shielding tensors in ppm');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(`${String(atom.overall).padStart(5)}  ${atom.element}   Isotropic = ${isotropic(t).toFixed(4)}`);
    for (const column of 'XYZ') {
      const named = [...'XYZ'].map((row) => {
        const value = component(t, `${row}${column}`.toLowerCase() as Place);
        return `${row}${column}=${value.toFixed(4).padStart(12)}`;
      });
      log.add(`  ${named.join('   ')}`);
    }
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.add(...noise(system)).written();
};

/** Each component on a line of its own. */
const componentsOverLines: LogLayout = (system) => {
  const log = new LogWriter(system).add(...someDecoys(system), 'Shielding tensor components, ppm');
  for (const atom of system.atoms) {
    const t = rounded(atom.shielding);
    log.add(`Nucleus: ${atom.element} ${atom.overall}`);
    for (const row of 'xyz') {
      for (const column of 'xyz') {
        log.add(`    sigma(${row},${column}) : ${component(t, `${row}${column}` as Place).toFixed(4)}`);
      }
    }
    log.add('');
    log.expect(atom, 'shielding', 'ppm', t);
  }
  return log.written();
};

export const rowLayouts: Readonly<Record<string, LogLayout>> = {
  'nine on a row': nineOnARow,
  'keyword rows with unit rows': keywordRows,
  'D exponents': dExponents,
  'six: xx yy zz xy xz yz': sixUnderHeader(
    ['xx', 'yy', 'zz', 'xy', 'xz', 'yz'],
    (p) => `V_${p}`,
    'Electric field gradients (V/Angstrom^2)',
  ),
  'six: xx yy zz yz xz xy': sixUnderHeader(
    ['xx', 'yy', 'zz', 'yz', 'xz', 'xy'],
    (p) => p.toUpperCase(),
    'EFG tensors [V/A^2]',
  ),
  'six: xx xy yy xz yz zz': sixUnderHeader(
    ['xx', 'xy', 'yy', 'xz', 'yz', 'zz'],
    (p) => p,
    'EFG at each nucleus in V / Angstrom^2',
  ),
  'six of a shielding': sixOfShielding,
  'species with counts': speciesWithCounts,
  'names down the columns': namedDownColumns,
  'components over lines': componentsOverLines,
};
