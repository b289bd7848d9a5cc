import { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { Crystal, CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { uniqueOperations } from '#src/crystal/group.ts';
import { identityOperation } from '#src/crystal/symmetry-operation.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { BlockView } from './block-view.ts';
import { knownItem, placeOfBlock, placeOfValue } from './block-view.ts';
import type { CartesianFrame } from './cartesian-frame.ts';
import { readFrame } from './cartesian-frame.ts';
import { checkVolume, readCell } from './cell.ts';
import type { CheckedComposition, StatedFormula } from './formula-check.ts';
import { checkComposition, readFormula } from './formula-check.ts';
import { settleByElimination } from './element-by-elimination.ts';
import { readGroupNames } from './group-names.ts';
import { knownElements } from './known-elements.ts';
import { withinCellLimit } from './cell-limit.ts';
import { countAllImages } from './multiplicity.ts';
import type { ListedOperations } from './operation-list.ts';
import { listedOperations } from './operation-list.ts';
import { chooseOrigin } from './origin-choice.ts';
import { reportOverlaps } from './site-overlaps.ts';
import type { SiteRows } from './site-rows.ts';
import { readSiteRows } from './site-rows.ts';
import type { BuiltSites } from './sites.ts';
import { buildSites } from './sites.ts';
import { reportSpecies } from './species-report.ts';
import { settleRivals } from './label-rivals.ts';
import { reportMultiplicities } from './special-positions.ts';
import { decideSymmetry } from './symmetry.ts';
import { readTensorSets } from './tensors.ts';
import { readNumber } from './tolerant-number.ts';

/** A structure of a block with the tensors that stand beside it. */
export interface InterpretedBlock {
  readonly crystal: Crystal;
  readonly tensorSets: readonly TensorSet[];
}

/**
 * The structure of one block; null, with problems, where no atom has a usable position. Order matters: formula (elements), atom
 * rows, operations, cell, symmetry, frame, sites, orbits, composition, tensors.
 */
export function interpretBlock(
  view: BlockView,
  structureIndex: number,
  log: ProblemLog,
  progress: ReportProgress,
): InterpretedBlock | null {
  const formula = readFormula(view, log);
  const known = knownElements(view, formula.counts);
  const rows = readSiteRows(view, known, log);
  if (!rows || rows.rows.length === 0) return null;
  reportDialects(view, log);
  const lists = listedOperations(view, log);
  const cell = usableCell(view, lists, rows, log);
  const frame = cell ? readFrame(view, cell, log) : null;
  const built = buildSites(view, rows, known, frame, log);
  const { sites } = built;
  if (sites.length === 0) return null;
  if (!cell || !frame) return molecule(view, built, formula, structureIndex, log);
  checkVolume(view, frame.lattice.volume, log);
  const names = readGroupNames(view, cell, lists.length > 0 ? 'note' : 'warning', log);
  const choice = decideSymmetry(view, lists, names, frame.lattice, log);
  const settledOrigin = chooseOrigin(view, choice, { sites, rows }, frame.lattice, formula, log);
  const symmetry = withinCellLimit(view, settledOrigin, sites.length, log);
  const counts = countAllImages(sites, symmetry.operations, frame.lattice, progress);
  reportMultiplicities(rows, sites, counts, symmetry.operations.length, log);
  const multiplicities = counts.map(({ merged }) => merged);
  const stated = { ...formula, symmetryStated: symmetry.stated };
  const checked = settled(view, built, multiplicities, stated, log);
  reportOverlaps(checked.sites, symmetry, frame.lattice, log);
  const crystal = crystalOf(view, frame, symmetry, checked.sites, { ...formula, units: checked.units });
  return withTensors(view, crystal, frame, structureIndex, log);
}

/** null for atoms without a crystal: no cell, or the 1 × 1 × 1 Å filler that stands where there is none. */
function usableCell(
  view: BlockView,
  lists: readonly ListedOperations[],
  { rows }: SiteRows,
  log: ProblemLog,
): CellConstants | null {
  const operations =
    lists.length > 0
      ? uniqueOperations(lists[0]!.operations)
      : (readGroupNames(view, null, 'note', new ProblemLog()).groups[0]?.operations ?? []);
  const cell = readCell(view, operations, log);
  if (!cell) return null;
  const filler = Math.max(cell.a, cell.b, cell.c) <= 1.001;
  if (!filler || rows.some(({ fractional }) => fractional !== null)) return cell;
  log.add(
    'note',
    'cif-no-crystal',
    'The cell of 1 Å edges stands where there is no crystal; the atoms were read as a molecule.',
    {
      place: placeOfBlock(view),
    },
  );
  return null;
}

function molecule(
  view: BlockView,
  built: BuiltSites,
  formula: StatedFormula,
  structureIndex: number,
  log: ProblemLog,
): InterpretedBlock {
  const symmetry: CrystalSymmetry = {
    operations: [identityOperation],
    number: null,
    hermannMauguin: null,
    hall: null,
    source: 'none',
    reason: 'a molecule without a cell',
    stated: true,
  };
  const checked = settled(
    view,
    built,
    built.sites.map(() => 1),
    formula,
    log,
  );
  return withTensors(
    view,
    crystalOf(view, null, symmetry, checked.sites, { ...formula, units: checked.units }),
    null,
    structureIndex,
    log,
  );
}

/** Elements and hydrogens settled by the composition, then reported. */
function settled(
  view: BlockView,
  built: BuiltSites,
  multiplicities: readonly number[],
  formula: StatedFormula,
  log: ProblemLog,
): CheckedComposition {
  const rivals = settleRivals(built, multiplicities, formula);
  const { sites, species } = settleByElimination(rivals, multiplicities, formula);
  reportSpecies(sites, species, log);
  const implied = species.map(({ hydrogens }) => hydrogens);
  return checkComposition(view, formula, sites, multiplicities, implied, log);
}

function withTensors(
  view: BlockView,
  crystal: Crystal,
  frame: CartesianFrame | null,
  structureIndex: number,
  log: ProblemLog,
): InterpretedBlock {
  const { sites, lattice } = crystal;
  const ground = { sites, lattice, frameGiven: frame?.source === 'given', structureIndex };
  return { crystal, tensorSets: readTensorSets(view, ground, log) };
}

function crystalOf(
  view: BlockView,
  frame: CartesianFrame | null,
  symmetry: CrystalSymmetry,
  sites: readonly Site[],
  formula: StatedFormula,
): Crystal {
  const periodic = frame !== null;
  return {
    name: view.block.name,
    lattice: frame?.lattice ?? null,
    periodic: [periodic, periodic, periodic],
    symmetry,
    sites,
    formula: { sum: formula.item?.text ?? null, units: formula.units },
    temperatureK: temperature(view),
    place: placeOfBlock(view),
  };
}

function temperature(view: BlockView): number | null {
  for (const name of ['_diffrn_ambient_temperature', '_cell_measurement_temperature']) {
    const item = knownItem(view, name);
    const kelvin = item && readNumber(item.text)?.value;
    if (typeof kelvin === 'number' && kelvin >= 0 && kelvin < 10_000) return kelvin;
  }
  return null;
}

/** Dialects that say more than one three-dimensional structure can hold. */
function reportDialects(view: BlockView, log: ProblemLog): void {
  const schema = knownItem(view, '_audit_schema');
  if (schema && !/^(base|custom)$/i.test(schema.text)) {
    log.add(
      'warning',
      'cif-other-schema',
      `The block follows the schema “${schema.text}”, in which one block may hold several crystals or space groups; it was read as one crystal.`,
      {
        place: placeOfValue(view, schema.value),
        got: schema.text,
        allowed: 'Base',
      },
    );
  }
  const dimension = knownItem(view, '_cell_modulation_dimension');
  if (dimension && Number(dimension.text) > 0) {
    log.add(
      'warning',
      'cif-modulated',
      `The structure is modulated (${dimension.text} further dimension); only its average is shown.`,
      {
        place: placeOfValue(view, dimension.value),
      },
    );
  }
}
