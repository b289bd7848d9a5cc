import type { VecCart, VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { BlockView } from './block-view.ts';
import { textOf } from './block-view.ts';
import type { CartesianFrame } from './cartesian-frame.ts';
import type { CategoryTable } from './category-table.ts';
import { readDisplacements } from './displacement.ts';
import type { SiteRow, SiteRows } from './site-rows.ts';
import type { SiteSpecies } from './site-species.ts';
import { speciesOfSite } from './site-species.ts';
import { readNumber } from './tolerant-number.ts';

/** Sites of a block, with the hydrogens that a type such as `OH` implies (one number a site, not yet counted). */
export interface BuiltSites {
  readonly sites: readonly Site[];
  readonly impliedHydrogens: readonly number[];
}

/**
 * Sites from the rows of the atom list: element, shares and charge from type symbol or label (`cif-element-guessed`,
 * `cif-unknown-element`, `cif-mixture-shares`), positions in the frame of the lattice, displacement, disorder, flags,
 * attached hydrogens. Labels that repeat are noted (`cif-repeated-labels`): the index is the key, never the label. `frame` null
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
  const species = placed.map((row) => speciesOfSite(row.typeText, row.label, known));
  const sites = placed.map((row, index): Site => {
    const found = species[index]!;
    return {
      index,
      label: row.label,
      element: found.element,
      species: found.shares.map(({ element, occupancy }) => ({
        element,
        occupancy: occupancy * row.occupancy,
      })),
      occupancy: row.occupancy,
      charge: found.charge,
      ...positionOf(row, frame),
      displacement: displacements[index] ?? null,
      ...details(row.row),
      place: row.place,
    };
  });
  reportSpecies(placed, species, log);
  reportLabels(placed, log);
  return { sites, impliedHydrogens: species.map(({ hydrogens }) => hydrogens) };
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
    `${lost.length} atoms have fractional coordinates, but the file gives no usable cell; they were left out.`,
    {
      place: lost[0]!.place,
      allowed: '_cell_length_a, _b, _c and _cell_angle_alpha, _beta, _gamma',
      hint: 'Add the cell to the file.',
    },
  );
}

function reportSpecies(rows: readonly SiteRow[], species: readonly SiteSpecies[], log: ProblemLog): void {
  const told = (
    code: string,
    severity: 'warning' | 'note',
    test: (one: SiteSpecies) => boolean,
    say: (list: string, count: number) => string,
  ): void => {
    const indices = species.flatMap((one, i) => (test(one) ? [i] : []));
    if (indices.length === 0) return;
    const shown = indices
      .slice(0, 8)
      .map((i) => `${rows[i]!.label} = ${species[i]!.shares.map(({ element }) => element).join('/')}`);
    const list = shown.join(', ') + (indices.length > 8 ? ', …' : '');
    log.add(severity, code, say(list, indices.length), { place: rows[indices[0]!]!.place });
  };
  told(
    'cif-unknown-element',
    'warning',
    ({ from }) => from === 'nothing',
    (list, count) => `${count} atoms have no element that could be told from type or label: ${list}.`,
  );
  told(
    'cif-element-guessed',
    'warning',
    ({ from, certain }) => from !== 'nothing' && !certain,
    (list, count) => `The element of ${count} atoms is a guess from the label: ${list}.`,
  );
  told(
    'cif-element-from-label',
    'note',
    ({ from, certain }) => from === 'label' && certain,
    (list, count) => `The element of ${count} atoms was read from the label: ${list}.`,
  );
  told(
    'cif-mixture-shares',
    'warning',
    ({ sharesGiven }) => !sharesGiven,
    (list, count) =>
      `${count} positions hold several elements without their shares; equal shares were taken: ${list}.`,
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
    `${names.length} labels stand on more than one row: ${names.slice(0, 8).join(', ')}${names.length > 8 ? ', …' : ''}. Each row is a site of its own.`,
    {
      place: repeated[0]!.place,
    },
  );
}
