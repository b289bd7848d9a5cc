import fc from 'fast-check';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { CaseSource } from '#src/case/case-document.ts';
import type { NewCase } from '#src/case/new-case.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { Look } from '#src/scene/look.ts';
import type { Measurement } from '#src/scene/measurement.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { TableSettings } from '#src/table/table-settings.ts';

/** A finite number other than −0, which JSON writes as 0. */
const real = fc.double({ min: -1e6, max: 1e6, noNaN: true }).map((x) => x + 0);
const positive = fc.double({ min: 1e-6, max: 1e6, noNaN: true });
const orNull = <T>(some: fc.Arbitrary<T>): fc.Arbitrary<T | null> => fc.option(some, { nil: null });
const vector: fc.Arbitrary<Vec3> = fc.tuple(real, real, real);
const isotope = fc.constantFrom('1H', '13C', '27Al', '29Si', '17O');
const element = fc.constantFrom('H', 'C', 'Al', 'Si', 'O');

/** Settings that are valid, none of them derived from another. */
export const arbitrarySettings: fc.Arbitrary<DossierSettings> = fc.record({
  isotopes: fc.dictionary(element, isotope, { noNullPrototype: true }),
  references: fc.dictionary(
    isotope,
    fc.record({
      kind: fc.constantFrom('simple', 'regression', 'exact'),
      interceptPpm: real,
      slope: real,
      isotope,
    }),
    { noNullPrototype: true },
  ),
  quadrupoleMomentsBarn: fc.dictionary(isotope, real, { noNullPrototype: true }),
  symmetry: fc.constantFrom('auto', 'file', 'find', 'none'),
  symmetryToleranceAngstrom: fc.double({ min: 1e-9, max: 1, noNaN: true }),
  mergeDistanceAngstrom: fc.double({ min: 0, max: 10, noNaN: true }).map((x) => x + 0),
  frame: orNull(fc.constantFrom('c-z-b-yz', 'a-x-b-xy')),
});

/** Picture options, each choice in some of its forms. */
export const arbitraryPicture: fc.Arbitrary<SceneOptions> = fc
  .record(
    {
      quantity: fc.constantFrom('auto', 'shielding', 'shift', 'efg'),
      showTensors: fc.boolean(),
      tensorElements: fc.oneof(fc.constantFrom('auto' as const, null), fc.array(element)),
      extent: fc.constantFrom('auto', 'cell', 'molecules', 'asymmetric', 'range', 'shell'),
      range: fc.tuple(vector, vector),
      shell: orNull(
        fc.record({
          siteIndices: fc.array(fc.nat(99)),
          radiusAngstrom: fc.double({ min: 0, max: 99, noNaN: true }),
        }),
      ),
      glyph: fc.constantFrom('auto', 'ellipsoid', 'polar', 'axes'),
      tensorSites: orNull(fc.array(fc.nat(999))),
      tensorCopies: fc.constantFrom('all', 'first', 'orientations'),
      colourBy: fc.constantFrom('isotropic', 'span', 'coupling', 'site'),
      colourMap: fc.constantFrom('batlow', 'vik', null),
      unitsPerAngstrom: orNull(positive),
      colourLimits: orNull(fc.tuple(real, real)),
      labels: fc.boolean(),
      displacementProbability: fc.double({ min: 0.01, max: 0.99, noNaN: true }),
      disorder: fc.oneof(
        fc.constantFrom('patterns' as const, 'alike' as const),
        fc.record({ only: fc.string({ maxLength: 5 }) }),
      ),
    },
    { requiredKeys: [] },
  )
  .map((some) => ({ ...defaultSceneOptions, ...some }));

export const arbitraryCamera: fc.Arbitrary<Camera> = fc
  .tuple(vector, fc.constantFrom(0, 25), fc.double({ min: 0.001, max: 9, noNaN: true }))
  .map(([target, perspectiveDegrees, zoom]) => ({
    target,
    orientation: [0.5, -0.5, 0.5, 0.5] as const,
    zoom,
    ...(perspectiveDegrees > 0 && { perspectiveDegrees }),
  }));

export const arbitraryLook: fc.Arbitrary<Look> = fc.record({
  depthCue: fc.boolean(),
  outlines: fc.boolean(),
  circles: fc.boolean(),
  perspectiveDegrees: fc.constantFrom(0, 20, 60),
});

const atoms = (count: number) =>
  fc.array(
    fc.record({
      atomId: fc.constantFrom('0:0', '0:1', '12:3'),
      cellShift: fc.tuple(fc.nat(3), fc.nat(3), fc.nat(3)),
    }),
    { minLength: count, maxLength: count },
  );

export const arbitraryMeasurement: fc.Arbitrary<Measurement> = fc.oneof(
  fc.record({ id: fc.uuid(), kind: fc.constant('distance' as const), atoms: atoms(2) }),
  fc.record({ id: fc.uuid(), kind: fc.constant('dihedral' as const), atoms: atoms(4) }),
  fc.record({
    id: fc.uuid(),
    kind: fc.constant('axes' as const),
    atoms: atoms(1),
    axes: fc.tuple(
      fc.record({
        of: fc.constant('tensor' as const),
        atom: fc.constant(0),
        quantity: fc.constantFrom('efg', 'shielding'),
        axis: fc.constantFrom(0, 1, 2),
      }),
      fc.record({ of: fc.constant('direction' as const), uvw: vector }),
    ),
  }),
);

export const arbitraryTable: fc.Arbitrary<TableSettings> = fc.record({
  columns: orNull(fc.uniqueArray(fc.constantFrom('label', 'isotope', 'span'))),
  sort: orNull(fc.record({ key: fc.constant('span'), descending: fc.boolean() })),
  filter: fc.record({
    elements: orNull(fc.uniqueArray(element)),
    text: fc.string({ maxLength: 5 }),
    ranges: fc.array(fc.record({ key: fc.constant('span'), low: orNull(real), high: orNull(real) }), {
      maxLength: 2,
    }),
  }),
});

const source: fc.Arbitrary<Pick<CaseSource, 'name' | 'text'>> = fc.record({
  name: fc.constantFrom('a.cif', 'Struktur α.xyz', '日本.cif', 'a.cif (2)'),
  text: fc.oneof(fc.string(), fc.string({ unit: 'binary' }), fc.constant('a\r\nb\rc\n\t"q"\\ \u2028é')),
});

/** What a case is made of; decisions about its first source. */
export const arbitraryNewCase: fc.Arbitrary<NewCase> = fc.record({
  title: fc.string(),
  sources: fc.array(source, { minLength: 1, maxLength: 3 }),
  decisions: fc.record({
    structure: orNull(fc.record({ source: fc.constant(0), index: fc.nat(9) })),
    settings: arbitrarySettings,
    accepted: fc.array(
      fc.record({
        source: fc.constant(0),
        columns: fc.dictionary(
          fc.constantFrom('tens', 'ms', '__proto__', 'constructor'),
          fc.record({
            quantity: fc.constantFrom('shielding', 'shift', 'efg'),
            unit: orNull(fc.constant('ppm')),
          }),
          { noNullPrototype: true },
        ),
      }),
      { maxLength: 2 },
    ),
    textChoices: fc.array(
      fc.record({
        signature: fc.string({ maxLength: 9 }),
        quantity: orNull(fc.constantFrom('shielding', 'shift', 'efg')),
        unit: orNull(fc.constantFrom('ppm', 'au', '1e21V/m2', 'V/A2', 'V/m2')),
        sign: fc.constantFrom(1, -1),
        order: orNull(fc.constantFrom('exchanged', 'xx yy zz xy xz yz', 'xx xy yy xz yz zz')),
        taken: orNull(fc.boolean()),
        file: orNull(fc.constantFrom('a.log', 'b')),
      }),
      { maxLength: 2 },
    ),
  }),
  views: fc.record({
    picture: arbitraryPicture,
    camera: orNull(arbitraryCamera),
    look: arbitraryLook,
    saved: fc.array(
      fc.record({
        name: fc.constantFrom('along c', 'Übersicht'),
        camera: orNull(arbitraryCamera),
        picture: arbitraryPicture,
        look: arbitraryLook,
      }),
      { maxLength: 2 },
    ),
    measurements: fc.array(arbitraryMeasurement, { maxLength: 3 }),
    table: arbitraryTable,
  }),
});
