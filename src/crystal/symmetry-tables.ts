import type { VecFrac } from '#src/base/matrix3.ts';
import initialise, { initSync, wyckoff_positions } from '@spglib/moyo-wasm';
import { groupTable } from './group-table.ts';
import type { Lattice } from './lattice.ts';
import { orbitOf } from './orbit.ts';
import type { ShapeLoss } from './shape-loss.ts';
import type { SmallCell } from './small-cell.ts';
import type { StandardFrame } from './standard-frame.ts';
import { inStandardFrame, standardFrame } from './standard-frame.ts';
import { operationsOfSetting, settingName, settingsOfNumber } from './space-group-settings.ts';
import type { PlacedSite } from './symmetry-search.ts';
import { searchSymmetry } from './symmetry-search.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import type { WyckoffPosition } from './wyckoff.ts';
import { wyckoffPositionOf } from './wyckoff.ts';

/** The name of a group of operations. */
export interface NamedGroup {
  /** International Tables number. */
  readonly number: number;
  /** Hall number of the tabulated setting (1 to 530); null where the operations stand in no tabulated setting. */
  readonly hallNumber: number | null;
  /** Of the tabulated setting (`settingName`), else the short symbol of the space-group type. */
  readonly hermannMauguin: string;
  /** null where the operations stand in no tabulated setting. */
  readonly hall: string | null;
}

/** Letter and site symmetry of every position; `null` where they could not be told. */
export interface SiteLetters {
  readonly wyckoff: readonly (string | null)[];
  /** Oriented symbols, such as `.m.`, whose places are the axes of the tabulated setting the letters were looked up in. */
  readonly siteSymmetry: readonly (string | null)[];
}

export interface SiteDescription extends NamedGroup, SiteLetters {}

export interface SymmetrySearchResult extends NamedGroup, SiteLetters {
  /** In the basis of the input cell, identity first. */
  readonly operations: readonly SymmetryOperation[];
  /** By atom: index of the first atom of its orbit. */
  readonly orbits: readonly number[];
  /** What the shape of the cell keeps the crystal's group from; null where the cell holds all of it. */
  readonly loss: ShapeLoss | null;
  /**
   * With a loss, the primitive cell by which orbits and operations are those of the whole crystal all the same; null
   * without a loss, and where the operations are only those that the input cell holds.
   */
  readonly smallCell: SmallCell | null;
}

/** Symmetry tables and search, ready for use without waiting. */
export interface SymmetryTables {
  /**
   * Names the group of the operations and gives Wyckoff letter and oriented site-symmetry symbol (International Tables
   * A) of each position (fractional) — for exactly this group, never a higher one that the atoms may have. Positions
   * within the merge distance (Å) of a symmetry element count as on it. In a tabulated setting letters and symbol
   * orientation are those of that setting as the tables give it; elsewhere the cell is related to a tabulated setting
   * first, and the places of a symbol refer to the axes of that one. Null where the operations form no space group.
   */
  readonly describeSites: (
    lattice: Lattice,
    operations: readonly SymmetryOperation[],
    positions: readonly VecFrac[],
    mergeDistanceAngstrom: number,
  ) => SiteDescription | null;
  /**
   * Searches the symmetry of all atoms of a cell within a tolerance (Å); `species` holds one number for each kind of
   * atom. Operations come in the basis of the input cell; where its shape breaks the crystal's symmetry they are those
   * of the crystal, some with fractions as rotation parts, and `smallCell` holds them whole. Null where the search fails.
   */
  readonly search: (
    lattice: Lattice,
    positions: readonly VecFrac[],
    species: readonly number[],
    toleranceAngstrom: number,
  ) => SymmetrySearchResult | null;
}

const positionsByHallNumber = new Map<number, readonly WyckoffPosition[]>();

/** Wyckoff positions of a tabulated setting, general position first. */
function positionsOf(hallNumber: number): readonly WyckoffPosition[] {
  const known = positionsByHallNumber.get(hallNumber);
  if (known) return known;
  const made = wyckoff_positions(hallNumber).map(({ multiplicity, letter, site_symmetry, coordinates }) => ({
    multiplicity,
    letter,
    siteSymmetry: site_symmetry,
    coordinates,
  }));
  positionsByHallNumber.set(hallNumber, made);
  return made;
}

function nameOf({ setting, tabulated }: StandardFrame): NamedGroup {
  const { number } = setting;
  const type = settingsOfNumber(number)[0]!.hermannMauguinShort;
  return {
    number,
    hallNumber: tabulated ? setting.hallNumber : null,
    hermannMauguin: tabulated ? settingName(setting) : type,
    hall: tabulated ? setting.hall : null,
  };
}

function lettersOf(frame: StandardFrame, sites: readonly PlacedSite[]): SiteLetters {
  const operations = operationsOfSetting(frame.setting);
  const positions = positionsOf(frame.setting.hallNumber);
  // Copies of one atom in a supercell are one and the same placed site.
  const known = new Map<PlacedSite, WyckoffPosition | null>();
  const found = sites.map((site) => {
    const made = known.get(site);
    if (made !== undefined) return made;
    const position = inStandardFrame(site.averaged, frame);
    const looked = wyckoffPositionOf(position, site.order, operations, positions);
    known.set(site, looked);
    return looked;
  });
  return {
    wyckoff: found.map((entry) => entry?.letter ?? null),
    siteSymmetry: found.map((entry) => entry?.siteSymmetry ?? null),
  };
}

const describeSites: SymmetryTables['describeSites'] = (lattice, operations, positions, mergeDistance) => {
  if (!groupTable(operations).isGroup) return null;
  const frame = standardFrame(operations, lattice);
  if (!frame) return null;
  const sites = positions.map((position) => {
    const { averaged, stabiliser } = orbitOf(position, operations, lattice, mergeDistance);
    return { averaged, order: stabiliser.length };
  });
  return { ...nameOf(frame), ...lettersOf(frame, sites) };
};

const search: SymmetryTables['search'] = (lattice, positions, species, toleranceAngstrom) => {
  const found = searchSymmetry(lattice, positions, species, toleranceAngstrom);
  if (!found) return null;
  const { operations, orbits, frame, loss, small, placed } = found;
  // In the given cell the operations stand in no tabulated setting, even where they do in the small one.
  const name = nameOf(small ? { ...frame, tabulated: false } : frame);
  return { operations, orbits, loss, smallCell: small, ...name, ...lettersOf(frame, placed) };
};

const tables: SymmetryTables = { describeSites, search };

/** What the WebAssembly module of the symmetry library can be loaded from. */
export type SymmetryTablesSource = BufferSource | URL | Response | WebAssembly.Module | string;

/** Starts the symmetry library (`@spglib/moyo-wasm`) from its module's bytes, address or response. Rejects where that is no such module. */
export async function loadSymmetryTables(source: SymmetryTablesSource): Promise<SymmetryTables> {
  await initialise({ module_or_path: source });
  return tables;
}

/** Starts the symmetry library from its module's bytes, at once: for Node. Throws where the bytes are no such module. */
export function symmetryTablesFromBytes(bytes: Uint8Array | ArrayBuffer): SymmetryTables {
  initSync({ module: bytes as BufferSource });
  return tables;
}
