import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';
import { runCommand } from '#tests/support/command-io.ts';

/** A hexagonal cell with a ∥ x; tensor made up for the test: its largest component along x. */
const rows = '5 0 0 -2.5 4.330127018922193 0 0 0 6';
const head = `Lattice="${rows}" Properties=species:S:1:pos:R:3:shielding:R:9`;
const text = `2\n${head}\nAl 0 0 0 90 0 0 0 20 0 0 0 10\nO 1 1 1 90 0 0 0 20 0 0 0 10\n`;

describe('a frame named by the user', () => {
  it('keeps cell and fractional coordinates and turns what the numbers mean', () => {
    const given = dossierOfText('h.xyz', text, { symmetry: 'file' });
    const named = dossierOfText('h.xyz', text, { symmetry: 'file', frame: 'b-y-a-xy' });
    expect(named.lattice!.cell.gamma).toBeCloseTo(120, 9);
    expect(named.sites[1]!.fractional).toEqual(given.sites[1]!.fractional);
    const length = (v: readonly number[]) => Math.hypot(...v);
    expect(length(named.sites[1]!.cartesian)).toBeCloseTo(length(given.sites[1]!.cartesian), 9);
    expect(named.sites[1]!.cartesian[0]).not.toBeCloseTo(given.sites[1]!.cartesian[0], 2);
    // x is a in the given frame and 30° from a in the named one (b ∥ y): the largest axis turns with the frame.
    const cosine = (dossier: typeof given) => {
      const [a1, a2, a3] = dossier.lattice!.rows;
      const axis = dossier.sites[0]!.shielding!.axes[2]!;
      return Math.abs((a1 * axis[0] + a2 * axis[1] + a3 * axis[2]) / 5);
    };
    expect(cosine(given)).toBeCloseTo(1, 9);
    expect(cosine(named)).toBeCloseTo(Math.cos(Math.PI / 6), 9);
  });

  it('still finds the atoms of tensors from another file', async () => {
    const crystal = `2\nLattice="${rows}"\nAl 0 0 0\nO 1 1 1\n`;
    const files = { 'c.xyz': crystal, 't.xyz': text };
    const { out, status } = await runCommand(
      ['sites', 'c.xyz', 't.xyz', '--json', '--frame', 'b-y-a-xy'],
      files,
    );
    expect(status).toBe(0);
    expect(
      JSON.parse(out).sites.map((site: { shielding: object | null }) => site.shielding !== null),
    ).toEqual([true, true]);
  });

  it('leaves left-handed cells alone and says so', () => {
    const left = text.replace('0 0 6"', '0 0 -6"');
    const dossier = dossierOfText('l.xyz', left, { symmetry: 'file', frame: 'b-y-a-xy' });
    expect(dossier.problems.some(({ code }) => code === 'frame-left-handed')).toBe(true);
    expect(dossier.lattice!.rows[8]).toBe(-6);
  });
});
