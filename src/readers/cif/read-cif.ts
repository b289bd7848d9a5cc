import type { Problem } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { Reading } from '../reading.ts';
import { viewBlock } from './interpret/block-view.ts';
import { isNeededName } from './interpret/needed-names.ts';
import { withBorrowedItems } from './interpret/borrowed-items.ts';
import { interpretBlock } from './interpret/interpret-block.ts';
import { reportNoStructure, reportSeveral } from './interpret/block-choice.ts';
import { parseCif } from './parse.ts';

export interface ReadCifOptions {
  readonly progress?: ReportProgress;
}

/** Share of the work that is syntax. */
const syntaxShare = 0.7;

/**
 * Reads a CIF: every data block with atoms becomes a crystal, with tensors from our own loop beside them. Never throws for
 * content; a text that is no CIF, or holds no atoms, gives an empty reading and an error that says which.
 */
export function readCif(source: SourceText, options: ReadCifOptions = {}): Reading {
  const progress = options.progress ?? unwatched;
  const log = new ProblemLog();
  const document = parseCif(
    source,
    log,
    (share, stage) => progress(share * syntaxShare, stage),
    isNeededName,
  );
  const structures: Crystal[] = [];
  const tensorSets: TensorSet[] = [];
  const { blocks } = document;
  const report = blockProgress(progress, blocks.length);
  const views = withBorrowedItems(
    blocks.map((block) => viewBlock(block, source)),
    log,
  );
  views.forEach((view, i) => {
    const read = interpretBlock(view, structures.length, log, report(i));
    if (!read) return;
    structures.push(read.crystal);
    tensorSets.push(...read.tensorSets);
  });
  if (structures.length === 0) reportNoStructure(source, document, log);
  else if (structures.length > 1) reportSeveral(structures, log);
  progress(1, 'done');
  return {
    format: document.blocks.length > 0 ? 'cif' : 'unknown',
    file: source.name,
    structures,
    tensorSets,
    proposals: [],
    problems: withoutTwins(log.list()),
  };
}

/** Progress inside each of a few blocks, else one report for every twenty-fifth of them. */
function blockProgress(progress: ReportProgress, count: number): (block: number) => ReportProgress {
  const step = Math.ceil(count / 25);
  return (block) => {
    const start = syntaxShare + ((1 - syntaxShare) * block) / count;
    if (block % step === 0) progress(start, 'reading structures');
    if (count > 3) return unwatched;
    return (share, stage) => progress(start + ((1 - syntaxShare) * share) / count, stage);
  };
}

/** Syntax says “no data block” or “stray values” of the same text of which we say more plainly what it is. */
function withoutTwins(problems: readonly Problem[]): readonly Problem[] {
  if (!problems.some(({ code }) => code === 'cif-not-a-cif')) return problems;
  return problems.filter(({ code }) => code !== 'cif-no-data-block' && code !== 'cif-stray-value');
}
