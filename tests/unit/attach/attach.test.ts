import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { attachTensors } from '#src/attach/attach.ts';
import type { AttachTarget } from '#src/attach/attach.ts';
import type { AtomImage } from '#src/attach/attachment.ts';
import { frameRotation, nearestOrthogonal, sameCell } from '#src/attach/frame-rotation.ts';
import { positionFinder } from '#src/attach/match-positions.ts';
import { apply, determinant, identity3, multiply, transpose } from '#src/base/matrix3.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { latticeSettings } from '#src/crystal/settings.ts';
import type { TensorEntry, TensorSet } from '#src/tensor/tensor-set.ts';

const cell = { a: 5, b: 6, c: 7, alpha: 85, beta: 105, gamma: 98 };
const lattice = latticeFromCell(cell, 'a-x-b-xy');

function image(siteIndex: number, element: string, fractional: Vec3, own = true): AtomImage {
  return { siteIndex, element, label: `${element}${siteIndex + 1}`, fractional, rotation: identity3, own };
}

function entry(
  element: string,
  cartesian: Vec3 | null,
  tensor: Mat3,
  label: string | null = null,
): TensorEntry {
  return { label, element, atomIndex: null, cartesian, tensor, place: { file: 't.xyz', line: 3 } };
}

function set(entries: TensorEntry[], of: TensorSet['lattice'] = lattice): TensorSet {
  return {
    name: 'tensors',
    quantity: 'shielding',
    unitGiven: 'ppm',
    lattice: of,
    structureIndex: null,
    entries,
    file: 't.xyz',
  };
}

const images = [image(0, 'Al', [0.1, 0.2, 0.3]), image(1, 'O', [0.98, 0.5, 0.01])];
const target: AttachTarget = { lattice, images, siteCount: 2, rows: null };
const tensor: Mat3 = [1, 2, 3, 4, 5, 6, 7, 8, 10];

describe('frame rotation', () => {
  it.each(latticeSettings.map(({ name }) => name))(
    'takes the edges of the first lattice to those of %s',
    (name) => {
      const other = latticeFromCell(cell, name);
      const q = frameRotation(lattice, other);
      const product = multiply(q, transpose(q));
      product.forEach((value, index) => expect(value).toBeCloseTo(identity3[index]!, 12));
      expect(determinant(q)).toBeCloseTo(1, 12);
      const a = apply(q, [lattice.rows[0], lattice.rows[1], lattice.rows[2]]);
      a.forEach((value, index) => expect(value).toBeCloseTo(other.rows[index]!, 10));
    },
  );

  it('is the identity itself for equal rows', () => {
    expect(frameRotation(lattice, latticeFromRows(lattice.rows, 'as given'))).toBe(identity3);
  });

  it('stays orthogonal for a strained cell', () => {
    const strained = latticeFromRows(
      lattice.rows.map((x, i) => x * (1 + 0.01 * (i % 3))) as unknown as Mat3,
      's',
    );
    const q = frameRotation(strained, lattice);
    multiply(q, transpose(q)).forEach((value, index) => expect(value).toBeCloseTo(identity3[index]!, 12));
  });

  it('finds the orthogonal factor of a rotation times a stretch', () => {
    const q: Mat3 = [0, -1, 0, 1, 0, 0, 0, 0, 1];
    const stretch: Mat3 = [2, 0.1, 0, 0.1, 1, 0.2, 0, 0.2, 1.5];
    nearestOrthogonal(multiply(q, stretch)).forEach((value, index) =>
      expect(value).toBeCloseTo(q[index]!, 12),
    );
  });

  it('tells another cell from a relaxed one', () => {
    expect(sameCell(cell, { ...cell, a: 5.1, gamma: 99 })).toBe(true);
    expect(sameCell(cell, { ...cell, a: 6, b: 5 })).toBe(false);
    expect(sameCell(cell, { ...cell, beta: 75 })).toBe(false);
  });
});

describe('matching by position', () => {
  it('agrees with trying every atom', () => {
    const unit = fc.double({ min: 0, max: 0.999999, noNaN: true });
    const point = fc.tuple(unit, unit, unit);
    fc.assert(
      fc.property(fc.array(point, { minLength: 1, maxLength: 12 }), point, (points, wanted) => {
        const atoms = points.map((fractional, index) => image(index, 'O', fractional));
        const found = positionFinder(lattice, atoms)(wanted, 'O');
        const distances = points.map((p) => {
          let best = Infinity;
          for (let i = -2; i <= 2; i += 1)
            for (let j = -2; j <= 2; j += 1)
              for (let k = -2; k <= 2; k += 1) {
                const d: Vec3 = [p[0] - wanted[0] + i, p[1] - wanted[1] + j, p[2] - wanted[2] + k];
                best = Math.min(best, Math.hypot(...apply(lattice.toCartesian, d)));
              }
          return best;
        });
        const nearest = Math.min(...distances);
        if (nearest > 0.5) expect(found).toBeNull();
        else expect(found?.distanceAngstrom).toBeCloseTo(nearest, 9);
      }),
    );
  });

  it('takes whole cells along axes that do not repeat only where nothing lies nearer', () => {
    const slab = [true, true, false] as const;
    const find = positionFinder(
      lattice,
      [image(0, 'O', [0.1, 0.2, 1.3]), image(1, 'O', [0.1, 0.2, 0.31])],
      slab,
    );
    expect(find([1.1, 0.2, 1.31], 'O')).toMatchObject({ imageIndex: 0, isCellsAway: false });
    expect(find([0.1, 0.2, 0.3], 'O')).toMatchObject({ imageIndex: 1, isCellsAway: false });
    expect(find([0.1, 0.2, -0.7], 'O')).toMatchObject({ imageIndex: 0, isCellsAway: true });
    expect(find([0.1, 0.2, 0.7], 'O')).toBeNull();
  });

  it('never takes another element', () => {
    expect(positionFinder(lattice, images)([0.1, 0.2, 0.3], 'Si')).toBeNull();
  });
});

describe('attaching a set', () => {
  it('finds atoms across cell faces and turns the tensor', () => {
    const other = latticeFromCell(cell, 'c-z-b-yz');
    const q = frameRotation(other, lattice);
    const position = apply(other.toCartesian, [-0.02, 1.5, 1.01]);
    const log = new ProblemLog();
    const attached = attachTensors(set([entry('O', position, tensor)], other), target, log)!;
    expect(attached.method).toBe('geometry');
    expect(attached.bySite[0]).toEqual([]);
    const expected = multiply(multiply(q, tensor), transpose(q));
    attached.bySite[1]![0]!.tensor.forEach((value, i) => expect(value).toBeCloseTo(expected[i]!, 10));
    expect(attached.rmsDisplacementAngstrom).toBeCloseTo(0, 9);
    expect(log.list()).toEqual([]);
  });

  it('says where atoms were found whole cells away along an axis that does not repeat', () => {
    const position = apply(lattice.toCartesian, [0.1, 0.2, 2.3]);
    const log = new ProblemLog();
    const attach = (periodic: readonly [boolean, boolean, boolean]) =>
      attachTensors(set([entry('Al', position, tensor)]), { ...target, periodic }, log);
    expect(attach([true, true, false])?.bySite[0]).toHaveLength(1);
    expect(log.list()).toMatchObject([
      { code: 'attach-cells-away', severity: 'note', got: '1 of 1 so far away' },
    ]);
    expect(attach([false, false, true])?.bySite[0]).toHaveLength(1);
    expect(log.list()).toHaveLength(1);
  });

  it('leaves out what belongs to no atom, and what comes twice, and says so', () => {
    const log = new ProblemLog();
    const at = apply(lattice.toCartesian, [0.1, 0.2, 0.3]);
    const away = apply(lattice.toCartesian, [0.6, 0.7, 0.8]);
    const attached = attachTensors(
      set([entry('Al', at, tensor), entry('Al', at, tensor), entry('Al', away, tensor)]),
      target,
      log,
    )!;
    expect(attached.bySite.map((list) => list.length)).toEqual([1, 0]);
    expect(log.list().map(({ code }) => code)).toEqual(['attach-twice', 'attach-unmatched']);
  });

  it('refuses tensors of another cell', () => {
    const log = new ProblemLog();
    const other = latticeFromCell({ ...cell, a: 9 });
    expect(attachTensors(set([entry('Al', [0, 0, 0], tensor)], other), target, log)).toBeNull();
    expect(log.list()[0]).toMatchObject({ code: 'attach-other-cell', severity: 'error' });
    expect(log.list()[0]!.allowed).toContain('5.000, 6.000, 7.000 Å');
  });

  it('binds by label with a warning where no positions came, never by an ambiguous label', () => {
    const log = new ProblemLog();
    const twins = [
      image(0, 'O', [0, 0, 0]),
      { ...image(1, 'O', [0.5, 0, 0]), label: 'O1' },
      image(2, 'Al', [0, 0.5, 0]),
    ];
    const attached = attachTensors(
      set([entry('O', null, tensor, 'O1'), entry('Al', null, tensor, 'Al3')], null),
      { lattice, images: twins, siteCount: 3, rows: null },
      log,
    )!;
    expect(attached.bySite.map((list) => list.length)).toEqual([0, 0, 1]);
    expect(log.list().map(({ code }) => code)).toEqual(['attach-by-label', 'attach-unmatched']);
  });

  it('reports how far the atoms have moved', () => {
    const log = new ProblemLog();
    const at = apply(lattice.toCartesian, [0.1, 0.2, 0.3]);
    const attached = attachTensors(set([entry('Al', [at[0] + 0.3, at[1], at[2]], tensor)]), target, log)!;
    expect(attached.rmsDisplacementAngstrom).toBeCloseTo(0.3, 9);
    expect(log.list()[0]).toMatchObject({ code: 'attach-moved', severity: 'note' });
  });

  it('refuses a set of which most atoms lie elsewhere, rather than keep chance matches', () => {
    const log = new ProblemLog();
    const at = (fractional: Vec3) => apply(lattice.toCartesian, fractional);
    const entries = [at([0.1, 0.2, 0.3]), at([0.6, 0.7, 0.8]), at([0.4, 0.9, 0.6])].map((p) =>
      entry('Al', p, tensor),
    );
    expect(attachTensors(set(entries), target, log)).toBeNull();
    expect(log.list()).toMatchObject([{ code: 'attach-refused', severity: 'error' }]);
  });
});
