import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { PictureCorner } from '#src/scene/free-corner.ts';
import { freeCorner, pictureCorners } from '#src/scene/free-corner.ts';
import type { Scene } from '#src/scene/scene.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const viewport = { widthPx: 400, heightPx: 400 };
/** 40 pixels an Å about the origin: the picture reaches 5 Å to each side. */
const camera: Camera = { target: [0, 0, 0], orientation: [0, 0, 0, 1], zoom: 0.1 };
const size = { widthPx: 60, heightPx: 60 };
const boxes = {
  'lower left': { leftPx: 10, topPx: 330, ...size },
  'upper left': { leftPx: 10, topPx: 10, ...size },
  'lower right': { leftPx: 330, topPx: 330, ...size },
  'upper right': { leftPx: 330, topPx: 10, ...size },
};
/** The middle of each box, Å. */
const middles = {
  'lower left': [-4, -4, 0],
  'upper left': [-4, 4, 0],
  'lower right': [4, -4, 0],
  'upper right': [4, 4, 0],
} as const;
type Point = readonly [number, number, number];

interface Things {
  readonly atoms?: readonly Point[];
  readonly bonds?: readonly (readonly [Point, Point])[];
  readonly edges?: readonly (readonly [Point, Point])[];
}

/** Spheres of 0.5 Å, bonds and cell edges. */
function drawn({ atoms = [], bonds = [], edges = [] }: Things): Scene {
  const ends = (pairs: readonly (readonly [Point, Point])[]) => ({
    count: pairs.length,
    starts: new Float32Array(pairs.flatMap(([start]) => start)),
    ends: new Float32Array(pairs.flatMap(([, end]) => end)),
  });
  const scene = buildScene(madeUrea(), {});
  return {
    ...scene,
    quadrics: {
      count: atoms.length,
      centres: new Float32Array(atoms.flat()),
      shapes: new Float32Array(atoms.flatMap(() => [0.5, 0, 0, 0, 0.5, 0, 0, 0, 0.5])),
      colours: new Uint8Array(3 * atoms.length),
      circles: new Uint8Array(atoms.length),
      pickIds: Uint32Array.from(atoms, (_, i) => i + 1),
    },
    cylinders: { ...scene.cylinders, ...ends(bonds) },
    lines: { ...scene.lines, ...ends(edges) },
  };
}

const corner = (things: Things, before: PictureCorner | null = null): PictureCorner =>
  freeCorner(drawn(things), camera, viewport, boxes, before);

describe('the corner for a small drawing', () => {
  it('is the first one where all are free', () => {
    expect(corner({})).toBe('lower left');
    expect(corner({ atoms: [[0, 0, 0]] })).toBe('lower left');
  });

  it.each(pictureCorners)('is the %s one where only that one is free', (free) => {
    const others = pictureCorners.filter((each) => each !== free).map((each) => middles[each]);
    expect(corner({ atoms: others })).toBe(free);
    for (const before of pictureCorners) expect(corner({ atoms: others }, before)).toBe(free);
  });

  it('counts atoms that reach in from outside, and bonds and edges that only pass through', () => {
    // its middle is 12 pixels beyond the box, its radius 20
    expect(corner({ atoms: [[-2.95, -4, 0]] })).toBe('upper left');
    const across: readonly [Point, Point] = [
      [-6, -4, 0],
      [6, -4, 3],
    ];
    expect(corner({ bonds: [across] })).toBe('upper left');
    expect(corner({ edges: [across] })).toBe('upper left');
    // past the corner of the box: its bounding box meets it, the line doesn't
    expect(corner({ edges: [[[-5.5, -2, 0] as Point, [-2, -5.5, 0] as Point]] })).toBe('upper left');
    expect(corner({ edges: [[[-3.5, -1, 0] as Point, [-1, -3.5, 0] as Point]] })).toBe('lower left');
  });

  it('stays where it is as long as that is free, and where no other is free and little better', () => {
    expect(corner({ atoms: [middles['lower left']] }, 'upper right')).toBe('upper right');
    const everywhere = pictureCorners.map((each) => middles[each]);
    expect(corner({ atoms: [...everywhere, [4, 4.1, 0]] }, 'upper right')).toBe('upper right');
    expect(corner({ atoms: [...everywhere, [4, 4.1, 0], [4, 3.9, 0]] }, 'upper right')).toBe('lower left');
  });
});
