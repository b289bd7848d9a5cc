/** Units of field gradients for the components, which know the store, not the tensor folder. */
export { efgFromAtomicUnits, efgUnitLabel, efgUnitOf } from '#src/tensor/units.ts';
