import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, distance, scale } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { copiesOf, shorterImage } from '#src/scene/measure-copies.ts';
import { measureDrawing } from '#src/scene/measure-drawing.ts';
import type { MeasuredCrystal } from '#src/scene/measure.ts';
import { angleDegrees, dihedralDegrees, foldedDegrees, measure } from '#src/scene/measure.ts';
import type { MeasuredAtom, Measurement, MeasurementKind } from '#src/scene/measurement.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz, quartzOperations } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

function measured(dossier: CrystalDossier): MeasuredCrystal {
  return { ...dossier, site: (index) => dossier.sites[index] ?? null };
}

const quartz: MeasuredCrystal = {
  ...measured(madeQuartz()),
  symmetry: { operations: quartzOperations.map(({ w, t }) => ({ rotation: w, translation: t })) },
};

const at = (atomId: string, cellShift: Vec3 = [0, 0, 0]): MeasuredAtom => ({ atomId, cellShift });
const of = (kind: MeasurementKind, ...atoms: MeasuredAtom[]): Measurement => ({ id: 'm1', kind, atoms });

/** Four atoms of a molecule by hand: A above B, C below along −z, D to the right of C. */
const molecule = measured(
  madeDossier({
    rows: null,
    sites: (
      [
        [0, 1, 0],
        [0, 0, 0],
        [0, 0, -1],
        [1, 0, -1],
        [0, 0, -2],
      ] as const
    ).map((position, k) => ({ label: `A${k}`, element: 'C', position })),
  }),
);

describe('measuring', () => {
  it('distance and angle of a molecule by hand', () => {
    expect(measure(of('distance', at('0:0'), at('3:0')), molecule)?.value).toBeCloseTo(Math.sqrt(3), 12);
    expect(measure(of('angle', at('0:0'), at('1:0'), at('2:0')), molecule)?.value).toBeCloseTo(90, 12);
    // A B D: cos = (0, 1, 0)·(1, 0, −1) = 0; A D B: cos = (−1, 1, 1)·(−1, 0, 1)/√6
    const value = measure(of('angle', at('0:0'), at('3:0'), at('1:0')), molecule)?.value;
    expect(value).toBeCloseTo((Math.acos(2 / Math.sqrt(6)) * 180) / Math.PI, 10);
  });

  it('dihedral: the front bond up, the rear bond to the right is a clockwise turn, +90°', () => {
    const atoms = ['0:0', '1:0', '2:0', '3:0'].map((id) => at(id));
    expect(measure(of('dihedral', ...atoms), molecule)?.value).toBeCloseTo(90, 12);
    // the same seen from behind
    expect(measure(of('dihedral', ...[...atoms].reverse()), molecule)?.value).toBeCloseTo(90, 12);
  });

  it('says when there is no value', () => {
    const line = of('dihedral', at('3:0'), at('1:0'), at('2:0'), at('4:0'));
    expect(measure(line, molecule)).toMatchObject({
      value: null,
      undefinedBecause: expect.stringMatching('line'),
    });
    const point = of('angle', at('0:0'), at('0:0'), at('1:0'));
    expect(measure(point, molecule)?.undefinedBecause).toMatch(/one place/);
    expect(measure(of('distance', at('0:0'), at('9:0')), molecule)).toBeNull();
    expect(measure(of('distance', at('0:0')), molecule)).toBeNull();
  });

  it('counts the cell of each copy in', () => {
    const value = measure(of('distance', at('0:0'), at('0:0', [1, 1, 0])), quartz)?.value;
    // a + b of a hexagonal cell is as long as a
    expect(value).toBeCloseTo(4.9137, 10);
    expect(
      measure(of('angle', at('0:0', [1, 0, 0]), at('0:0'), at('0:0', [0, 1, 0])), quartz)?.value,
    ).toBeCloseTo(120, 10);
  });

  it('dihedral changes its sign in a mirror, not when read backwards or moved', () => {
    const point = fc.tuple(
      ...[0, 1, 2].map(() => fc.double({ min: -5, max: 5, noNaN: true })),
    ) as fc.Arbitrary<[number, number, number]>;
    fc.assert(
      fc.property(point, point, point, point, (a, b, c, d) => {
        const value = dihedralDegrees(a, b, c, d);
        fc.pre(
          value !== null &&
            Math.abs(value) < 179 &&
            [a, b, c].every((p, k) => distance(p, [b, c, d][k]!) > 0.1),
        );
        const mirror = ([x, y, z]: Vec3): Vec3 => [x, y, -z];
        expect(dihedralDegrees(mirror(a), mirror(b), mirror(c), mirror(d))).toBeCloseTo(-value!, 5);
        expect(dihedralDegrees(d, c, b, a)).toBeCloseTo(value!, 5);
      }),
    );
  });

  it('keeps its digits near 0 and 180°', () => {
    expect(angleDegrees([1, 0, 0], [1, 1e-9, 0])).toBeCloseTo((1e-9 * 180) / Math.PI, 15);
    expect(angleDegrees([1, 0, 0], [-1, 0, 0])).toBe(180);
    expect(foldedDegrees([1, 0, 0], [-2, 1e-9, 0])).toBeCloseTo(0, 6);
  });
});

describe('the angle between axes', () => {
  const axes = (one: 0 | 1 | 2, other: 0 | 1 | 2, ...atoms: MeasuredAtom[]): Measurement => ({
    ...of('axes', ...atoms),
    axes: [
      { of: 'tensor', atom: 0, quantity: 'shielding', axis: one },
      { of: 'tensor', atom: atoms.length - 1, quantity: 'shielding', axis: other },
    ],
  });

  it('of one tensor is 90°, and of an axis with itself 0°', () => {
    expect(measure(axes(0, 2, at('1:0')), quartz)?.value).toBeCloseTo(90, 9);
    expect(measure(axes(1, 1, at('1:0')), quartz)?.value).toBeCloseTo(0, 6);
  });

  it('turns with the atoms: three-fold images of the axis along a make 60°, folded from 120°', () => {
    // silicon's largest component is along a, its three atoms are turned by 120° about c
    const along = [0, 1, 2].filter((k) => {
      const own = measure(
        {
          ...axes(k as 0, k as 0, at('0:0')),
          axes: [
            { of: 'tensor', atom: 0, quantity: 'shielding', axis: k as 0 },
            { of: 'direction', uvw: [1, 0, 0] },
          ],
        },
        quartz,
      );
      return Math.abs(own!.value!) < 1e-6;
    });
    expect(along).toHaveLength(1);
    const k = along[0] as 0 | 1 | 2;
    expect(measure(axes(k, k, at('0:0'), at('0:1')), quartz)?.value).toBeCloseTo(60, 9);
  });

  it('to a line of atoms, a lattice direction, the normal of planes', () => {
    const to = (uvw: Vec3, hkl: Vec3): number | null | undefined =>
      measure(
        {
          ...of('axes'),
          axes: [
            { of: 'direction', uvw },
            { of: 'normal', hkl },
          ],
        },
        quartz,
      )?.value;
    expect(to([1, 0, 0], [1, 0, 0])).toBeCloseTo(30, 9);
    expect(to([0, 0, 1], [0, 0, -1])).toBeCloseTo(0, 9);
    const line = measure(
      {
        ...of('axes', at('0:0'), at('0:0', [0, 0, 2])),
        axes: [
          { of: 'line', from: 0, to: 1 },
          { of: 'direction', uvw: [1, 0, 0] },
        ],
      },
      quartz,
    );
    expect(line?.value).toBeCloseTo(90, 9);
  });

  it('is undefined for an undefined axis, and absent without the tensor', () => {
    const dossier = madeDossier({
      rows: null,
      sites: [
        {
          label: 'X',
          element: 'Al',
          position: [0, 0, 0],
          shieldingPpm: [1, 0, 0, 0, 1, 0, 0, 0, 4],
          undefinedAxes: [0, 1],
        },
      ],
    });
    const found = measure(axes(0, 2, at('0:0')), measured(dossier));
    expect(found).toMatchObject({ value: null, undefinedBecause: expect.stringMatching('degenerate') });
    expect(
      measure(
        {
          ...axes(0, 2, at('0:0')),
          axes: [
            { of: 'tensor', atom: 0, quantity: 'efg', axis: 0 },
            { of: 'tensor', atom: 0, quantity: 'efg', axis: 1 },
          ],
        },
        measured(dossier),
      ),
    ).toBeNull();
  });
});

describe('symmetry copies', () => {
  /** Every Si–O pair of one cell within 1.75 Å, by brute force over cells. */
  const bonds = quartz
    .site(0)!
    .equivalents.flatMap((si) =>
      quartz
        .site(1)!
        .equivalents.flatMap((o) =>
          [-1, 0, 1].flatMap((i) =>
            [-1, 0, 1].flatMap((j) => [-1, 0, 1].map((k) => ({ si, o, cell: [i, j, k] as Vec3 }))),
          ),
        ),
    )
    .filter(
      ({ si, o, cell }) =>
        distance(si.cartesian, add(o.cartesian, apply(quartz.lattice!.toCartesian, cell))) < 1.75,
    );

  it('of Si–O in quartz: two kinds of bond, six of each in the cell', () => {
    expect(bonds).toHaveLength(12);
    const kinds = new Map<string, number>();
    for (const { si, o, cell } of bonds) {
      const bond = of('distance', at(si.id), at(o.id, cell));
      expect(copiesOf(bond, quartz)).toEqual({ inCell: 6, mirrored: 0 });
      const text = measure(bond, quartz)!.value!.toFixed(6);
      kinds.set(text, (kinds.get(text) ?? 0) + 1);
    }
    expect([...kinds.values()]).toEqual([6, 6]);
  });

  it('of O–Si–O in quartz: 18 in the cell, of which those a two-fold axis maps on themselves are three', () => {
    const own = bonds.filter(({ si }) => si.id === '0:0');
    const counts: number[] = [];
    own.forEach((one, i) => {
      for (const other of own.slice(i + 1)) {
        counts.push(
          copiesOf(of('angle', at(one.o.id, one.cell), at('0:0'), at(other.o.id, other.cell)), quartz)!
            .inCell,
        );
      }
    });
    // four bonds in two pairs: two angles within a pair, four across
    expect(counts.sort()).toEqual([3, 3, 6, 6, 6, 6]);
  });

  it('of a chiral dihedral have one sign in a group without mirrors, both in one with', () => {
    const centred: MeasuredCrystal = {
      ...measured(
        madeDossier({
          rows: [8, 0, 0, 0, 9, 0, 0, 0, 10],
          sites: (
            [
              [0.1, 0.1, 0.1],
              [0.2, 0.1, 0.1],
              [0.2, 0.2, 0.1],
              [0.2, 0.2, 0.2],
            ] as const
          ).map((position, k) => ({
            label: `C${k}`,
            element: 'C',
            position,
            operations: [
              { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] },
              { w: [-1, 0, 0, 0, -1, 0, 0, 0, -1], t: [0, 0, 0] },
            ],
          })),
        }),
      ),
      symmetry: {
        operations: [
          { rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: [0, 0, 0] },
          { rotation: [-1, 0, 0, 0, -1, 0, 0, 0, -1], translation: [0, 0, 0] },
        ],
      },
    };
    const turn = of('dihedral', ...[0, 1, 2, 3].map((k) => at(`${k}:0`)));
    expect(copiesOf(turn, centred)).toEqual({ inCell: 2, mirrored: 1 });
    expect(copiesOf(of('distance', at('0:0'), at('0:1', [-1, -1, -1])), centred)).toEqual({
      inCell: 1,
      mirrored: 0,
    });
    expect(copiesOf(turn, molecule)).toBeNull();
  });
});

describe('the nearest image', () => {
  it('is named where another cell was chosen, and is the bond', () => {
    const urea = measured(madeUrea());
    const near = shorterImage(of('distance', at('0:0'), at('1:0', [2, 1, -1])), urea);
    expect(near?.second.cellShift).toEqual([0, 0, 0]);
    // C=O along c: (0.596 − 0.328)·4.684 Å
    expect(near?.distanceAngstrom).toBeCloseTo(1.2553, 4);
    expect(shorterImage(of('distance', at('0:0'), at('1:0')), urea)).toBeNull();
    expect(shorterImage(of('distance', at('0:0'), at('0:0', [3, 0, 0])), urea)).toBeNull();
  });

  it('is exact in a very skewed cell: as good as brute force', () => {
    const skewed = measured(
      madeDossier({
        rows: [4, 0, 0, 13, 3, 0, -9, 7, 5],
        sites: [
          { label: 'A', element: 'C', position: [0.1, 0.2, 0.3] },
          { label: 'B', element: 'C', position: [0.7, 0.9, 0.4] },
        ],
      }),
    );
    let least = Infinity;
    const [a, b] = [skewed.site(0)!.cartesian, skewed.site(1)!.cartesian];
    for (let i = -30; i <= 30; i++)
      for (let j = -12; j <= 12; j++)
        for (let k = -6; k <= 6; k++)
          least = Math.min(least, distance(a, add(b, apply(skewed.lattice!.toCartesian, [i, j, k]))));
    const far = of('distance', at('0:0', [5, 0, 0]), at('1:0', [0, 4, 0]));
    expect(shorterImage(far, skewed)!.distanceAngstrom).toBeCloseTo(least, 9);
  });
});

describe('drawing of a measurement', () => {
  it('an arc keeps its distance from the apex and ends on both legs', () => {
    const right = of('angle', at('0:0'), at('1:0'), at('2:0'));
    const { arc, lines } = measureDrawing('angle', measure(right, molecule)!)!;
    expect(lines[0]).toHaveLength(3);
    for (const point of arc!) expect(Math.hypot(...point)).toBeCloseTo(0.35, 9);
    expect(distance(arc![0]!, [0, 0.35, 0])).toBeLessThan(1e-9);
    expect(distance(arc!.at(-1)!, [0, 0, -0.35])).toBeLessThan(1e-9);
  });

  it('a dihedral has its arc about the middle bond', () => {
    const turn = of('dihedral', ...['0:0', '1:0', '2:0', '3:0'].map((id) => at(id)));
    const { arc } = measureDrawing('dihedral', measure(turn, molecule)!)!;
    for (const [x, y, z] of arc!) {
      expect(z).toBeCloseTo(-0.5, 9);
      expect(Math.hypot(x, y)).toBeCloseTo(0.49, 9);
    }
    expect(distance(arc!.at(-1)!, [0.49, 0, -0.5])).toBeLessThan(1e-9);
  });

  it('a distance has its text in the middle', () => {
    const drawn = measureDrawing('distance', measure(of('distance', at('0:0'), at('3:0')), molecule)!)!;
    expect(distance(drawn.textAt!, scale(0.5, [1, 1, -1]))).toBeLessThan(1e-12);
  });
});
