/** Nuclides for the settings panel: the components know the store, not the tables. */
export { nuclidesOf, quadrupoleMomentSet } from '#src/data/nuclides.ts';
