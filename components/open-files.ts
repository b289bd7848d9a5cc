import type { Problem } from '#src/store/dossier-types.ts';
import { holdsCase } from '#src/store/holds-case.ts';
import type { FileInput, Store } from '#src/store/store.ts';
import { caseUnreadable, oneCaseOnly } from '#src/store/case-problems.ts';
import { Cancelled } from '#src/store/engine-client.ts';

/** Counts what was begun to open, store by store: a case file that is read late says nothing about what came after it. */
const openings = new WeakMap<Store, number>();

/** Opens what was chosen or dropped: files as a new case, or a case file (or a picture with one inside) as it was saved. */
export async function openFiles(store: Store, files: readonly FileInput[]): Promise<boolean> {
  const opening = (openings.get(store) ?? 0) + 1;
  openings.set(store, opening);
  const isOvertaken = (): boolean => openings.get(store) !== opening;
  const { cases, others } = await sorted(files);
  if (isOvertaken()) return false;
  const [first, second] = cases;
  if (!first) return store.open(files);
  if (second) {
    store.refuse(`open ${first.name}`, files, [oneCaseOnly(cases)]);
    return false;
  }
  const read = await store.readCase(first).catch((error: unknown) => notRead(first, error));
  if (isOvertaken() || !read) return false;
  const { opened, problems } = read;
  if (!opened) {
    store.refuse(`open ${first.name}`, [first], problems);
    return false;
  }
  const isOpen = await store.openCase(opened);
  return isOpen && others.length > 0 ? store.add(others) : isOpen;
}

/** Why a case file was not read; null where that was cancelled. */
function notRead({ name }: FileInput, error: unknown): { opened: null; problems: Problem[] } | null {
  return error instanceof Cancelled ? null : { opened: null, problems: [caseUnreadable(name, error)] };
}

/** Adds files to the crystal on screen; a case file stands for a crystal of its own and is refused. */
export async function addFiles(store: Store, files: readonly FileInput[]): Promise<boolean> {
  const { cases } = await sorted(files);
  if (!store.state.decisions) return openFiles(store, files);
  if (cases.length === 0) return store.add(files);
  store.refuse(`add ${cases[0]?.name}`, files, [oneCaseOnly(cases)]);
  return false;
}

async function sorted(
  files: readonly FileInput[],
): Promise<{ readonly cases: readonly FileInput[]; readonly others: readonly FileInput[] }> {
  const hold = await Promise.all(files.map(({ blob }) => holdsCase(blob)));
  return { cases: files.filter((_, i) => hold[i]), others: files.filter((_, i) => !hold[i]) };
}
