import { countOf } from '#src/base/count-of.ts';
import { beginDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { parseCommonArguments } from '../arguments.ts';
import type { CommandIo } from '../io.ts';
import { chooseCase, loadCase } from '../load-case.ts';
import type { ChosenCase } from '../load-case.ts';
import { problemLine, statusOf } from '../print-problems.ts';
import { sitesJson } from '../sites-json.ts';
import { fixed, textTable } from '../text-table.ts';

interface Column {
  readonly header: string;
  readonly cell: (site: SiteDossier) => string;
  /** A column stands only where some site has a value. */
  readonly present: (site: SiteDossier) => boolean;
}

const always = () => true;

/** Columns of the readable table, units in the header. */
const columns: readonly Column[] = [
  { header: 'site', cell: (site) => site.label, present: always },
  { header: 'isotope', cell: (site) => site.isotope ?? site.element, present: always },
  { header: 'mult.', cell: (site) => String(site.multiplicity), present: always },
  { header: 'Wyckoff', cell: (site) => site.wyckoff ?? '–', present: always },
  { header: 'site sym.', cell: (site) => site.siteSymmetry ?? '–', present: always },
  { header: 'occ.', cell: (site) => fixed(site.occupancy, 3), present: (site) => site.occupancy !== 1 },
  ...([0, 1, 2] as const).map((axis): Column => ({
    header: ['x', 'y', 'z'][axis] ?? '',
    cell: (site) => fixed(site.fractional?.[axis] ?? site.cartesian[axis], 4),
    present: always,
  })),
  { header: 'orient.', cell: (site) => String(site.distinctOrientations), present: always },
  ...shieldingColumns(),
  ...shiftColumns(),
  ...efgColumns(),
];

function shieldingColumns(): Column[] {
  const present = (site: SiteDossier) => site.shielding !== null;
  return [
    { header: 'σiso/ppm', cell: (site) => fixed(site.shielding?.isotropic ?? null, 2), present },
    { header: 'Ωσ/ppm', cell: (site) => fixed(site.shielding?.span ?? null, 2), present },
    { header: 'κ', cell: (site) => fixed(site.shielding?.skew ?? null, 2), present },
  ];
}

function shiftColumns(): Column[] {
  const present = (site: SiteDossier) => site.shift !== null;
  return [
    { header: 'δiso/ppm', cell: (site) => fixed(site.shift?.isotropic ?? null, 2), present },
    { header: 'Ωδ/ppm', cell: (site) => fixed(site.shift?.span ?? null, 2), present },
  ];
}

/** C_Q with its nuclide where that is not the row's, and without a sign where the sign is noise. */
function coupling({ efg, isotope }: SiteDossier): string {
  if (!efg || efg.couplingMHz === null) return fixed(null, 3);
  const size = efg.signDetermined ? fixed(efg.couplingMHz, 3) : `±${fixed(Math.abs(efg.couplingMHz), 3)}`;
  return efg.isotope === isotope ? size : `${size} (${efg.isotope ?? ''})`;
}

function efgColumns(): Column[] {
  const present = (site: SiteDossier) => site.efg !== null;
  return [
    { header: 'Vzz/a.u.', cell: (site) => fixed(site.efg?.components[2] ?? null, 4), present },
    { header: 'CQ/MHz', cell: (site) => coupling(site), present },
    { header: 'η', cell: (site) => fixed(site.efg?.asymmetry ?? null, 2), present },
  ];
}

function operationsSentence({ symmetry }: CrystalDossier): string {
  const { length } = symmetry.operations;
  const count = countOf(length, 'operation');
  return symmetry.reason.startsWith(count) ? symmetry.reason : `${count}, ${symmetry.reason}`;
}

function heading(dossier: CrystalDossier): string {
  const { lattice } = dossier;
  const cell = lattice
    ? [lattice.cell.a, lattice.cell.b, lattice.cell.c].map((x) => fixed(x, 4)).join(', ') +
      ' Å; ' +
      [lattice.cell.alpha, lattice.cell.beta, lattice.cell.gamma].map((x) => fixed(x, 3)).join(', ') +
      `°; V ${fixed(lattice.volume, 2)} Å³`
    : 'no cell; positions in Å';
  const composition = Object.entries(dossier.composition)
    .map(([element, count]) => `${element}${Number(count.toFixed(3))}`)
    .join(' ');
  return [
    dossier.name,
    cell,
    `${dossier.spaceGroup}; ${operationsSentence(dossier)}`,
    `${countOf(dossier.atomsInCell, 'atom')} in the ${lattice ? 'cell' : 'molecule'}: ${composition}`,
  ].join('\n');
}

function readable(dossier: CrystalDossier): string {
  const shown = columns.filter(({ present }) => dossier.sites.some(present));
  const rows = dossier.sites.map((site) => shown.map(({ cell }) => cell(site)));
  const header = shown.map((column) => column.header);
  return `${heading(dossier)}\n\n${textTable(header, rows)}\n`;
}

/** Every site is written as it is made, so that a large crystal is never held whole. */
function writeJson({ input, problems }: ChosenCase, io: CommandIo): number {
  const begun = input && beginDossier(input);
  for (const piece of sitesJson(begun, problems)) io.writeOut(piece);
  return statusOf(begun?.problems() ?? problems);
}

/** `ellipsite sites FILE… [options]`: one dossier a site, as a readable table or as JSON. */
export async function sitesCommand(argv: readonly string[], io: CommandIo): Promise<number> {
  const common = parseCommonArguments(argv);
  if (common.json) return writeJson(await chooseCase(common, io), io);
  const { dossier, problems } = await loadCase(common, io);
  problems.forEach((found) => io.writeError(`${problemLine(found)}\n`));
  if (dossier) io.writeOut(readable(dossier));
  return statusOf(problems);
}
