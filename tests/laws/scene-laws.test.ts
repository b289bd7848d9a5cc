import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, asMat3, multiply, transpose } from '#src/base/matrix3.ts';
import { normalize } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { quartzOperations } from '#tests/support/made-quartz.ts';

/** A proper rotation by 1.1 rad about a direction that is nobody's axis. */
const rotation: Mat3 = (() => {
  const [x, y, z] = normalize([0.3, -0.7, 0.5]);
  const [c, s] = [Math.cos(1.1), Math.sin(1.1)];
  const d = 1 - c;
  return [
    c + d * x * x,
    d * x * y - s * z,
    d * x * z + s * y,
    d * x * y + s * z,
    c + d * y * y,
    d * y * z - s * x,
    d * x * z - s * y,
    d * y * z + s * x,
    c + d * z * z,
  ];
})();

const turnedTensor = (t: Mat3): Mat3 => multiply(multiply(rotation, t), transpose(rotation));

/** A quartz-like crystal with invented tensors and displacements, in one Cartesian frame or in a turned one. */
function crystal(isTurned: boolean): CrystalDossier {
  const frame = (t: Mat3): Mat3 => (isTurned ? turnedTensor(t) : t);
  const [a, c] = [4.9137, 5.4047];
  const rows: Mat3 = [a, 0, 0, -a / 2, (Math.sqrt(3) / 2) * a, 0, 0, 0, c];
  const made = madeDossier({
    rows: isTurned ? multiply(rows, transpose(rotation)) : rows,
    sites: [
      {
        label: 'Si1',
        element: 'Si',
        position: [0.4697, 0, 1 / 3],
        operations: quartzOperations.slice(0, 3),
        shieldingPpm: frame([440, 0, 0, 0, 428, 8, 0, 8, 424]),
      },
      {
        label: 'O1',
        element: 'O',
        position: [0.4133, 0.2672, 1 / 3 - 0.1188],
        operations: quartzOperations,
        shieldingPpm: frame([190, 30, -22, 38, 232, -30, -20, -33, 248]),
        efg: frame([-0.35, 0.3, 0.1, 0.3, 0.25, -0.4, 0.1, -0.4, 0.1]),
      },
    ],
    bondLimits: { 'O-Si': 1.75 },
  });
  const displacement = {
    uAniso: [0.012, 0.02, 0.03, 0.003, -0.002, 0.004] as const,
    uEquivalent: null,
    given: 'U' as const,
  };
  return { ...made, sites: made.sites.map((site) => ({ ...site, displacement, occupancy: 0.7 })) };
}

const points = (values: Float32Array): Vec3[] =>
  Array.from(
    { length: values.length / 3 },
    (_, i) => [...values.subarray(3 * i, 3 * i + 3)] as unknown as Vec3,
  );

function expectTurned(one: Float32Array, other: Float32Array): void {
  expect(other).toHaveLength(one.length);
  const after = points(other);
  points(one).forEach((p, i) =>
    apply(rotation, p).forEach((x, k) => expect(Math.abs(after[i]![k]! - x)).toBeLessThan(2e-5)),
  );
}

/** A Aᵀ of each quadric: the ellipsoid whatever the signs of its axes. */
const squares = ({ quadrics }: Scene): Mat3[] =>
  Array.from({ length: quadrics.count }, (_, i) => {
    const shape = asMat3(quadrics.shapes.subarray(9 * i, 9 * i + 9));
    return multiply(shape, transpose(shape));
  });

/** Bond lengths in another frame differ by rounding. */
const withoutRounding = (pick: PickEntry): PickEntry =>
  pick.kind === 'bond' ? { ...pick, lengthAngstrom: Number(pick.lengthAngstrom.toFixed(9)) } : pick;

const pictures: readonly (readonly [string, Partial<SceneOptions>])[] = [
  ['ellipsoids', {}],
  ['deviations', { ellipsoid: 'deviation', quantity: 'shielding' }],
  [
    'a range of cells',
    {
      extent: 'range',
      range: [
        [-0.3, 0.2, 0],
        [1.4, 1.1, 2],
      ],
    },
  ],
  ['the asymmetric unit', { extent: 'asymmetric' }],
  ['a shell', { extent: 'shell', shell: { siteIndices: [0], radiusAngstrom: 4.1 } }],
  ['polar surfaces', { quantity: 'efg' }],
  ['principal axes', { glyph: 'axes' }],
  ['displacement ellipsoids', { displacement: 'instead' }],
  ['polyhedra', { polyhedra: ['Si'] }],
];

describe('the same crystal in another Cartesian frame gives the same picture, turned', () => {
  it.each(pictures)('%s', (_name, options) => {
    const [one, other] = [crystal(false), crystal(true)].map((dossier) => buildScene(dossier, options)) as [
      Scene,
      Scene,
    ];
    expectTurned(one.quadrics.centres, other.quadrics.centres);
    expectTurned(one.lines.starts, other.lines.starts);
    expectTurned(one.facets?.corners ?? new Float32Array(), other.facets?.corners ?? new Float32Array());
    const after = squares(other);
    squares(one).forEach((square, i) =>
      turnedTensor(square).forEach((x, k) => expect(Math.abs(x - after[i]![k]!)).toBeLessThan(2e-5)),
    );
    expect(other.quadrics.colours).toEqual(one.quadrics.colours);
    expect(other.quadrics.shares).toEqual(one.quadrics.shares);
    expect(other.picks.map(withoutRounding)).toEqual(one.picks.map(withoutRounding));
    expect(other.legend).toEqual(one.legend);
    expect(other.caption).toBe(one.caption);
    expect(other.scaleStatement).toBe(one.scaleStatement);
    // rods have no sense of direction: their middles and lengths say all
    const middles = ({ cylinders }: Scene) => cylinders.starts.map((x, i) => (x + cylinders.ends[i]!) / 2);
    const sorted = (scene: Scene) => [...scene.cylinders.radii].sort();
    expect(sorted(other)).toEqual(sorted(one));
    if (options.glyph !== 'axes') expectTurned(middles(one), middles(other));
  });

  it('polar surfaces turn as tensors do', () => {
    const [one, other] = [crystal(false), crystal(true)].map((dossier) =>
      buildScene(dossier, { quantity: 'efg' }),
    ) as [Scene, Scene];
    for (let i = 0; i < one.polars!.count; i++) {
      const full = (scene: Scene): Mat3 => {
        const [xx, yy, zz, xy, xz, yz] = scene.polars!.tensors.subarray(6 * i, 6 * i + 6);
        return [xx!, xy!, xz!, xy!, yy!, yz!, xz!, yz!, zz!];
      };
      const after = full(other);
      turnedTensor(full(one)).forEach((x, k) => expect(Math.abs(x - after[k]!)).toBeLessThan(1e-5));
    }
  });

  it('axial vectors turn as vectors do under a rotation of the frame', () => {
    const options = { part: 'antisymmetric', tensorSites: [1], bonds: false } as const;
    const [one, other] = [crystal(false), crystal(true)].map((dossier) => buildScene(dossier, options)) as [
      Scene,
      Scene,
    ];
    expect(one.cylinders.count).toBeGreaterThan(5);
    expectTurned(one.cylinders.starts, other.cylinders.starts);
    expectTurned(one.cylinders.ends, other.cylinders.ends);
  });
});
