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
