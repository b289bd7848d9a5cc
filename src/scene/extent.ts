import { openAxes, repeatsThroughout } from '#src/base/periodicity.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { asymmetricAtoms } from './asymmetric-atoms.ts';
import { bondedNeighbours, missingLigands } from './context-atoms.ts';
import type { CellRange, DrawnAtom, ExtentInput } from './drawn-atoms.ts';
import {
  atomsInRange,
  atomsOfCell,
  atomsOfMolecules,
  drawableRange,
  mostAtoms,
  repeatedRange,
} from './drawn-atoms.ts';
import type { SceneExtent } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import { shellAtoms } from './shell-atoms.ts';
import { missingMoleculeAtoms } from './whole-molecules.ts';

/** The atoms of a picture and how they were chosen. */
export interface ChosenAtoms {
  readonly extent: SceneExtent;
  /** The picture's own atoms, then those that complete their bonds. */
  readonly atoms: readonly DrawnAtom[];
  readonly ownCount: number;
  /** The range drawn, with extent `range`. */
  readonly range: CellRange | null;
  /** The limit of the picture left out atoms. */
  readonly isCut: boolean;
  /** The range asked for holds more atoms than can be drawn: only its middle is. */
  readonly isNarrowed: boolean;
  /** Molecules that reach into the range are drawn whole. */
  readonly isCompleted: boolean;
  /** Axes along which the cell does not repeat. */
  readonly openAxes: readonly string[];
  /** Those of them along which the range asked for is not the one cell there is. */
  readonly unrepeated: readonly string[];
  /** Sites of the shell's middle. */
  readonly middle: readonly string[];
}

type ExtentOptions = Pick<
  SceneOptions,
  'extent' | 'range' | 'shell' | 'bonds' | 'bondedNeighbours' | 'polyhedra'
>;

/** The atoms the options ask for, as far as the crystal has them: without a cell all, or a shell of them. */
export function chooseAtoms(input: ExtentInput, options: ExtentOptions): ChosenAtoms {
  const { dossier } = input;
  const extent = chooseExtent(dossier, options);
  const open = dossier.lattice ? openAxes(dossier.periodic ?? repeatsThroughout) : [];
  const asked = repeatedRange(dossier, options.range);
  const range = extent === 'range' ? drawableRange(dossier, asked) : null;
  const first = firstAtoms(input, extent, range, options);
  const completing = options.bonds && options.bondedNeighbours && first.length < mostAtoms;
  const rest = completing && range ? missingMoleculeAtoms(input, first) : [];
  const own = [...first, ...rest];
  const isCut = own.length >= mostAtoms;
  const neighbours =
    completing && !isCut && (extent === 'cell' || extent === 'range') ? bondedNeighbours(input, own) : [];
  const known = [...own, ...neighbours];
  const corners = options.polyhedra.length > 0 ? missingLigands(input, known, options.polyhedra) : [];
  return {
    extent,
    atoms: [...known, ...corners],
    ownCount: own.length,
    range,
    isCut,
    isNarrowed: range !== null && spread(range) < spread(asked),
    isCompleted: rest.length > 0,
    openAxes: open,
    unrepeated: range ? open.filter((letter) => !isOneCell(options.range, 'abc'.indexOf(letter))) : [],
    middle:
      extent === 'shell'
        ? dossier.sites.flatMap(({ index, label }) =>
            options.shell?.siteIndices.includes(index) ? [label] : [],
          )
        : [],
  };
}

function firstAtoms(
  input: ExtentInput,
  extent: SceneExtent,
  range: CellRange | null,
  options: ExtentOptions,
): DrawnAtom[] {
  if (extent === 'molecules') return atomsOfMolecules(input);
  if (extent === 'asymmetric') return asymmetricAtoms(input);
  if (extent === 'shell' && options.shell) return shellAtoms(input, options.shell);
  return range ? atomsInRange(input, range) : atomsOfCell(input);
}

function chooseExtent(dossier: CrystalDossier, { extent, shell }: ExtentOptions): SceneExtent {
  const isEmptyShell = !shell?.siteIndices.some((index) => dossier.sites[index] !== undefined);
  if (extent !== 'auto' && !(extent === 'shell' && isEmptyShell)) return extent;
  return Object.keys(dossier.wholeMolecules).length > 0 ? 'molecules' : 'cell';
}

function isOneCell([low, high]: CellRange, axis: number): boolean {
  return low[axis] === 0 && high[axis] === 1;
}

/** Sum of the three edges, in cells. */
function spread([low, high]: CellRange): number {
  return low.reduce((sum, x, k) => sum + Math.abs(high[k]! - x), 0);
}

/**
 * The dossier with only as many of its first sites as can come into the picture, so that a huge one costs no more. A shell may
 * stand anywhere: it keeps all.
 */
export function drawableSites(dossier: CrystalDossier, extent: SceneOptions['extent']): CrystalDossier {
  if (extent === 'shell') return dossier;
  let atoms = 0;
  // Twice the limit: sites that share a position with a fuller one are passed over.
  const past = dossier.sites.findIndex(
    ({ equivalents }) => (atoms += extent === 'asymmetric' ? 1 : equivalents.length) > 2 * mostAtoms,
  );
  return past < 0 ? dossier : { ...dossier, sites: dossier.sites.slice(0, past + 1) };
}
