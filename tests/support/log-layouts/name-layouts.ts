import type { LogLayout } from './log-writer.ts';
import { blockLines, cells, LogWriter, rounded } from './log-writer.ts';
import type { MadeAtom } from './made-system.ts';

/** Ways to name an atom over its tensor. */
const names: Readonly<Record<string, (atom: MadeAtom) => string>> = {
  'a point between': ({ element, overall }) => `${element}.${overall}`,
  'site in brackets': ({ element, overall }) => `${element} (site ${overall})`,
  'large letters': ({ element, overall }) => `${element.toUpperCase()}${overall}`,
  'type behind': ({ element, overall }) => `atom:${overall} type:${element}`,
  'position behind': ({ element, overall, position }) => `${overall} ${element}  at ${cells(position, 4, 9)}`,
  'position in brackets': ({ element, overall, position }) =>
    `Atom ${overall} (${element}) at (${position.map((v) => v.toFixed(3)).join(', ')})`,
  'number in words': ({ element, overall }) => `Nucleus ${element}, number ${overall}`,
  'index from 0': ({ element, overall }) => `index ${overall - 1}, element ${element}`,
  'number of all': ({ element, overall }) => `Atom ${overall} of 9  ${element}`,
};

function under(name: (atom: MadeAtom) => string): LogLayout {
  return (system) => {
    const log = new LogWriter(system).add(' Magnetic shielding tensors (ppm)', '');
    for (const atom of system.atoms) {
      const t = rounded(atom.shielding);
      log.add(`  ${name(atom)}`, ...blockLines(t), '');
      log.expect(atom, 'shielding', 'ppm', t);
    }
    return log.written();
  };
}

export const nameLayouts: Readonly<Record<string, LogLayout>> = Object.fromEntries(
  Object.entries(names).map(([style, name]) => [`names: ${style}`, under(name)]),
);
