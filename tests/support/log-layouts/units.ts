/**
 * One atomic unit of field gradient in other units: 9.717362442 × 10²¹ V m⁻² (CODATA 2022, hartree / (e a0²)). Only numbers of a
 * likely size are needed here: what is read is compared with what was printed, in its unit.
 */
export const efgUnits = { '1e21V/m2': 9.717362442, 'V/A2': 97.17362442 } as const;
