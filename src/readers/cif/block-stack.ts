import { openBlock, shortName } from './block-builder.ts';
import type { OpenBlock } from './block-builder.ts';
import { cifLimits } from './limits.ts';
import { foldCase, noteNameLength } from './names.ts';
import type { CifReport } from './report.ts';

/** The blocks of a file, and which block and save frames are open. Methods that may pass a limit say so in words. */
export class BlockStack {
  readonly blocks: OpenBlock[] = [];
  readonly #report: CifReport;
  readonly #names = new Set<string>();
  /** The data block and the save frames open inside it, innermost last. */
  readonly #open: OpenBlock[] = [];
  #count = 0;

  constructor(report: CifReport) {
    this.#report = report;
  }

  startBlock(name: string, offset: number): string | null {
    this.closeFrames(offset);
    if (name === '') this.#warnUnnamed(offset);
    const folded = foldCase(name);
    if (this.#names.has(folded)) {
      this.#report.add(
        'warning',
        'cif-repeated-block',
        offset,
        'Two data blocks have the same name; both were kept.',
        { got: `data_${shortName(name)}`, allowed: 'each block name once a file' },
      );
    }
    this.#names.add(folded);
    noteNameLength(name, offset, this.#report);
    this.#open.length = 0;
    this.blocks.push(this.#push(name, offset));
    return this.#overLimit();
  }

  /** The block or frame that takes what comes; one without a name where no `data_` stood yet. */
  current(offset: number, end: number): OpenBlock {
    const top = this.#open.at(-1);
    if (top) return top;
    this.#report.add(
      'warning',
      'cif-no-data-header',
      offset,
      'Items stand before any data_ line; they were read as a block without a name.',
      {
        got: this.#report.excerpt(offset, end),
        allowed: 'a line data_NAME first',
        hint: 'Put a line that starts with data_ and a name at the top.',
      },
    );
    const block = this.#push('', offset);
    this.blocks.push(block);
    return block;
  }

  openFrame(name: string, offset: number, end: number): string | null {
    const parent = this.current(offset, end);
    if (this.#open.length > 1) {
      this.#report.add(
        'warning',
        'cif-nested-frame',
        offset,
        `A save frame starts inside the frame ${shortName(parent.name)}; it was read as part of it.`,
        { got: `save_${shortName(name)}`, allowed: 'save_ to close the first frame' },
      );
    }
    if (this.#open.length > cifLimits.frameDepth)
      return `save frames nested deeper than ${cifLimits.frameDepth}`;
    noteNameLength(name, offset, this.#report);
    parent.frames.push(this.#push(name, offset));
    return this.#overLimit();
  }

  closeFrame(offset: number): void {
    if (this.#open.length > 1) {
      this.#open.pop();
      return;
    }
    this.#report.add(
      'warning',
      'cif-stray-save',
      offset,
      'A save_ closes a save frame, but none is open; it was skipped.',
      { got: 'save_', allowed: 'save_NAME before it' },
    );
  }

  /** Ends whatever frames are open at the end of a block. */
  closeFrames(offset: number): void {
    for (const { name } of this.#open.slice(1).reverse()) {
      this.#report.add(
        'warning',
        'cif-unclosed-frame',
        offset,
        `The save frame ${shortName(name)} is not closed; it was ended here.`,
        { got: `save_${shortName(name)}`, allowed: 'save_ after the frame' },
      );
    }
    this.#open.length = Math.min(1, this.#open.length);
  }

  #push(name: string, offset: number): OpenBlock {
    const block = openBlock(name, offset);
    this.#open.push(block);
    this.#count++;
    return block;
  }

  #overLimit(): string | null {
    return this.#count > cifLimits.blocks ? `more than ${cifLimits.blocks} blocks and frames` : null;
  }

  #warnUnnamed(offset: number): void {
    this.#report.add(
      'warning',
      'cif-unnamed-block',
      offset,
      'A data block has no name; it was read as a block without one.',
      { got: 'data_', allowed: 'data_ and a name without blanks' },
    );
  }
}
