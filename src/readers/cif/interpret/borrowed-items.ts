import type { ProblemLog } from '#src/base/problem.ts';
import type { BlockView, ItemSource } from './block-view.ts';
import { knownItem, placeOfBlock } from './block-view.ts';
import { cellItems } from './cell.ts';
import { groupNameItems } from './group-names.ts';
import { operationListItems } from './operation-list.ts';
import { coordinateKeys } from './site-rows.ts';
import { readNumber } from './tolerant-number.ts';

const lengthItems = cellItems.slice(0, 3);
const symmetryItems = [...operationListItems, ...groupNameItems];
/** Relative difference up to which two cells are the same. */
const sameCell = 1e-3;

/**
 * Blocks of atoms that lack their cell or their symmetry altogether, as where a file puts these into a block of its own: what
 * exactly one block without atoms gives is taken from there, each with `cif-from-other-block`. A block with another cell
 * lends no symmetry. All other blocks come back as they are.
 */
export function withBorrowedItems(views: readonly BlockView[], log: ProblemLog): readonly BlockView[] {
  const lenders = views.filter((view) => !hasAtoms(view));
  if (lenders.length === 0 || lenders.length === views.length) return views;
  const withCell = lenders.filter((view) => knowsAll(view, lengthItems));
  const withSymmetry = lenders.filter((view) => knownItem(view, ...symmetryItems) !== null);
  if (withCell.length === 0 && withSymmetry.length === 0) return views;
  return views.map((view) => {
    if (!hasAtoms(view)) return view;
    let complete = view;
    const [cell, ...otherCells] = withCell;
    if (cell && otherCells.length === 0 && lacksCell(view)) {
      complete = borrow(complete, cell, cellItems, 'cell', log);
    }
    if (knownItem(view, ...symmetryItems) !== null) return complete;
    const [symmetry, ...others] = withSymmetry.filter((lender) => agrees(lender, complete));
    if (!symmetry || others.length > 0) return complete;
    return borrow(complete, symmetry, symmetryItems, 'symmetry', log);
  });
}

/** Fractional coordinates; a molecule in Cartesian ones needs no cell. */
function hasAtoms(view: BlockView): boolean {
  return knownItem(view, coordinateKeys[0]) !== null;
}

function lacksCell(view: BlockView): boolean {
  return lengthItems.every((name) => knownItem(view, name) === null);
}

function knowsAll(view: BlockView, names: readonly string[]): boolean {
  return names.every((name) => knownItem(view, name) !== null);
}

/** No cell of its own, or the same one. */
function agrees(lender: BlockView, view: BlockView): boolean {
  return cellItems.every((name) => {
    const [one, other] = [lender, view].map((of) => readNumber(knownItem(of, name)?.text ?? '')?.value);
    if (one === undefined || other === undefined) return true;
    return Math.abs(one - other) <= sameCell * Math.abs(other);
  });
}

function borrow(
  view: BlockView,
  lender: BlockView,
  names: readonly string[],
  what: string,
  log: ProblemLog,
): BlockView {
  const items = new Map<string, readonly ItemSource[]>(view.items);
  for (const name of names) {
    const lent = lender.items.get(name);
    if (lent) items.set(name, lent);
  }
  log.add(
    'warning',
    'cif-from-other-block',
    `The block ${view.block.name} holds atoms and no ${what}; that of the block ${lender.block.name} was taken.`,
    {
      place: placeOfBlock(view),
      allowed: `the ${what} in the block of the atoms`,
    },
  );
  return { ...view, items };
}
