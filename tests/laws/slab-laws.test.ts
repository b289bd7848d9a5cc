import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import type { SlabOptions } from '#tests/support/made-slab.ts';
import { alongCell, slabText } from '#tests/support/made-slab.ts';

/** Slabs, chains and a cluster. */
const arrangements: readonly Periodicity[] = [
  [true, true, false],
  [true, false, true],
  [false, true, true],
  [false, false, true],
  [false, true, false],
  [true, false, false],
  [false, false, false],
];

const extents: readonly Partial<SceneOptions>[] = [
  {},
  { extent: 'cell' },
  { extent: 'molecules' },
  { extent: 'asymmetric', bonds: false },
  {
    extent: 'range',
    range: [
      [-0.4, -0.3, -0.2],
      [1.6, 1.3, 2.1],
    ],
  },
  { extent: 'shell', shell: { siteIndices: [0, 4], radiusAngstrom: 6 } },
];

function derived(options: SlabOptions): CrystalDossier {
  return dossierOfText('slab.xyz', slabText(options), { symmetry: 'none' });
}

/** Bonds by their atoms, with the cell of the second and the length in thousandths of Å. */
function bondsOf({ bonds }: CrystalDossier): string[] {
  return bonds.map(({ from, to, shift, kind, lengthAngstrom }) =>
    [from, to, shift.map((n) => n || 0).join(' '), kind, lengthAngstrom.toFixed(3)].join(),
  );
}

function tensorsOf({ sites }: CrystalDossier): string[] {
  return sites.map(({ shielding }) => shielding!.tensor.map((value) => value.toFixed(6)).join(' '));
}

/** How many groups of atoms hang together by bonds. */
function moleculeCount({ bonds, sites }: CrystalDossier): number {
  const group = new Map(sites.flatMap(({ equivalents }) => equivalents.map(({ id }) => [id, id] as const)));
  for (const { from, to, kind } of bonds) {
    if (kind !== 'bond') continue;
    const [kept, lost] = [group.get(from)!, group.get(to)!];
    for (const [id, name] of group) if (name === lost) group.set(id, kept);
  }
  return new Set(group.values()).size;
}

/** Everything drawn of atoms and bonds, less a shift, in hundredths of Å; without the edges of the cell. */
function drawnOf({ quadrics, cylinders, picks }: Scene, shift: Vec3): unknown {
  const places = (values: Float32Array): number[] =>
    Array.from(values, (value, i) => Math.round(100 * (value - shift[i % 3]!)) || 0);
  return {
    picks: picks.map((pick) =>
      pick.kind === 'atom' ? `${pick.atomId} ${pick.cellShift.map((n) => n || 0).join(' ')}` : pick.kind,
    ),
    centres: places(quadrics.centres),
    shapes: Array.from(quadrics.shapes, (value) => Math.round(1000 * value) || 0),
    cylinders: [cylinders.count, places(cylinders.starts), places(cylinders.ends)],
  };
}

describe.each(arrangements)('a cell with pbc %s %s %s', (...periodic) => {
  const here = derived({ periodic });
  const scenes = extents.map((options) => buildScene(here, options));
  const open = (amounts: readonly number[]): Vec3 =>
    alongCell(amounts.map((amount, axis) => (periodic[axis] ? 0 : amount)) as unknown as Vec3);

  it('has atoms where the file puts them along axes that do not repeat', () => {
    const moved = here.sites.flatMap(({ fractional, equivalents }) =>
      equivalents.map((atom) => atom.fractional!.map((x, k) => x - fractional![k]!)),
    );
    for (const axis of [0, 1, 2].filter((k) => !periodic[k]))
      expect(Math.max(...moved.map((change) => Math.abs(change[axis]!)))).toBe(0);
    const shifts = [...here.bonds.map(({ shift }) => shift), ...Object.values(here.wholeMolecules)];
    expect(shifts.every((shift) => shift.every((n, axis) => n === 0 || periodic[axis]))).toBe(true);
  });

  it('does not care where it stands along them: bonds, molecules, tensors and pictures', () => {
    const amount = fc.double({ min: -9, max: 9, noNaN: true });
    fc.assert(
      fc.property(fc.tuple(amount, amount, amount), (amounts) => {
        const shift = open(amounts);
        const there = derived({ periodic, shift });
        expect(bondsOf(there)).toEqual(bondsOf(here));
        expect(there.wholeMolecules).toEqual(here.wholeMolecules);
        expect(tensorsOf(there)).toEqual(tensorsOf(here));
        extents.forEach((options, i) => {
          const scene = buildScene(there, options);
          expect(closeTo(drawnOf(scene, shift), drawnOf(scenes[i]!, [0, 0, 0]))).toBe(true);
          expect(scene.caption).toBe(scenes[i]!.caption);
        });
      }),
      { numRuns: 8 },
    );
  });

  it('is as its atoms in a crystal with vacuum between them', () => {
    const stretch = periodic.map((repeats) => (repeats ? 1 : 12)) as unknown as Vec3;
    const shift = open([4, 4, 4]);
    const slab = derived({ periodic, shift });
    const crystal = derived({ periodic: [true, true, true], stretch, shift });
    expect(bondsOf(crystal)).toEqual(bondsOf(slab));
    expect(crystal.wholeMolecules).toEqual(slab.wholeMolecules);
    expect(tensorsOf(crystal)).toEqual(tensorsOf(slab));
    expect(moleculeCount(crystal)).toBe(moleculeCount(slab));
    const own = { extent: 'molecules' } as const;
    expect(
      closeTo(drawnOf(buildScene(crystal, own), [0, 0, 0]), drawnOf(buildScene(slab, own), [0, 0, 0])),
    ).toBe(true);
  });
});

it('bonds across the faces that exist, and across no other', () => {
  // five molecules of three or four atoms, and a pair Si, O over each of the three faces
  const counts = arrangements.map((periodic) => moleculeCount(derived({ periodic })));
  expect(counts).toEqual(arrangements.map((periodic) => 11 - periodic.filter(Boolean).length));
  expect(moleculeCount(derived({ periodic: [true, true, true] }))).toBe(8);
});

it('T T T is what a file without pbc has', () => {
  const [stated, unstated] = [derived({ periodic: [true, true, true] }), derived({ periodic: null })];
  expect(stated).toEqual(unstated);
  expect(stated).not.toHaveProperty('periodic');
  for (const options of extents) expect(buildScene(stated, options)).toEqual(buildScene(unstated, options));
});

/** The same words and counts, and numbers that differ by rounding only. */
function closeTo(one: unknown, other: unknown): boolean {
  if (typeof one === 'number' && typeof other === 'number') return Math.abs(one - other) <= 1;
  if (Array.isArray(one) && Array.isArray(other))
    return one.length === other.length && one.every((part, i) => closeTo(part, other[i]));
  if (typeof one === 'object' && one !== null && typeof other === 'object' && other !== null)
    return closeTo(Object.entries(one), Object.entries(other));
  return one === other;
}
