/**
 * Isotropic values that occur, ppm: absolute shieldings and shifts of compounds, by element. Only elements whose two ranges
 * stand apart well enough to tell them from each other. Common practice, values from memory, no source: they decide
 * nothing alone but what a value cannot be.
 */
const scales: Readonly<
  Record<string, { readonly shielding: readonly [number, number]; readonly shift: readonly [number, number] }>
> = {
  H: { shielding: [12, 60], shift: [-8, 20] },
  Li: { shielding: [78, 115], shift: [-15, 15] },
  Be: { shielding: [90, 150], shift: [-40, 40] },
  Na: { shielding: [480, 660], shift: [-90, 60] },
  Mg: { shielding: [450, 720], shift: [-80, 100] },
  Al: { shielding: [380, 700], shift: [-80, 250] },
  Si: { shielding: [280, 650], shift: [-350, 200] },
  K: { shielding: [1050, 1450], shift: [-150, 150] },
  Ca: { shielding: [900, 1350], shift: [-150, 250] },
  Rb: { shielding: [2800, 3600], shift: [-200, 250] },
  Sr: { shielding: [2500, 3400], shift: [-250, 400] },
  Cs: { shielding: [5000, 6500], shift: [-300, 400] },
  Ba: { shielding: [4400, 6200], shift: [-250, 600] },
  Zn: { shielding: [1400, 2200], shift: [-100, 500] },
  Ga: { shielding: [1300, 2200], shift: [-200, 500] },
  Ge: { shielding: [1200, 2400], shift: [-700, 200] },
  Cl: { shielding: [500, 1250], shift: [-150, 250] },
  Br: { shielding: [1600, 3500], shift: [-300, 600] },
  I: { shielding: [3200, 6500], shift: [-600, 1200] },
};

/** What an isotropic value of an element can be. */
export interface ValueReading {
  readonly shielding: boolean;
  readonly shift: boolean;
  /** A shielding with its sign changed. */
  readonly minusShielding: boolean;
}

/** null where the element's ranges overlap, so that a value says nothing. */
export function valueReading(element: string, isotropicPpm: number): ValueReading | null {
  const scale = scales[element === 'D' || element === 'T' ? 'H' : element];
  if (!scale) return null;
  const within = ([low, high]: readonly [number, number], value: number) => value >= low && value <= high;
  return {
    shielding: within(scale.shielding, isotropicPpm),
    shift: within(scale.shift, isotropicPpm),
    minusShielding: within(scale.shielding, -isotropicPpm),
  };
}
