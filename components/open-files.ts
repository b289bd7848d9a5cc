import { holdsCase } from '#src/store/holds-case.ts';
import type { FileInput, Store } from '#src/store/store.ts';
import { oneCaseOnly } from '#src/store/case-problems.ts';

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
  const { readCaseFile } = await import('#src/store/case-exchange.ts');
  const { opened, problems } = await readCaseFile(first);
  if (isOvertaken()) return false;
  if (!opened) {
    store.refuse(`open ${first.name}`, [first], problems);
    return false;
  }
  const isOpen = await store.openCase(opened);
  return isOpen && others.length > 0 ? store.add(others) : isOpen;
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
