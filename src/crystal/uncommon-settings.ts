import type { Mat3 } from '#src/base/matrix3.ts';
import { changeBasis, translationOperation, withCentring } from './basis-change.ts';
import { isClosed } from './group.ts';
import { centringVectors } from './hall-symbol.ts';
import { compactSymbol, settingsNamed } from './space-group-names.ts';
import type { SpaceGroupSetting } from './space-group-settings.ts';
import { allSettings, operationsOfSetting } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { identityOperation } from './symmetry-operation.ts';

/** Operations for a symbol that stands in no table, made from a tabulated group. */
export interface UncommonSetting {
  readonly operations: readonly SymmetryOperation[];
  /** International Tables number where the construction keeps the group; null where centring was added. */
  readonly number: number | null;
  /** The tabulated setting it was made from; its code tells origin choice and unique axis. */
  readonly from: SpaceGroupSetting;
  /** In words, how the operations were made. */
  readonly how: string;
}

/** New axes a − b, a + b, c (C and F cells of tetragonal groups), columns of P. */
const tetragonalDoubling: Mat3 = [1, 1, 0, -1, 1, 0, 0, 0, 1];
/** New axes a − b, a + 2b, c (H cell of trigonal and hexagonal groups). */
const hexagonalTripling: Mat3 = [1, 1, 0, -1, 2, 0, 0, 0, 1];

interface Enlargement {
  readonly lattice: string;
  readonly fromLattice: string;
  readonly first: number;
  readonly last: number;
  readonly basis: Mat3;
  readonly axes: string;
  /** The main axis' symbol on the new axes, such as 4/n → 4/a. */
  readonly main: (symbol: string) => string;
}

const enlargements: readonly Enlargement[] = [
  {
    ...{
      lattice: 'C',
      fromLattice: 'P',
      first: 75,
      last: 142,
      basis: tetragonalDoubling,
      axes: 'a-b, a+b, c',
    },
    main: (symbol) => symbol.replace('/n', '/a'),
  },
  {
    ...{
      lattice: 'F',
      fromLattice: 'I',
      first: 75,
      last: 142,
      basis: tetragonalDoubling,
      axes: 'a-b, a+b, c',
    },
    main: (symbol) => symbol.replace('/a', '/d'),
  },
  {
    ...{
      lattice: 'H',
      fromLattice: 'P',
      first: 143,
      last: 194,
      basis: hexagonalTripling,
      axes: 'a-b, a+2b, c',
    },
    main: (symbol) => symbol,
  },
];

/** The symbol on enlarged axes: second and third place change roles. */
function enlargedSymbol(symbol: string, { lattice, main }: Enlargement): string {
  const [, first = '', second = '', third = ''] = symbol.split(' ');
  return compactSymbol(`${lattice}${main(first)}${third}${second}`);
}

function enlarged(compact: string): UncommonSetting[] {
  return enlargements
    .filter(({ lattice }) => compact.startsWith(lattice))
    .flatMap((enlargement) =>
      allSettings()
        .filter(({ number }) => number >= enlargement.first && number <= enlargement.last)
        .filter(({ hermannMauguinShort: short }) => short.startsWith(enlargement.fromLattice))
        .filter(({ setting }) => setting !== 'R')
        .filter((setting) =>
          [setting.hermannMauguinShort, setting.hermannMauguinFull].some(
            (symbol) => enlargedSymbol(symbol, enlargement) === compact,
          ),
        )
        .flatMap((setting) =>
          onNewAxes(
            setting,
            enlargement.basis,
            `${setting.hermannMauguinShort} on the axes ${enlargement.axes}`,
          ),
        ),
    );
}

function onNewAxes(from: SpaceGroupSetting, basis: Mat3, how: string): UncommonSetting[] {
  const operations = changeBasis(operationsOfSetting(from), basis);
  return operations ? [{ operations, number: from.number, from, how }] : [];
}

/** Monoclinic symbols with a diamond glide: c-glide groups on a cell whose glide vector is a quarter of a diagonal. */
const diamondCells: readonly { lattice: string; from: string; basis: Mat3; axes: string }[] = [
  { lattice: 'B', from: 'P', basis: [1, 0, 1, 0, 1, 0, -1, 0, 1], axes: 'a-c, b, a+c' },
  { lattice: 'F', from: 'C', basis: [1, 0, 1, 0, 1, 0, 0, 0, 2], axes: 'a, b, a+2c' },
];

function diamondGlide(compact: string): UncommonSetting[] {
  const glide = /^([BF])1?(21?\/)?d1?$/.exec(compact);
  const cell = diamondCells.find(({ lattice }) => lattice === glide?.[1]);
  if (!glide || !cell) return [];
  return settingsNamed(`${cell.from}1${glide[2] ?? ''}c1`).flatMap((setting) =>
    onNewAxes(setting, cell.basis, `${setting.hermannMauguinFull} on the axes ${cell.axes}`),
  );
}

/** Triclinic, monoclinic and orthorhombic symbols with a centring of their own: the P group with the centring added. */
function centred(compact: string): UncommonSetting[] {
  const letter = compact[0]!;
  const centring = centringVectors[letter];
  if (!centring || centring.length === 0) return [];
  return settingsNamed(`P${compact.slice(1)}`)
    .filter(({ number }) => number <= 74)
    .flatMap((from) => {
      const shifts = [identityOperation, ...centring.map(translationOperation)];
      const operations = withCentring(operationsOfSetting(from), shifts);
      if (!isClosed(operations).closed) return [];
      const number = from.number <= 2 ? from.number : null;
      return [{ operations, number, from, how: `${from.hermannMauguinFull} with ${letter} centring added` }];
    });
}

/**
 * Settings outside the tables that a compact symbol may mean: C and F cells of tetragonal groups, H cells of trigonal
 * and hexagonal ones, B and F monoclinic cells with a d glide, and any centring of a triclinic, monoclinic or
 * orthorhombic P group (the origin stays that of the P group). Empty where nothing fits.
 */
export function uncommonSettings(compact: string): UncommonSetting[] {
  if (compact.length < 2) return [];
  const onLargerCell = [...enlarged(compact), ...diamondGlide(compact)];
  return onLargerCell.length > 0 ? onLargerCell : centred(compact);
}
