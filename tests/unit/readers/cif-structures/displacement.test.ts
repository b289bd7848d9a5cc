import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  cellText,
  codes,
  inversion,
  only,
  plainColumns,
} from '#tests/support/cif-structure.ts';

const eightSquarePi = 8 * Math.PI ** 2;
const hexagonal = cellText(4, 4, 6, 90, 90, 120);
const one = "_symmetry_equiv_pos_as_xyz 'x,y,z'\n";

function anisotropic(prefix: string, order: readonly string[], ...rows: readonly string[]): string {
  const names = order.map((index) => `_atom_site_aniso_${prefix}_${index}`);
  return `loop_\n_atom_site_aniso_label\n${names.join('\n')}\n${rows.join('\n')}\n`;
}

const order = ['11', '22', '33', '12', '13', '23'];

describe('isotropic displacement', () => {
  it('is U as given or B / 8π²', () => {
    const atoms = (name: string): string =>
      atomText(`${plainColumns} ${name}`, 'C1 .1 .2 .3 0.790(5)', 'C2 .1 .2 .4 ?');
    const u = only(block(box, inversion, atoms('U_iso_or_equiv'))).sites;
    expect(u.map(({ displacement }) => displacement)).toEqual([
      { uAniso: null, uEquivalent: 0.79, given: 'U' },
      null,
    ]);
    const b = only(block(box, inversion, atoms('B_iso_or_equiv'))).sites;
    expect(b[0]!.displacement!.uEquivalent).toBeCloseTo(0.79 / eightSquarePi, 12);
    expect(b[0]!.displacement!.given).toBe('B');
  });

  it('called U but marked as B by its type is a B', () => {
    const atoms = atomText(
      `${plainColumns} thermal_displace_type U_iso_or_equiv`,
      'C1 .1 .2 .3 Biso 0.79',
      'C2 .1 .2 .4 Uiso 0.01',
    );
    const reading = block(box, inversion, atoms);
    const values = only(reading).sites.map(({ displacement }) => displacement!.uEquivalent!);
    expect(values[0]).toBeCloseTo(0.79 / eightSquarePi, 12);
    expect(values[1]).toBe(0.01);
    expect(codes(reading)).toEqual(['cif-b-called-u']);
  });
});

describe('anisotropic displacement', () => {
  const atom = atomText(plainColumns, 'C1 .1 .2 .3');

  it('keeps U in the order 11 22 33 12 13 23 whatever the order of the file', () => {
    const text = anisotropic('U', ['11', '22', '33', '23', '13', '12'], 'C1 .01 .02 .03 .004 .005 .006');
    const [site] = only(block(box, inversion, atom, text)).sites;
    expect(site!.displacement!.uAniso).toEqual([0.01, 0.02, 0.03, 0.006, 0.005, 0.004]);
    expect(site!.displacement!.uEquivalent).toBeCloseTo(0.02, 12);
  });

  it('on hexagonal axes has the equivalent (4/9)(U11 + U22 − U12) + U33/3, which is U for a sphere', () => {
    // A sphere of mean square u is U11 = U22 = U33 = u, U12 = u/2 on these axes: U12 = u cos γ*.
    const sphere = anisotropic('U', order, 'C1 .02 .02 .02 .01 0 0');
    expect(only(block(hexagonal, one, atom, sphere)).sites[0]!.displacement!.uEquivalent).toBeCloseTo(
      0.02,
      12,
    );
    const other = anisotropic('U', order, 'C1 .03 .02 .05 .004 .001 .002');
    const expected = (4 / 9) * (0.03 + 0.02 - 0.004) + 0.05 / 3;
    expect(only(block(hexagonal, one, atom, other)).sites[0]!.displacement!.uEquivalent).toBeCloseTo(
      expected,
      12,
    );
  });

  it('converts B by 8π² and β by 2π² a*ᵢ a*ⱼ', () => {
    const u = [0.03, 0.02, 0.05, 0.004, 0.001, 0.002];
    const b = u.map((x) => x * eightSquarePi);
    const star = [1 / (4 * Math.sin(Math.PI / 3)), 1 / (4 * Math.sin(Math.PI / 3)), 1 / 6];
    const pairs = [
      [0, 0],
      [1, 1],
      [2, 2],
      [0, 1],
      [0, 2],
      [1, 2],
    ] as const;
    const beta = u.map((x, i) => 2 * Math.PI ** 2 * star[pairs[i]![0]]! * star[pairs[i]![1]]! * x);
    for (const [prefix, values, kind] of [
      ['B', b, 'B'],
      ['beta', beta, 'beta'],
    ] as const) {
      const [site] = only(
        block(hexagonal, one, atom, anisotropic(prefix, order, `C1 ${values.join(' ')}`)),
      ).sites;
      site!.displacement!.uAniso!.forEach((x, i) => expect(x).toBeCloseTo(u[i]!, 12));
      expect(site!.displacement!.given).toBe(kind);
    }
  });

  it('belongs to repeated labels in order, and to no row twice', () => {
    const atoms = atomText(plainColumns, 'C1 .1 .2 .3', 'C1 .1 .2 .4', 'C2 .1 .2 .45');
    const text = anisotropic('U', order, 'C1 .01 .01 .01 0 0 0', 'C1 .02 .02 .02 0 0 0');
    const sites = only(block(box, inversion, atoms, text)).sites;
    expect(sites.map(({ displacement }) => displacement?.uAniso?.[0] ?? null)).toEqual([0.01, 0.02, null]);
  });

  it('may stand beside the coordinates, and under dotted names', () => {
    const beside = atomText(
      `${plainColumns} ${order.map((i) => `aniso_U_${i}`).join(' ')}`,
      'C1 .1 .2 .3 .01 .02 .03 0 0 0',
    );
    expect(only(block(box, inversion, beside)).sites[0]!.displacement!.uAniso).toEqual([
      0.01, 0.02, 0.03, 0, 0, 0,
    ]);
    const dotted = anisotropic('U', order, 'C1 .01 .02 .03 0 0 0').replaceAll('_aniso_', '_aniso.');
    expect(only(block(box, inversion, atom, dotted)).sites[0]!.displacement!.uAniso).toEqual([
      0.01, 0.02, 0.03, 0, 0, 0,
    ]);
  });

  it('with an unknown component is not there', () => {
    const [site] = only(block(box, inversion, atom, anisotropic('U', order, 'C1 .01 ? .03 0 0 0'))).sites;
    expect(site!.displacement).toBeNull();
  });
});
