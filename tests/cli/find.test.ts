import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';

/** Invented numbers. */
const log = [
  'Cell vectors (Angstrom)',
  '5.0 0.0 0.0',
  '0.0 6.0 0.0',
  '0.0 0.0 7.0',
  '',
  'Cartesian positions of the atoms (Angstrom)',
  '1 Si 0.0 0.0 0.0',
  '2 O 1.6 0.0 0.0',
  '',
  'Shielding tensors, ppm',
  ...[
    ['1 Si', 300],
    ['2 O', 150],
  ].flatMap(([name, size]) =>
    ['diamagnetic part', 'total'].flatMap((part, k) => [
      `atom ${name} ${part}`,
      `${Number(size) + 100 * k}.5 1.0 2.0`,
      `1.5 ${Number(size) + 101 * k}.5 3.0`,
      `2.5 3.5 ${Number(size) + 102 * k}.5`,
    ]),
  ),
  'Stress tensor (GPa)',
  '1.0 0.1 0.2',
  '0.1 1.5 0.3',
  '0.2 0.3 1.7',
].join('\n');

interface Group {
  quantity: string;
  unit: string;
  proposed: boolean;
  entries: { label: string; element: string; index: number; tensor: (number | null)[][] }[];
}

describe('ellipsite find', () => {
  it('prints the contract’s JSON, contributions apart from what is proposed', async () => {
    const { status, out } = await runCommand(['find', 'log.txt', '--json'], { 'log.txt': log });
    const document = JSON.parse(out) as {
      schema: string;
      structures: unknown[];
      groups: Group[];
      others: Group[];
    };
    expect(status).toBe(0);
    expect(document.schema).toBe('ellipsite/find/1');
    expect(document.structures).toHaveLength(1);
    expect(document.groups).toHaveLength(1);
    expect(document.groups[0]).toMatchObject({
      quantity: 'shielding',
      unit: 'ppm',
      shape: 'block',
      proposed: true,
    });
    expect(
      document.groups[0]!.entries.map(({ element, index, tensor }) => [element, index, tensor[0]![0]]),
    ).toEqual([
      ['Si', 1, 400.5],
      ['O', 2, 250.5],
    ]);
    expect(document.others.map(({ quantity, entries }) => [quantity, entries.length])).toEqual([
      ['shielding', 2],
      ['unknown', 1],
    ]);
  });

  it('writes components that were not computed as null and says so', async () => {
    const text = 'Shielding (ppm)\nAtom 1 O\n1.5 N/A 2.0\n3.0 250.0 4.0\n5.0 6.0 260.0\n';
    const { out } = await runCommand(['find', '-', '--json'], { '-': text });
    const { groups, problems } = JSON.parse(out) as {
      groups: Group[];
      problems: { code: string; line: number }[];
    };
    expect(groups[0]!.entries[0]!.tensor[0]).toEqual([1.5, null, 2]);
    expect(problems).toEqual([expect.objectContaining({ code: 'find-incomplete', line: 3 })]);
  });

  it('prints a readable table otherwise', async () => {
    const { status, out } = await runCommand(['find', 'log.txt'], { 'log.txt': log });
    expect(status).toBe(0);
    expect(out).toContain('line 10');
    expect(out).toMatch(/Si1\s+\d+\s+400\.5/);
  });

  it('gives the sites command the tensors of a log with its own structure', async () => {
    const { status, out } = await runCommand(['sites', 'log.txt', '--json', '--symmetry', 'none'], {
      'log.txt': log,
    });
    expect(status).toBe(0);
    const { sites } = JSON.parse(out) as {
      sites: { label: string; shielding: { tensor: number[][] } | null }[];
    };
    expect(sites.map(({ shielding }) => shielding?.tensor[0]![0])).toEqual([400.5, 250.5]);
  });

  it('finds nothing in prose, and says so', async () => {
    const { out } = await runCommand(['find', 'a.txt', '--json'], {
      'a.txt': 'Nothing 1 2 3\nof this is a tensor.\n',
    });
    expect(JSON.parse(out)).toMatchObject({ groups: [], others: [], problems: [{ code: 'find-none' }] });
  });
});
