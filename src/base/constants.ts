/** CODATA 2022 (Mohr, Newell, Taylor & Tiesinga, arXiv:2409.03787); SI units stand in the names. */
export const planckJs = 6.62607015e-34;
export const elementaryChargeC = 1.602176634e-19;
export const hartreeJ = 4.359744722206e-18;
export const bohrM = 5.29177210544e-11;
export const bohrAngstrom = bohrM * 1e10;
/** Vacuum magnetic permeability, N A⁻². */
export const magneticConstant = 1.25663706127e-6;
/** One atomic unit of electric field gradient, Eh e⁻¹ a0⁻², in V m⁻². */
export const efgAtomicUnitVPerM2 = hartreeJ / (elementaryChargeC * bohrM * bohrM);

/** One barn in m². */
export const barnM2 = 1e-28;
/** Reduced Planck constant, J s rad⁻¹. */
export const reducedPlanckJs = planckJs / (2 * Math.PI);

/** One a.u. of electric field gradient in 10²¹ V m⁻²: 9.717362442. */
export const efgAtomicUnit1e21VPerM2 = efgAtomicUnitVPerM2 / 1e21;
/** One a.u. of electric field gradient in V Å⁻²: 97.17362442 (1 V Å⁻² = 10²⁰ V m⁻²). */
export const efgAtomicUnitVPerA2 = efgAtomicUnitVPerM2 / 1e20;
/** C_Q = e Q Vzz / h in MHz for Q = 1 barn and Vzz = 1 a.u.: 234.9647785 (relative uncertainty 3e-10, from a0). */
export const couplingMHzPerBarnAtomicUnit =
  (((elementaryChargeC * efgAtomicUnitVPerM2) / planckJs) * barnM2) / 1e6;
