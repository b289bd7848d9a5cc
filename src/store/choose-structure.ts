import type { Crystal } from '#src/crystal/crystal.ts';
import type { Reading } from '#src/readers/reading.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { ProposalSummary, StructureChoice, StructureSummary, TensorSummary } from './engine-protocol.ts';

/** A reading and the file it came from. */
interface ReadFile {
  readonly file: { readonly id: string; readonly name: string };
  readonly reading: Reading;
}

/** All structures that can be chosen, file after file. */
export function structuresOf(read: readonly ReadFile[]): StructureSummary[] {
  return read.flatMap(({ file, reading }) =>
    reading.structures.map((crystal, index) => ({
      sourceId: file.id,
      index,
      name: crystal.name,
      file: file.name,
      line: crystal.place.line,
      siteCount: crystal.sites.length,
      formula: crystal.formula.sum,
      periodic: crystal.lattice !== null,
    })),
  );
}

/** The wanted structure where it exists, else the first of the first file that holds one; null without any. */
export function chooseStructure(
  read: readonly ReadFile[],
  wanted: StructureChoice | null,
): { readonly choice: StructureChoice; readonly crystal: Crystal } | null {
  const all = read.flatMap(({ file, reading }) =>
    reading.structures.map((crystal, index) => ({ choice: { sourceId: file.id, index }, crystal })),
  );
  const isWanted = ({ choice }: { choice: StructureChoice }): boolean =>
    choice.sourceId === wanted?.sourceId && choice.index === wanted.index;
  return all.find(isWanted) ?? all[0] ?? null;
}

/**
 * The tensor sets of a case, each marked whether it belongs to the chosen structure: sets of the same file belong to
 * the structure they stand in; of another file those without a structure or with its first one.
 */
export function tensorsFor(
  read: readonly ReadFile[],
  choice: StructureChoice | null,
): { readonly summary: TensorSummary; readonly set: TensorSet }[] {
  return read.flatMap(({ file, reading }) =>
    reading.tensorSets.map((set) => {
      const structure = file.id === choice?.sourceId ? choice.index : 0;
      const used = choice !== null && (set.structureIndex === null || set.structureIndex === structure);
      const { name, quantity, unitGiven } = set;
      const summary = { sourceId: file.id, name, quantity, unitGiven, entryCount: set.entries.length, used };
      return { summary, set };
    }),
  );
}

/** Columns the readers propose, one each, however many structures have it. */
export function proposalsOf(read: readonly ReadFile[]): ProposalSummary[] {
  return read.flatMap(({ file, reading }) => {
    const byName = new Map<string, ProposalSummary>();
    for (const { name, line, quantity, reason } of reading.proposals) {
      if (!byName.has(name)) byName.set(name, { sourceId: file.id, name, line, quantity, reason });
    }
    return [...byName.values()];
  });
}
