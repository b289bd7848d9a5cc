import { describe, expect, it } from 'vitest';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { anglesToCell, atomAxes, foldedAngleDegrees, withReadableSign } from '#src/store/axes.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

describe('angles of axes', () => {
  it('are folded into 0 to 90 degrees, since an axis has no sense', () => {
    expect(foldedAngleDegrees([1, 0, 0], [-1, 0, 0])).toBe(0);
    expect(foldedAngleDegrees([1, 0, 0], [-1, 1, 0])).toBeCloseTo(45, 12);
    expect(foldedAngleDegrees([0, 0, 1], [3, 0, 0])).toBe(90);
  });

  it('to the axes of a hexagonal cell: a direction along a lies 60 degrees from b', () => {
    const lattice = latticeFromCell({ a: 4.9, b: 4.9, c: 5.4, alpha: 90, beta: 90, gamma: 120 });
    const [a, b, c] = anglesToCell([lattice.rows[0], lattice.rows[1], lattice.rows[2]], lattice)!;
    expect(a).toBeCloseTo(0, 5);
    expect(b).toBeCloseTo(60, 9);
    expect(c).toBeCloseTo(90, 9);
  });

  it('are null for an undefined axis and without a cell', () => {
    expect(anglesToCell(null, fixtureDossier.lattice)).toBeNull();
    expect(anglesToCell([1, 0, 0], null)).toBeNull();
  });
});

describe('axes of equivalent atoms', () => {
  it('turn with the operation and keep their readable sign', () => {
    const site = fixtureDossier.sites[0]!;
    const [first, second, third] = atomAxes(site, site.equivalents[1]!, 'shielding')!;
    expect(first).toEqual([0.6, 0.8, 0].map((x) => expect.closeTo(x, 12)));
    expect(second).toEqual([0.8, -0.6, 0].map((x) => expect.closeTo(x, 12)));
    expect(third).toEqual([0, 0, 1].map((x) => expect.closeTo(x, 12)));
  });

  it('stay undefined where they are, and are null without a tensor', () => {
    const [aluminium, oxygen, hydrogen] = fixtureDossier.sites;
    expect(atomAxes(oxygen!, oxygen!.equivalents[0]!, 'shielding')).toEqual([null, null, null]);
    expect(atomAxes(hydrogen!, hydrogen!.equivalents[0]!, 'shielding')).toBeNull();
    expect(atomAxes(aluminium!, aluminium!.equivalents[0]!, 'efg')).not.toBeNull();
  });

  it('have a positive largest component', () => {
    expect(withReadableSign([0.1, -0.9, 0.2])).toEqual([-0.1, 0.9, -0.2]);
    expect(withReadableSign([0.1, 0.9, -0.2])).toEqual([0.1, 0.9, -0.2]);
  });
});
