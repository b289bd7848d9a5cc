/** The named Cartesian settings for the settings panel: the components know the store, not the crystal folder. */
export { latticeSettings } from '#src/crystal/settings.ts';
