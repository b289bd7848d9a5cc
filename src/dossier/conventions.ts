import type { ConventionEntry } from '#src/tensor/convention-catalogue.ts';

/** The catalogue of conventions for what comes after the dossiers, which knows these, not the tensor folder. */
export { convention, conventionCatalogue, digitsOf } from '#src/tensor/convention-catalogue.ts';
export type { ConventionEntry } from '#src/tensor/convention-catalogue.ts';

/**
 * The number an entry labels, out of the dossier of its quantity: null where it is undefined, `undefined` where the
 * dossier does not carry it.
 */
export function entryValue(part: object, { field, index }: ConventionEntry): number | null | undefined {
  const value = (part as Readonly<Record<string, unknown>>)[field];
  const element: unknown = index !== null && Array.isArray(value) ? value[index] : value;
  return typeof element === 'number' || element === null ? element : undefined;
}
