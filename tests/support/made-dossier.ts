import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, asMat3, determinant, identity3, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import { add, distance } from '#src/base/vector3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type {
  Axis,
  BondRecord,
  CrystalDossier,
  EfgDossier,
  EquivalentAtom,
  ShieldingDossier,
  SiteDossier,
} from '#src/dossier/dossier.ts';

/** One site of a made dossier: where its atoms are, by which fractional operations, and its tensors. */
export interface MadeSite {
  readonly label: string;
  readonly element: string;
  /** Fractional with a cell, else Cartesian. */
  readonly position: Vec3;
  /** Fractional operations that make its atoms, identity first. */
  readonly operations?: readonly { readonly w: Mat3; readonly t: Vec3 }[];
  readonly shieldingPpm?: Mat3;
  readonly efg?: Mat3;
  /** Principal axes (in the order of the components) that count as undefined. */
  readonly undefinedAxes?: readonly number[];
}

export interface MadeCrystal {
  /** Rows a, b, c; null for a molecule. */
  readonly rows: Mat3 | null;
  readonly sites: readonly MadeSite[];
  /** Longest bond by elements, Å, such as { 'O-Si': 1.8 } (elements in alphabetical order). */
  readonly bondLimits?: Readonly<Record<string, number>>;
  /** Longest hydrogen bond H…acceptor by the acceptor's element, Å. */
  readonly hydrogenBondLimits?: Readonly<Record<string, number>>;
  /** Joins bonded atoms into molecules across the cell's faces. */
  readonly molecules?: boolean;
}

const identityOperation = { w: identity3, t: [0, 0, 0] as Vec3 };

/** A dossier put together by hand, with principal values from a library of its own: for tests of what is drawn from it. */
export function madeDossier(made: MadeCrystal): CrystalDossier {
  const lattice = made.rows && latticeOf(made.rows);
  const sites = made.sites.map((site, index) => madeSite(site, index, lattice));
  const bonds = bondsWithin(sites, lattice, made);
  return {
    name: 'made',
    lattice,
    symmetry: {
      operations: [{ rotation: identity3, translation: [0, 0, 0] }],
      number: null,
      hermannMauguin: null,
      hall: null,
      source: 'file',
      reason: 'made',
      stated: true,
    },
    spaceGroup: '',
    atomsInCell: sites.reduce((sum, site) => sum + site.multiplicity, 0),
    composition: {},
    sites,
    bonds,
    wholeMolecules: made.molecules ? moleculesOf(bonds) : {},
    temperatureK: null,
    settings: defaultSettings,
    problems: [],
  };
}

function latticeOf(rows: Mat3): Lattice {
  const toCartesian = transpose(rows);
  const [a, b, c] = [0, 3, 6].map((k) => Math.hypot(rows[k]!, rows[k + 1]!, rows[k + 2]!));
  return {
    rows,
    // the scene uses the lengths only
    cell: { a: a!, b: b!, c: c!, alpha: 90, beta: 90, gamma: 90 },
    volume: Math.abs(determinant(rows)),
    toCartesian,
    toFractional: inverse(toCartesian),
    frame: 'as given',
  };
}

function madeSite(site: MadeSite, index: number, lattice: Lattice | null): SiteDossier {
  const equivalents = (site.operations ?? [identityOperation]).map(({ w, t }, k): EquivalentAtom => {
    const moved = add(apply(w, site.position), t);
    const fractional = lattice ? (moved.map((x) => x - Math.floor(x + 1e-9)) as unknown as VecFrac) : null;
    return {
      id: `${index}:${k}`,
      siteIndex: index,
      operationIndex: k,
      operation: String(k),
      fractional,
      cartesian: lattice && fractional ? apply(lattice.toCartesian, fractional) : moved,
      rotation: lattice ? multiply(multiply(lattice.toCartesian, w), lattice.toFractional) : w,
      orientation: k,
    };
  });
  const first = equivalents[0]!;
  return {
    index,
    label: site.label,
    element: site.element,
    species: [{ element: site.element, occupancy: 1 }],
    isotope: null,
    occupancy: 1,
    fractional: first.fractional,
    cartesian: first.cartesian,
    multiplicity: equivalents.length,
    siteSymmetryOrder: 1,
    wyckoff: null,
    siteSymmetry: null,
    distinctOrientations: 1,
    forced: '',
    equivalents,
    displacement: null,
    disorder: null,
    charge: null,
    attachedHydrogens: 0,
    shielding: site.shieldingPpm ? madeShielding(site.shieldingPpm, site.undefinedAxes ?? []) : null,
    shift: null,
    efg: site.efg ? madeEfg(site.efg, site.undefinedAxes ?? []) : null,
    source: { file: 'made', line: 1 },
  };
}

const noNoise = { antisymmetricNorm: 0, symmetryResidual: 0, equivalentSpread: null };

function madeShielding(tensor: Mat3, undefinedAxes: readonly number[]): ShieldingDossier {
  const { symmetric, pairs } = principal(tensor, (value) => value);
  return {
    ...noNoise,
    tensor,
    symmetric,
    projected: symmetric,
    isotropic: (tensor[0] + tensor[4] + tensor[8]) / 3,
    components: pairs.map(({ value }) => value) as unknown as Vec3,
    axes: axesOf(pairs, undefinedAxes),
    span: 0,
    skew: null,
    reducedAnisotropy: null,
    anisotropy: null,
    asymmetry: null,
    axialVector: [0, 0, 0],
    source: { file: 'made', line: 1 },
    undefinedBecause: {},
  };
}

function madeEfg(tensor: Mat3, undefinedAxes: readonly number[]): EfgDossier {
  const { symmetric, pairs } = principal(tensor, Math.abs);
  return {
    ...noNoise,
    tensor,
    symmetric,
    projected: symmetric,
    components: pairs.map(({ value }) => value) as unknown as Vec3,
    axes: axesOf(pairs, undefinedAxes),
    asymmetry: null,
    isotope: null,
    quadrupoleMomentBarn: null,
    quadrupoleMomentSource: null,
    couplingMHz: null,
    productMHz: null,
    quadrupoleFrequencyMHz: null,
    trace: 0,
    signDetermined: true,
    source: { file: 'made', line: 1 },
    undefinedBecause: {},
  };
}

interface Pair {
  readonly value: number;
  readonly axis: Vec3;
}

/** Principal values with axes by ml-matrix, ascending by a key. */
function principal(tensor: Mat3, key: (value: number) => number): { symmetric: Mat3; pairs: Pair[] } {
  const turned = transpose(tensor);
  const symmetric = asMat3(tensor.map((value, i) => (value + turned[i]!) / 2));
  const rows = [symmetric.slice(0, 3), symmetric.slice(3, 6), symmetric.slice(6, 9)];
  const found = new EigenvalueDecomposition(new Matrix(rows), { assumeSymmetric: true });
  const pairs = found.realEigenvalues
    .map((value, k) => ({ value, axis: found.eigenvectorMatrix.getColumn(k) as unknown as Vec3 }))
    .sort((one, other) => key(one.value) - key(other.value));
  return { symmetric, pairs };
}

function axesOf(pairs: readonly Pair[], undefinedAxes: readonly number[]): [Axis, Axis, Axis] {
  const axis = (k: number): Axis => (undefinedAxes.includes(k) ? null : pairs[k]!.axis);
  return [axis(0), axis(1), axis(2)];
}

/** All pairs within their limit, each once, over the neighbouring cells. */
function bondsWithin(
  sites: readonly SiteDossier[],
  lattice: Lattice | null,
  made: MadeCrystal,
): BondRecord[] {
  const atoms = sites.flatMap(({ element, equivalents }) => equivalents.map((atom) => ({ element, atom })));
  const cells = lattice ? [-1, 0, 1] : [0];
  const shifts = cells.flatMap((x) => cells.flatMap((y) => cells.map((z): Vec3 => [x, y, z])));
  const bonds: BondRecord[] = [];
  atoms.forEach((from, i) => {
    for (const [j, to] of atoms.entries()) {
      const bonded = made.bondLimits?.[[from.element, to.element].sort().join('-')] ?? 0;
      const acceptor = from.element === 'H' ? to.element : to.element === 'H' ? from.element : '';
      const limit = Math.max(bonded, made.hydrogenBondLimits?.[acceptor] ?? 0);
      for (const shift of shifts) {
        const firstOfTwo = i < j || (i === j && shift.join() > '0,0,0');
        const moved = lattice ? apply(lattice.toCartesian, shift) : ([0, 0, 0] as Vec3);
        const lengthAngstrom = distance(from.atom.cartesian, add(to.atom.cartesian, moved));
        if (!firstOfTwo || lengthAngstrom > limit || lengthAngstrom < 0.1) continue;
        const kind = lengthAngstrom <= bonded ? 'bond' : 'hydrogen';
        bonds.push({ from: from.atom.id, to: to.atom.id, shift, lengthAngstrom, kind });
      }
    }
  });
  return bonds;
}

/** Cell shifts that bring each molecule together, by walking its bonds from the first atom met. */
function moleculesOf(bonds: readonly BondRecord[]): Record<string, Vec3> {
  const steps = new Map<string, { to: string; shift: Vec3 }[]>();
  const addStep = (from: string, to: string, shift: Vec3) =>
    steps.set(from, [...(steps.get(from) ?? []), { to, shift }]);
  for (const { from, to, shift, kind } of bonds) {
    if (kind === 'hydrogen') continue;
    addStep(from, to, shift);
    addStep(to, from, [-shift[0], -shift[1], -shift[2]]);
  }
  const shifts: Record<string, Vec3> = {};
  for (const start of steps.keys()) {
    const open = start in shifts ? [] : [start];
    shifts[start] ??= [0, 0, 0];
    for (const id of open) {
      for (const { to, shift } of steps.get(id) ?? []) {
        if (to in shifts) continue;
        shifts[to] = add(shifts[id]!, shift);
        open.push(to);
      }
    }
  }
  return Object.fromEntries(Object.entries(shifts).filter(([, shift]) => shift.some((n) => n !== 0)));
}
