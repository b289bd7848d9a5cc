import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';

export interface Shape {
  readonly centre: Vec3;
  readonly a: Mat3;
  readonly colour: readonly [number, number, number];
  readonly circles?: number;
}

/** A scene of nothing but the given ellipsoids, for pictures that are checked by number. */
export function shapesScene(shapes: readonly Shape[]): Scene {
  const none = new Float32Array();
  const bytes = new Uint8Array();
  const picks = shapes.map((_shape, k): PickEntry => ({
    kind: 'atom',
    atomId: String(k),
    siteIndex: k,
    cellShift: [0, 0, 0],
    context: false,
  }));
  return {
    quadrics: {
      count: shapes.length,
      centres: Float32Array.from(shapes.flatMap(({ centre }) => [...centre])),
      shapes: Float32Array.from(shapes.flatMap(({ a }) => [...a])),
      colours: Uint8Array.from(shapes.flatMap(({ colour }) => [...colour])),
      circles: Uint8Array.from(shapes.map(({ circles }) => circles ?? 0)),
      pickIds: Uint32Array.from(shapes.map((_shape, k) => k + 1)),
    },
    cylinders: {
      count: 0,
      starts: none,
      ends: none,
      radii: none,
      startColours: bytes,
      endColours: bytes,
      pickIds: new Uint32Array(),
    },
    lines: { count: 0, starts: none, ends: none, widthPx: 1 },
    labels: [],
    axes: [],
    bounds: { centre: [0, 0, 0], radiusAngstrom: 12 },
    picks,
    legend: null,
    elements: [],
    scale: null,
    scaleStatement: null,
    caption: '',
    extent: 'cell',
  };
}
