/** The catalogue of conventions for the components, which know the store, not what comes before it. */
export { convention, conventionCatalogue, digitsOf, entryValue } from '#src/dossier/conventions.ts';
export type { ConventionEntry } from '#src/dossier/conventions.ts';
