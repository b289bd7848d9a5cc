/** For the Show panel: the components know the store, not the folders below it. */
export { openAxes, repeatsThroughout } from '#src/base/periodicity.ts';
