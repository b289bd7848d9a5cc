import { describe, expect, it } from 'vitest';
import { axesNamedIn, axesOfAtom } from '#src/scene/named-axes.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

const sites = fixtureDossier.sites;
const aluminium = sites[0]!;

describe('principal axes by name', () => {
  it('are turned along with the atom: the half turn about z takes (0.6, 0.8, 0) to minus itself, the same axis', () => {
    const [first] = axesOfAtom(aluminium, '0:1', null);
    expect(first).toMatchObject({ name: 'σ11', of: 'Al1', others: ['11'] });
    first!.axis!.forEach((x, k) => expect(x).toBeCloseTo([0.6, 0.8, 0][k]!, 12));
  });

  it('are turned by the rotation of their atom: a quarter turn about z takes (0.6, 0.8, 0) to (−0.8, 0.6, 0)', () => {
    const [atom] = aluminium.equivalents;
    const turned = {
      ...aluminium,
      equivalents: [{ ...atom!, rotation: [0, -1, 0, 1, 0, 0, 0, 0, 1] as const }],
    };
    const { axis } = axesOfAtom(turned, null, null)[0]!;
    // an axis has no sign: one of its two directions
    expect(Math.abs(axis![0] * -0.8 + axis![1] * 0.6)).toBeCloseTo(1, 12);
  });

  it('begin with the quantity that is drawn, whoever asks', () => {
    const names = axesOfAtom(aluminium, null, 'efg').map(({ name }) => name);
    expect(names.slice(0, 3)).toEqual(['Vxx', 'Vyy', 'Vzz']);
    expect(new Set(names).size).toBe(names.length);
    expect(axesNamedIn('al1 33', sites, 'efg')).toEqual(axesOfAtom(aluminium, null, 'efg'));
  });
});
