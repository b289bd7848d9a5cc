/** What a sample takes from a publication, and where its drum stands in our story. */
export interface PublishedStructure {
  readonly id: string;
  readonly title: string;
  readonly sentence: string;
  readonly compound: string;
  /** Citation of every number that is published, one line each. */
  readonly sources: readonly string[];
  /** What was done to the published numbers, one line each. */
  readonly changes: readonly string[];
  readonly cell: readonly [number, number, number, number, number, number];
  readonly formulaSum: string;
  readonly formulaUnits: number;
  readonly spaceGroup: { readonly number: number; readonly hermannMauguin: string; readonly hall: string };
  readonly operations: readonly string[];
  /** Label, element, then x, y, z as printed in the sample. */
  readonly sites: readonly (readonly [string, string, string, string, string])[];
}

/** Rows of `label element x y z`. */
function siteRows(text: string): PublishedStructure['sites'] {
  return text
    .trim()
    .split('\n')
    .map((row) => row.trim().split(/\s+/) as [string, string, string, string, string]);
}

const quartz: PublishedStructure = {
  id: 'drum-1-quartz',
  title: 'Drum 1: white sand',
  sentence:
    'Quartz, hexagonal axes: one silicon on a two-fold axis, one oxygen; the tensors are invented. A frame turned by 30° would show.',
  compound: 'quartz, SiO2',
  sources: [
    'Levien, L., Prewitt, C. T. & Weidner, D. J. (1980). Am. Mineral. 65, 920-930 (at room pressure).',
  ],
  changes: ['Origin moved by 2/3 c to that of International Tables A: 2/3 was added to every z.'],
  cell: [4.916, 4.916, 5.4054, 90, 90, 120],
  formulaSum: 'O2 Si',
  formulaUnits: 3,
  spaceGroup: { number: 154, hermannMauguin: 'P 32 2 1', hall: 'P 32 2"' },
  operations: ['x,y,z', '-y,x-y,z+2/3', '-x+y,-x,z+1/3', 'y,x,-z', 'x-y,-y,-z+1/3', '-x,-x+y,-z+2/3'],
  sites: siteRows(`
    Si1 Si 0.4697 0.0000 0.666667
    O1  O  0.4135 0.2669 0.785767`),
};

const diopside: PublishedStructure = {
  id: 'drum-2-diopside',
  title: 'Drum 2: pale green frit',
  sentence:
    'Diopside, monoclinic with β = 105.63°: calcium and magnesium on two-fold axes, one silicon, three oxygens; the tensors are invented.',
  compound: 'diopside, CaMgSi2O6',
  sources: [
    'Coordinates: Clark, J. R., Appleman, D. E. & Papike, J. J. (1969). Mineral. Soc. Am. Spec. Pap. 2, 31-50.',
    'Cell: Cameron, M., Sueno, S., Prewitt, C. T. & Papike, J. J. (1973). Am. Mineral. 58, 594-618.',
  ],
  changes: ['None.'],
  cell: [9.746, 8.899, 5.251, 90, 105.63, 90],
  formulaSum: 'Ca Mg O6 Si2',
  formulaUnits: 4,
  spaceGroup: { number: 15, hermannMauguin: 'C 1 2/c 1', hall: '-C 2yc' },
  operations: [
    'x,y,z',
    '-x,y,-z+1/2',
    '-x,-y,-z',
    'x,-y,z+1/2',
    'x+1/2,y+1/2,z',
    '-x+1/2,y+1/2,-z+1/2',
    '-x+1/2,-y+1/2,-z',
    'x+1/2,-y+1/2,z+1/2',
  ],
  sites: siteRows(`
    Ca1 Ca 0.0000 0.3015 0.2500
    Mg1 Mg 0.0000 0.9082 0.2500
    Si1 Si 0.2862 0.0933 0.2293
    O1  O  0.1156 0.0873 0.1422
    O2  O  0.3611 0.2500 0.3180
    O3  O  0.3505 0.0176 0.9953`),
};

const malate: PublishedStructure = {
  id: 'drum-3-malate',
  title: 'Drum 3: a crystalline salt',
  sentence:
    '1-Phenylethanaminium malate, a molecular crystal: methyl, ring, carboxyl and ammonium groups, all on general positions; the tensors are invented.',
  compound: '1-phenylethanaminium malate(1-), C12H17NO5',
  sources: [
    'Turkington, D. E., Ferguson, G., Lough, A. J. & Glidewell, C. (2004). Acta Cryst. C60, o617-o622 (150 K).',
  ],
  changes: [
    'The published anion is disordered; only its larger component (occupancy 0.745) was kept and is fully occupied here.',
    'Standard uncertainties and displacement parameters were left out.',
  ],
  cell: [6.4227, 13.5815, 7.5439, 90, 108.665, 90],
  formulaSum: 'C12 H17 N O5',
  formulaUnits: 2,
  spaceGroup: { number: 4, hermannMauguin: 'P 1 21 1', hall: 'P 2yb' },
  operations: ['x,y,z', '-x,y+1/2,-z'],
  sites: siteRows(`
    O1 O 0.2835 0.56554 0.52472
    O2 O -0.0794 0.55913 0.3834
    O3 O 0.1967 0.60310 -0.1758
    O4 O 0.4973 0.51581 -0.0412
    O5 O -0.0516 0.52137 0.0518
    N1 N 0.7339 0.50000 0.6569
    C1 C 0.1127 0.55626 0.3832
    C2 C 0.1540 0.5258 0.1998
    C3 C 0.3035 0.6000 0.1495
    C4 C 0.3444 0.5657 -0.0313
    C11 C 0.5908 0.34122 0.5052
    C12 C 0.6286 0.3399 0.3339
    C13 C 0.4807 0.2935 0.1808
    C14 C 0.2954 0.24796 0.1973
    C15 C 0.2561 0.2491 0.3663
    C16 C 0.4027 0.29537 0.5185
    C17 C 0.7470 0.38941 0.6764
    C18 C 0.9852 0.35830 0.7166
    H3 H 0.2278 0.5895 -0.2730
    H5 H -0.1551 0.5259 0.0968
    H2A H 0.2250 0.4594 0.2165
    H3A H 0.4448 0.6048 0.2525
    H3B H 0.2335 0.6658 0.1304
    H1A H 0.5905 0.5190 0.6179
    H1B H 0.7986 0.5194 0.5715
    H1C H 0.8047 0.5283 0.7695
    H12 H 0.7560 0.3707 0.3214
    H13 H 0.5071 0.2932 0.0639
    H14 H 0.1955 0.2159 0.0924
    H15 H 0.1285 0.2183 0.3781
    H16 H 0.3745 0.2958 0.6347
    H17 H 0.7010 0.3708 0.7867
    H18A H 1.0755 0.3874 0.8352
    H18B H 1.0380 0.3811 0.6153
    H18C H 0.9957 0.2864 0.7252`),
};

export const publishedStructures: readonly PublishedStructure[] = [quartz, diopside, malate];
