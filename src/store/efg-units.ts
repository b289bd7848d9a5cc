/** Units of field gradients for the components, which know the store, not the tensor folder. */
export { efgFromAtomicUnits } from '#src/tensor/units.ts';
