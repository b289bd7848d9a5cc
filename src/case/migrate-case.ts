/** Turns the document of one version into that of the next. Gets whatever the file held, gives what the next version expects. */
export type Migration = (document: Readonly<Record<string, unknown>>) => Readonly<Record<string, unknown>>;

/** By the version they start from. A new version adds a line here, its schema beside the old one, and a test with an old file. */
export const migrations: Readonly<Record<number, Migration>> = {};

/** An older document, step by step, as one of the wanted version. Null where a step is missing. */
export function migrated(
  document: Readonly<Record<string, unknown>>,
  from: number,
  to: number,
  steps: Readonly<Record<number, Migration>>,
): Readonly<Record<string, unknown>> | null {
  let held = document;
  for (let version = from; version < to; version++) {
    const step = steps[version];
    if (!step) return null;
    held = { ...step(held), version: version + 1 };
  }
  return held;
}
