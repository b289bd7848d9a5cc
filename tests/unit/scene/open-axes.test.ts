import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { shorterImage } from '#src/scene/measure-copies.ts';
import type { MeasuredCrystal } from '#src/scene/measure.ts';
import { measure } from '#src/scene/measure.ts';
import type { Measurement } from '#src/scene/measurement.ts';
import { projectPoint, projection } from '#src/scene/project.ts';
import type { Scene } from '#src/scene/scene.ts';
import { sharedPositions } from '#src/scene/shared-positions.ts';
import { dossierOfText } from '#tests/support/derive.ts';

const slab: Periodicity = [true, true, false];
const nowhere: Periodicity = [false, false, false];

/** Silicons in a box of 4, 5 and 6 Å, by fractional positions. */
function box(periodic: Periodicity, ...positions: readonly Vec3[]): CrystalDossier {
  const rows = positions.map(([x, y, z]) => `Si ${4 * x} ${5 * y} ${6 * z}`);
  const pbc = periodic.map((repeats) => (repeats ? 'T' : 'F')).join(' ');
  const head = `Lattice="4 0 0 0 5 0 0 0 6" pbc="${pbc}" Properties=species:S:1:pos:R:3`;
  return dossierOfText('box.xyz', [rows.length, head, ...rows, ''].join('\n'), { symmetry: 'none' });
}

function places({ quadrics }: Scene): string[] {
  return Array.from({ length: quadrics.count }, (_, i) =>
    Array.from(quadrics.centres.subarray(3 * i, 3 * i + 3), (x) => x.toFixed(3)).join(' '),
  );
}

const atoms = (dossier: CrystalDossier, options: Parameters<typeof buildScene>[1]): string[] =>
  places(buildScene(dossier, options));

describe('atoms on faces', () => {
  it('are repeated across those the cell repeats across: 8 corners, 4, 2, 1', () => {
    const counts = [[true, true, true] as const, slab, [false, true, false] as const, nowhere].map(
      (periodic) => atoms(box(periodic, [0, 0, 0]), { extent: 'cell' }).length,
    );
    expect(counts).toEqual([8, 4, 2, 1]);
  });

  it('stand where they are outside the cell', () => {
    const drawn = atoms(box(slab, [0.5, 0.5, -0.5], [0.5, 0.5, 2]), { extent: 'cell' });
    expect(drawn).toEqual(['2.000 2.500 -3.000', '2.000 2.500 12.000']);
  });

  it('are told of in the caption', () => {
    const words = (periodic: Periodicity): string =>
      buildScene(box(periodic, [0, 0, 0]), { extent: 'cell' }).caption;
    expect(words(slab)).toContain('One unit cell; atoms on the faces it repeats across are repeated.');
    expect(words(slab)).toContain(
      'The cell does not repeat along c: atoms stand there as the file has them.',
    );
    expect(words(nowhere)).toContain('All atoms. The cell does not repeat along a, b, c:');
    expect(words([true, true, true])).not.toContain('does not repeat');
  });
});

describe('a range of cells', () => {
  const range = [
    [0, 0, 1],
    [2, 1, 3],
  ] as const;

  it('repeats along the axes that do, and takes one cell along the others, with a sentence', () => {
    const scene = buildScene(box(slab, [0.5, 0.5, -0.5]), { extent: 'range', range });
    expect(places(scene)).toEqual(['2.000 2.500 -3.000', '6.000 2.500 -3.000']);
    expect(scene.unfollowed).toEqual([
      'The cell does not repeat along c: one cell is drawn there instead of the range asked for.',
    ]);
    // edges of the two cells, and of no cell above
    expect(scene.lines.count).toBe(16);
    expect(Math.max(...scene.lines.ends.filter((_, i) => i % 3 === 2))).toBeCloseTo(6, 5);
  });

  it('is followed where it asks for nothing else', () => {
    const asked = [
      [0, 0, 0],
      [3, 1, 1],
    ] as const;
    const scene = buildScene(box(slab, [0.5, 0.5, 0.5]), { extent: 'range', range: asked });
    expect(places(scene)).toHaveLength(3);
    expect(scene.unfollowed).toEqual([]);
  });

  it('has the limit of the picture by what it repeats', () => {
    const asked = [
      [0, 0, -5000],
      [1, 1, 5000],
    ] as const;
    const { caption } = buildScene(box(slab, [0.5, 0.5, 0.5]), { extent: 'range', range: asked });
    expect(caption).not.toContain('its middle is shown');
  });
});

it('a shell looks across the faces that exist only', () => {
  const shell = { siteIndices: [0], radiusAngstrom: 6.5 };
  const around = (periodic: Periodicity): string[] =>
    atoms(box(periodic, [0.5, 0.5, 0.5]), { extent: 'shell', shell }).sort();
  // 4 and 5 Å along a and b, √41 Å across both; 6 Å along c
  expect(around([true, true, true])).toHaveLength(1 + 2 + 2 + 4 + 2);
  expect(around(slab)).toHaveLength(1 + 2 + 2 + 4);
  expect(around(nowhere)).toEqual(['2.000 2.500 3.000']);
});

it('the first view takes in atoms far outside the cell', () => {
  const scene = buildScene(box(slab, [0.5, 0.5, -4], [0.5, 0.5, 9]), { extent: 'cell' });
  const viewport = { widthPx: 400, heightPx: 300 };
  const camera = firstCamera(scene, viewport);
  for (const z of [-24, 54]) {
    const { xPx, yPx } = projectPoint(projection(camera, viewport), [2, 2.5, z]);
    expect(Math.min(xPx, 400 - xPx, yPx, 300 - yPx)).toBeGreaterThan(0);
  }
});

describe('measuring', () => {
  const measured = (periodic: Periodicity): MeasuredCrystal => {
    const dossier = box(periodic, [0.1, 0.5, 0.1], [0.9, 0.5, 0.9]);
    return { ...dossier, site: (index) => dossier.sites[index] ?? null };
  };
  const between = (...cellShift: Vec3): Measurement => ({
    id: 'm1',
    kind: 'distance',
    atoms: [
      { atomId: '0.0', cellShift: [0, 0, 0] },
      { atomId: '1.0', cellShift },
    ],
  });

  it('finds a shorter image along axes that repeat only', () => {
    const found = (periodic: Periodicity) => shorterImage(between(0, 0, 0), measured(periodic));
    expect(found([true, true, true])?.second.cellShift).toEqual([-1, 0, -1]);
    expect(found(slab)?.second.cellShift).toEqual([-1, 0, 0]);
    // 0.2·4 Å along a, 0.8·6 Å along c
    expect(found(slab)?.distanceAngstrom).toBeCloseTo(Math.hypot(0.8, 4.8), 12);
    expect(found(nowhere)).toBeNull();
  });

  it('knows no atoms in cells that are not there', () => {
    expect(measure(between(0, 0, -1), measured([true, true, true]))?.value).toBeCloseTo(
      Math.hypot(3.2, 1.2),
      12,
    );
    expect(measure(between(0, 0, -1), measured(slab))).toBeNull();
    expect(measure(between(-1, 0, 0), measured(slab))?.value).toBeCloseTo(Math.hypot(0.8, 4.8), 12);
  });
});

it('sites share a position across faces that exist only', () => {
  const shared = (periodic: Periodicity): number => {
    const dossier = box(periodic, [0.5, 0.5, 0.001], [0.5, 0.5, 0.999]);
    const sites = dossier.sites.map((site) => ({ ...site, occupancy: 0.5 }));
    return sharedPositions({ ...dossier, sites }).others.size;
  };
  expect(shared([true, true, true])).toBe(2);
  expect(shared(slab)).toBe(0);
});
