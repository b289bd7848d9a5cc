/**
 * Invented sizes of the sample tensors: isotropic shielding (ppm), size of its anisotropy (Frobenius norm of the
 * traceless part, ppm) and size of the field gradient (Frobenius norm, a.u.; null where none is given). Orders of
 * magnitude follow common practice for such sites, no source; no number was calculated or measured.
 */
export interface InventedSize {
  readonly isotropicPpm: number;
  readonly anisotropyPpm: number;
  readonly gradientAu: number | null;
}

const size = (isotropicPpm: number, anisotropyPpm: number, gradientAu: number | null = null): InventedSize => ({
  isotropicPpm,
  anisotropyPpm,
  gradientAu,
});

/** By sample and site label. */
export const inventedSizes: Readonly<Record<string, Readonly<Record<string, InventedSize>>>> = {
  'drum-1-quartz': {
    Si1: size(433.2, 24),
    O1: size(217.6, 62, 1.07),
  },
  'drum-2-diopside': {
    Ca1: size(1158.4, 71, 0.29),
    Mg1: size(561.7, 26, 0.052),
    Si1: size(421.9, 58),
    O1: size(172.3, 54, 0.61),
    O2: size(195.8, 49, 0.58),
    O3: size(188.1, 83, 0.96),
  },
  'drum-3-malate': {
    O1: size(21.4, 310, 1.62),
    O2: size(-6.2, 345, 1.71),
    O3: size(86.5, 170, 1.53),
    O4: size(-71.8, 430, 1.74),
    O5: size(264.7, 48, 1.92),
    N1: size(193.6, 13, 0.26),
    C1: size(-9.1, 104),
    C2: size(102.4, 31),
    C3: size(130.8, 28),
    C4: size(-4.3, 112),
    C11: size(30.7, 137),
    C12: size(42.9, 131),
    C13: size(40.6, 134),
    C14: size(41.8, 129),
    C15: size(40.1, 135),
    C16: size(43.6, 130),
    C17: size(118.2, 27),
    C18: size(151.9, 22),
    H3: size(15.1, 21),
    H5: size(24.3, 15),
    H2A: size(26.6, 6.1),
    H3A: size(28.1, 6.7),
    H3B: size(27.7, 6.5),
    H1A: size(21.9, 13.2),
    H1B: size(22.4, 12.7),
    H1C: size(22.8, 12.1),
    H12: size(23.4, 5.2),
    H13: size(23.9, 5.0),
    H14: size(24.2, 4.8),
    H15: size(23.7, 5.1),
    H16: size(23.2, 5.3),
    H17: size(26.2, 5.9),
    H18A: size(29.3, 7.2),
    H18B: size(29.6, 7.4),
    H18C: size(29.1, 7.1),
  },
};
