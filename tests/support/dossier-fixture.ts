import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { problem } from '#src/base/problem.ts';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import { summaryOf } from '#src/store/crystal-summary.ts';
import type { EngineClient } from '#src/store/engine-client.ts';
import type { DerivedCase } from '#src/store/engine-protocol.ts';
import { CrystalDesk } from '#src/store/engine-queries.ts';
import type { Queries, Query, QueryKind } from '#src/store/engine-queries.ts';
import type {
  CrystalDossier,
  EfgDossier,
  EquivalentAtom,
  ShieldingDossier,
  ShiftDossier,
  SiteDossier,
} from '#src/dossier/dossier.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';

/**
 * A small crystal put together by hand, all numbers invented: a tetragonal cell of 5 × 5 × 7 Å with a general aluminium
 * site of two atoms, an isotropic oxygen and a hydrogen without tensors. It stands in for the engine in tests of the page.
 */
const identity: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
const halfTurn: Mat3 = [-1, 0, 0, 0, -1, 0, 0, 0, 1];

function atom(
  siteIndex: number,
  image: number,
  cartesian: Vec3,
  rotation: Mat3,
  operation: string,
): EquivalentAtom {
  return {
    id: `${siteIndex}:${image}`,
    siteIndex,
    operationIndex: image,
    operation,
    fractional: [cartesian[0] / 5, cartesian[1] / 5, cartesian[2] / 7],
    cartesian,
    rotation,
    orientation: image,
  };
}

const shielding: ShieldingDossier = {
  tensor: [500, 2, 0, -2, 520, 0, 0, 0, 560],
  symmetric: [500, 0, 0, 0, 520, 0, 0, 0, 560],
  projected: [500, 0, 0, 0, 520, 0, 0, 0, 560],
  isotropic: 526.6667,
  components: [500, 520, 560],
  axes: [
    [0.6, 0.8, 0],
    [-0.8, 0.6, 0],
    [0, 0, 1],
  ],
  span: 60,
  skew: 0.3333,
  reducedAnisotropy: 33.3333,
  anisotropy: 50,
  asymmetry: 0.6,
  axialVector: [0, 0, 2],
  antisymmetricNorm: 2.8284,
  symmetryResidual: 0.0004,
  equivalentSpread: null,
  source: { file: 'invented.xyz', line: 3 },
  undefinedBecause: { equivalentSpread: 'only one of the equivalent atoms has a tensor' },
};

const shift: ShiftDossier = {
  isotropic: 23.3333,
  components: [50, 30, -10],
  axes: shielding.axes,
  span: 60,
  skew: 0.3333,
  reducedAnisotropy: -33.3333,
  anisotropy: -50,
  asymmetry: 0.6,
  reference: 'δ = 550 − σ',
  undefinedBecause: {},
};

const isotropicShielding: ShieldingDossier = {
  ...shielding,
  tensor: [200, 0, 0, 0, 200, 0, 0, 0, 200],
  symmetric: [200, 0, 0, 0, 200, 0, 0, 0, 200],
  projected: [200, 0, 0, 0, 200, 0, 0, 0, 200],
  isotropic: 200,
  components: [200, 200, 200],
  axes: [null, null, null],
  span: 0,
  skew: null,
  reducedAnisotropy: 0,
  anisotropy: 0,
  asymmetry: 0,
  antisymmetricNorm: 0,
  symmetryResidual: 0,
  source: { file: 'invented.xyz', line: 5 },
  undefinedBecause: {
    skew: 'the tensor is isotropic: its span is zero',
    axes: 'all principal values are equal',
    equivalentSpread: 'the atom has no equivalents',
  },
};

const efg: EfgDossier = {
  tensor: [0.05, 0, 0, 0, 0.1, 0, 0, 0, -0.15],
  symmetric: [0.05, 0, 0, 0, 0.1, 0, 0, 0, -0.15],
  projected: [0.05, 0, 0, 0, 0.1, 0, 0, 0, -0.15],
  components: [0.05, 0.1, -0.15],
  axes: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  asymmetry: 0.3333,
  isotope: '27Al',
  quadrupoleMomentBarn: 0.1466,
  quadrupoleMomentSource: 'year-2017 set',
  couplingMHz: -5.1669,
  productMHz: -5.2616,
  quadrupoleFrequencyMHz: -0.775,
  trace: 0,
  signDetermined: true,
  antisymmetricNorm: 0,
  symmetryResidual: 0,
  equivalentSpread: 0.0001,
  source: { file: 'invented.xyz', line: 3 },
  undefinedBecause: {},
};

const bare = {
  occupancy: 1,
  displacement: null,
  disorder: null,
  charge: null,
  attachedHydrogens: 0,
  shift: null,
  efg: null,
};

const aluminium: SiteDossier = {
  ...bare,
  index: 0,
  label: 'Al1',
  element: 'Al',
  species: [{ element: 'Al', occupancy: 1 }],
  isotope: '27Al',
  fractional: [0.1, 0.2, 0.3],
  cartesian: [0.5, 1, 2.1],
  multiplicity: 2,
  siteSymmetryOrder: 1,
  wyckoff: 'e',
  siteSymmetry: '1',
  distinctOrientations: 2,
  forced: 'nothing: six independent components',
  equivalents: [atom(0, 0, [0.5, 1, 2.1], identity, 'x,y,z'), atom(0, 1, [4.5, 4, 2.1], halfTurn, '-x,-y,z')],
  shielding,
  shift,
  efg,
  source: { file: 'invented.xyz', line: 3 },
};

const oxygen: SiteDossier = {
  ...bare,
  index: 1,
  label: 'O1',
  element: 'O',
  species: [{ element: 'O', occupancy: 1 }],
  isotope: '17O',
  fractional: [0, 0, 0],
  cartesian: [0, 0, 0],
  multiplicity: 1,
  siteSymmetryOrder: 2,
  wyckoff: 'a',
  siteSymmetry: '-4',
  distinctOrientations: 1,
  forced: 'two equal principal values',
  equivalents: [atom(1, 0, [0, 0, 0], identity, 'x,y,z')],
  shielding: isotropicShielding,
  source: { file: 'invented.xyz', line: 5 },
};

const hydrogen: SiteDossier = {
  ...oxygen,
  index: 2,
  label: 'H1',
  element: 'H',
  species: [{ element: 'H', occupancy: 1 }],
  isotope: '1H',
  fractional: [0.5, 0.5, 0.5],
  cartesian: [2.5, 2.5, 3.5],
  equivalents: [atom(2, 0, [2.5, 2.5, 3.5], identity, 'x,y,z')],
  shielding: null,
  source: { file: 'invented.xyz', line: 6 },
};

export const fixtureProblems = [
  problem('warning', 'cif-missing-value', 'The coordinate of H2 is missing; the row was left out.', {
    place: { file: 'invented.xyz', line: 7, column: 4 },
    got: '?',
    allowed: 'a number',
    hint: 'Give the coordinate.',
  }),
  problem('note', 'first-structure-taken', 'Two structures: the first was taken.'),
];

export const fixtureDossier: CrystalDossier = {
  name: 'invented aluminate',
  lattice: {
    rows: [5, 0, 0, 0, 5, 0, 0, 0, 7],
    cell: { a: 5, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 },
    volume: 175,
    toCartesian: [5, 0, 0, 0, 5, 0, 0, 0, 7],
    toFractional: [0.2, 0, 0, 0, 0.2, 0, 0, 0, 1 / 7],
    frame: 'as given',
  },
  symmetry: {
    operations: [
      { rotation: identity, translation: [0, 0, 0] },
      { rotation: halfTurn, translation: [0, 0, 0] },
    ],
    number: 3,
    hermannMauguin: 'P 1 1 2',
    hall: 'P 2',
    source: 'file',
    reason: 'invented',
    stated: true,
  },
  spaceGroup: 'P 1 1 2 (3)',
  atomsInCell: 4,
  composition: { Al: 2, O: 1, H: 1 },
  sites: [aluminium, oxygen, hydrogen],
  bonds: [{ from: '0:0', to: '1:0', shift: [0, 0, 0], lengthAngstrom: 2.3801, kind: 'bond' }],
  wholeMolecules: {},
  temperatureK: null,
  settings: defaultSettings,
  problems: fixtureProblems,
};

/** The desk that answers for a crystal the fixtures summed up. */
const desks = new WeakMap<CrystalSummary, CrystalDesk>();
let derivations = 0;

/** What the engine would answer for the fixture. */
export function fixtureCase(dossier: CrystalDossier = fixtureDossier): DerivedCase {
  const sourceId = 'source-1';
  const crystal = summaryOf(dossier);
  desks.set(crystal, new CrystalDesk(dossier));
  return {
    derivation: ++derivations,
    sources: [{ id: sourceId, name: 'invented.xyz', format: 'xyz', bytes: 300, lines: 8 }],
    structures: [
      {
        sourceId,
        index: 0,
        name: dossier.name,
        file: 'invented.xyz',
        line: 1,
        siteCount: 3,
        formula: null,
        periodic: true,
      },
    ],
    tensors: [
      { sourceId, name: 'shielding', quantity: 'shielding', unitGiven: 'ppm', entryCount: 2, used: true },
    ],
    proposals: [],
    chosen: { sourceId, index: 0 },
    crystal,
    problems: dossier.problems,
  };
}

/** Answers a question about a case of `fixtureCase`, as the worker would. */
export function answerFor<Kind extends QueryKind>(
  { crystal }: DerivedCase,
  kind: Kind,
  ask: Queries[Kind]['ask'],
): Promise<Queries[Kind]['answer']> {
  const desk = crystal && desks.get(crystal);
  return desk
    ? Promise.resolve(desk.answer({ kind, ask } as Query) as Queries[Kind]['answer'])
    : Promise.reject(new Error('no such fixture'));
}

/** An engine that answers every derivation with the given case and every request for lines with numbered ones. */
export function fixtureEngine(answer: DerivedCase = fixtureCase()): EngineClient {
  return {
    derive: (_input, report) => {
      report(0.5, 'reading');
      return Promise.resolve(answer);
    },
    ask: answerFor,
    lines: (source, first, count) => {
      const total = 8;
      const last = Math.min(total, first + count - 1);
      const lines = Array.from(
        { length: Math.max(0, last - first + 1) },
        (_, i) => `line ${first + i} of ${source.name}`,
      );
      return Promise.resolve({ first, lines, total });
    },
    cancel: () => undefined,
  };
}

/** A crystal of very many sites, for windowing: the oxygen over and over. */
export function manySites(count: number): CrystalDossier {
  const sites = Array.from({ length: count }, (_, index): SiteDossier => ({
    ...oxygen,
    index,
    label: `O${index + 1}`,
    equivalents: [{ ...oxygen.equivalents[0]!, siteIndex: index, id: `${index}:0` }],
  }));
  return { ...fixtureDossier, sites, bonds: [], atomsInCell: count };
}
