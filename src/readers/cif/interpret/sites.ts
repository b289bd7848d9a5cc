import { countOf, wordFor } from '#src/base/count-of.ts';
import type { VecCart, VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { BlockView } from './block-view.ts';
import { textOf } from './block-view.ts';
import type { CartesianFrame } from './cartesian-frame.ts';
import type { CategoryTable } from './category-table.ts';
import { readDisplacements } from './displacement.ts';
import type { TypeStyle } from './group-type.ts';
import { typeStyle } from './group-type.ts';
import { reportShares, sharedOccupancy } from './type-shares.ts';
import type { SiteRow, SiteRows } from './site-rows.ts';
import type { SiteSpecies } from './site-species.ts';
import { speciesOfSite } from './site-species.ts';
import { readNumber } from './tolerant-number.ts';

/** Sites of a block, with what was found out about their elements (one entry a site). */
export interface BuiltSites {
  readonly sites: readonly Site[];
  readonly species: readonly SiteSpecies[];
}

/**
 * Sites from the rows of the atom list: element, shares and charge from type symbol or label, positions in the frame of the
 * lattice (`cif-frame-assumed` for Cartesian coordinates without a transform), displacement, disorder, flags, attached hydrogens. Labels that repeat are noted (`cif-repeated-labels`): the index is the key, never the label. `frame` null
 * is a molecule: rows then need Cartesian coordinates and the others are dropped with `cif-no-cell`.
 */
export function buildSites(
  view: BlockView,
  { table, rows }: SiteRows,
  known: ReadonlySet<string>,
  frame: CartesianFrame | null,
  log: ProblemLog,
): BuiltSites {
  const placed = rows.filter((row) => frame !== null || row.cartesian !== null);
  if (placed.length < rows.length) reportNoCell(rows, placed, log);
  const displacements = readDisplacements(view, table, placed, frame?.lattice ?? null, log);
  const details = detailReader(table, view.macromolecular);
  const speciesOf = rememberedSpecies(known, typeStyle(placed.map(({ typeText }) => typeText)));
  const species = placed.map((row) => speciesOf(row.typeText, row.label));
  const sites = placed.map((row, index): Site => {
    const found = species[index]!;
    const { whole, occupancy } = sharedOccupancy(found, row.occupancy);
    return {
      index,
      label: row.label,
      element: found.element,
      species: found.shares.map((one) => ({ element: one.element, occupancy: one.occupancy * whole })),
      occupancy,
      charge: found.charge,
      ...positionOf(row, frame),
      displacement: displacements[index] ?? null,
      ...details(row.row),
      place: row.place,
    };
  });
  reportLabels(placed, log);
  reportShares(placed, species, log);
  if (frame?.source === 'default') reportAssumedFrame(placed, frame, log);
  return { sites, species };
}

/** A type symbol stands on thousands of rows of a large list and means the same on each, unless the label had to decide. */
function rememberedSpecies(
  known: ReadonlySet<string>,
  style: TypeStyle,
): (type: string | null, label: string) => SiteSpecies {
  const byType = new Map<string, SiteSpecies>();
  return (type, label) => {
    const before = type === null ? undefined : byType.get(type);
    if (before) return before;
    const found = speciesOfSite(type, label, known, style);
    if (type !== null && found.from === 'type' && found.group === null) byType.set(type, found);
    return found;
  };
}

function positionOf(row: SiteRow, frame: CartesianFrame | null): Pick<Site, 'fractional' | 'cartesian'> {
  if (!frame) return { fractional: null, cartesian: row.cartesian as VecCart };
  const fractional = (row.fractional ?? frame.toFractional(row.cartesian as VecCart)) as VecFrac;
  return { fractional, cartesian: toCartesian(frame.lattice, fractional) };
}

type Details = Pick<Site, 'disorder' | 'calcFlag' | 'refinementFlags' | 'attachedHydrogens'>;

function detailReader(table: CategoryTable, macromolecular: boolean): (row: number) => Details {
  const assembly = table.column('_atom_site_disorder_assembly');
  const group = table.column(
    '_atom_site_disorder_group',
    ...(macromolecular ? ['_atom_site_label_alt_id'] : []),
  );
  const calcFlag = table.column('_atom_site_calc_flag');
  const flags = table.column('_atom_site_refinement_flags_posn', '_atom_site_refinement_flags');
  const attached = table.column('_atom_site_attached_hydrogens');
  return (row) => {
    const disorder = { assembly: textOf(assembly?.at(row)), group: textOf(group?.at(row)) };
    const hydrogens = readNumber(textOf(attached?.at(row)) ?? '')?.value ?? 0;
    return {
      disorder: disorder.assembly === null && disorder.group === null ? null : disorder,
      calcFlag: textOf(calcFlag?.at(row)),
      refinementFlags: textOf(flags?.at(row)),
      attachedHydrogens: hydrogens > 0 && hydrogens <= 12 ? hydrogens : 0,
    };
  };
}

function reportNoCell(rows: readonly SiteRow[], placed: readonly SiteRow[], log: ProblemLog): void {
  const kept = new Set(placed);
  const lost = rows.filter((row) => !kept.has(row));
  log.add(
    'error',
    'cif-no-cell',
    `${countOf(lost.length, 'atom has', 'atoms have')} fractional coordinates, but the file gives no usable cell; ${wordFor(lost.length, 'it was', 'they were')} left out.`,
    {
      place: lost[0]!.place,
      allowed: '_cell_length_a, _b, _c and _cell_angle_alpha, _beta, _gamma',
      hint: 'Add the cell to the file.',
    },
  );
}

function reportAssumedFrame(rows: readonly SiteRow[], { lattice }: CartesianFrame, log: ProblemLog): void {
  const first = rows.find(({ fractional }) => fractional === null);
  if (!first) return;
  log.add(
    'warning',
    'cif-frame-assumed',
    `Atoms have Cartesian coordinates, and the file does not say how their axes lie in the cell; assumed: ${lattice.frame}.`,
    {
      place: first.place,
      hint: 'Give _atom_sites_Cartn_tran_matrix_11 to _33.',
    },
  );
}

function reportLabels(rows: readonly SiteRow[], log: ProblemLog): void {
  const seen = new Set<string>();
  const repeated = rows.filter(({ label }) => seen.has(label) || !seen.add(label));
  if (repeated.length === 0) return;
  const names = [...new Set(repeated.map(({ label }) => label))];
  log.add(
    'note',
    'cif-repeated-labels',
    `${countOf(names.length, 'label stands', 'labels stand')} on more than one row: ${names.slice(0, 8).join(', ')}${names.length > 8 ? ', …' : ''}. Each row is a site of its own.`,
    {
      place: repeated[0]!.place,
    },
  );
}
