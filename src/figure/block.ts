import type { SheetItem } from './sheet.ts';

/** A piece of what stands beside the crystal, placed by its upper left corner. */
export interface Block {
  readonly widthPt: number;
  readonly heightPt: number;
  readonly itemsAt: (xPt: number, yPt: number) => SheetItem[];
}

/** Blocks one below the other, left sides in line. */
export function stacked(blocks: readonly Block[], gapPt: number): Block {
  const tops = blocks.map((_, k) =>
    blocks.slice(0, k).reduce((sum, { heightPt }) => sum + heightPt + gapPt, 0),
  );
  return {
    widthPt: Math.max(0, ...blocks.map(({ widthPt }) => widthPt)),
    heightPt:
      blocks.reduce((sum, { heightPt }) => sum + heightPt, 0) + gapPt * Math.max(0, blocks.length - 1),
    itemsAt: (xPt, yPt) => blocks.flatMap((block, k) => block.itemsAt(xPt, yPt + tops[k]!)),
  };
}

/** Blocks in reading order: in a line as far as it holds them, then in the next; tops in line. */
export function inLines(blocks: readonly Block[], maxWidthPt: number, gapPt: number): Block {
  const lines: Block[][] = [];
  let x = 0;
  for (const block of blocks) {
    const isNext = lines.length > 0 && x + gapPt + block.widthPt <= maxWidthPt;
    if (isNext) lines.at(-1)!.push(block);
    else lines.push([block]);
    x = isNext ? x + gapPt + block.widthPt : block.widthPt;
  }
  return stacked(
    lines.map((line) => besideEachOther(line, gapPt)),
    0,
  );
}

/** Blocks side by side, tops in line. */
function besideEachOther(blocks: readonly Block[], gapPt: number): Block {
  const lefts = blocks.map((_, k) =>
    blocks.slice(0, k).reduce((sum, { widthPt }) => sum + widthPt + gapPt, 0),
  );
  return {
    widthPt: (lefts.at(-1) ?? 0) + (blocks.at(-1)?.widthPt ?? 0),
    heightPt: Math.max(0, ...blocks.map(({ heightPt }) => heightPt)),
    itemsAt: (xPt, yPt) => blocks.flatMap((block, k) => block.itemsAt(xPt + lefts[k]!, yPt)),
  };
}

/** Least gap between blocks in a row, of the text size. */
const gapEm = 1.1;
/** Between the blocks of a column, of the text size: as much as there is room for. */
const columnGapEm = { least: 0.7, most: 1.3 } as const;

/** Blocks side by side, in as many rows as they need, spread over the width; tops in line. */
export function flowed(blocks: readonly Block[], widthPt: number, textPt: number): Block {
  const gap = gapEm * textPt;
  const rows: Block[][] = [];
  let x = 0;
  for (const block of blocks) {
    if (rows.length === 0 || x + block.widthPt > widthPt) {
      rows.push([block]);
      x = block.widthPt + gap;
    } else {
      rows.at(-1)!.push(block);
      x += block.widthPt + gap;
    }
  }
  const rowBlocks = rows.map((row) => spread(row, widthPt, textPt));
  return rowBlocks.length === 0 ? emptyBlock : stacked(rowBlocks, 0.5 * textPt);
}

export const emptyBlock: Block = { widthPt: 0, heightPt: 0, itemsAt: () => [] };

/** A row whose gaps grow with the room there is, the middles of the blocks on one line. */
function spread(row: readonly Block[], widthPt: number, textPt: number): Block {
  const used = row.reduce((sum, block) => sum + block.widthPt, 0);
  const gap = row.length > 1 ? Math.min(3.4 * textPt, Math.max(0, (widthPt - used) / (row.length - 1))) : 0;
  const heightPt = Math.max(...row.map((block) => block.heightPt));
  const lefts = row.map((_, k) => row.slice(0, k).reduce((sum, block) => sum + block.widthPt + gap, 0));
  return {
    widthPt: used + gap * (row.length - 1),
    heightPt,
    itemsAt: (xPt, yPt) =>
      row.flatMap((block, k) => block.itemsAt(xPt + lefts[k]!, yPt + (heightPt - block.heightPt) / 2)),
  };
}

/** Blocks one below the other, as far apart as the room for them allows within bounds. */
export function column(blocks: readonly Block[], textPt: number, roomPt: number): Block {
  if (blocks.length === 0) return emptyBlock;
  const spare = roomPt - blocks.reduce((sum, { heightPt }) => sum + heightPt, 0);
  const { least, most } = columnGapEm;
  const gap = blocks.length > 1 ? spare / (blocks.length - 1) : 0;
  return stacked(blocks, Math.min(most * textPt, Math.max(least * textPt, gap)));
}
