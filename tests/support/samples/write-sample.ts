import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, rowsOf, transpose } from '#src/base/matrix3.ts';
import type { InventedTensors } from './invent-tensors.ts';
import { printedDecimals } from './invent-tensors.ts';
import { cartesianOf, imageOf, nearestDistance, plainOperation, turned } from './plain-crystal.ts';
import type { PublishedStructure } from './published-structures.ts';

/** Decimals of the twin: two more for positions and tensors, since turning leaves no round numbers. */
const twinDecimals = { position: 6, shielding: 4, efg: 6 } as const;

function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

/** The sample as CIF: published structure, invented tensors in our own loop, in the Cartesian frame of `rows`. */
export function cifSample(
  structure: PublishedStructure,
  tensors: readonly InventedTensors[],
  rows: Mat3,
  frame: string,
): string {
  const [a, b, c, alpha, beta, gamma] = structure.cell;
  const columns = transpose(rows);
  const { number, hermannMauguin, hall } = structure.spaceGroup;
  return [
    `# ${structure.title}. ${structure.compound}`,
    '#',
    '# The structure is published:',
    ...structure.sources.map((source) => `#   ${source}`),
    '# What was changed:',
    ...structure.changes.map((change) => `#   ${change}`),
    '#',
    '# THE TENSORS ARE INVENTED. They obey the symmetry of their sites and have plausible sizes; nobody has',
    '# calculated or measured them. Do not compare them with anything.',
    `# Their Cartesian frame: ${frame}.`,
    '',
    `data_${structure.id}`,
    `_chemical_name_common '${structure.compound.split(',')[0]}'`,
    `_chemical_formula_sum '${structure.formulaSum}'`,
    `_cell_formula_units_Z ${structure.formulaUnits}`,
    `_cell_length_a ${a}`,
    `_cell_length_b ${b}`,
    `_cell_length_c ${c}`,
    `_cell_angle_alpha ${alpha}`,
    `_cell_angle_beta ${beta}`,
    `_cell_angle_gamma ${gamma}`,
    `_space_group_IT_number ${number}`,
    `_space_group_name_H-M_alt '${hermannMauguin}'`,
    `_space_group_name_Hall '${hall}'`,
    'loop_',
    '_space_group_symop_operation_xyz',
    ...structure.operations.map((operation) => `'${operation}'`),
    '',
    '# Columns of this matrix are a, b, c in the Cartesian frame of the tensors, in angstrom.',
    ...[11, 12, 13, 21, 22, 23, 31, 32, 33].map(
      (index, i) => `_atom_sites_Cartn_tran_matrix_${index} ${fixed(columns[i]!, 8)}`,
    ),
    ...[1, 2, 3].map((index) => `_atom_sites_Cartn_tran_vector_${index} 0`),
    'loop_',
    '_atom_site_label',
    '_atom_site_type_symbol',
    '_atom_site_fract_x',
    '_atom_site_fract_y',
    '_atom_site_fract_z',
    ...structure.sites.map((site) => site.join(' ')),
    '',
    'loop_',
    '_ellipsite_tensor_site_label',
    '_ellipsite_tensor_quantity',
    '_ellipsite_tensor_unit',
    ...[11, 12, 13, 21, 22, 23, 31, 32, 33].map((index) => `_ellipsite_tensor_${index}`),
    ...tensorRows(structure, tensors),
    '',
  ].join('\n');
}

function tensorRows(structure: PublishedStructure, tensors: readonly InventedTensors[]): string[] {
  const row = (label: string, head: string, tensor: Mat3, decimals: number): string =>
    `${label} ${head} ${tensor.map((value) => fixed(value, decimals)).join(' ')}`;
  const shieldings = structure.sites.map(([label], i) =>
    row(label, 'shielding ppm', tensors[i]!.shieldingPpm, printedDecimals.shielding),
  );
  const gradients = structure.sites.flatMap(([label], i) => {
    const gradient = tensors[i]!.gradientAu;
    return gradient === null ? [] : [row(label, 'efg a.u.', gradient, printedDecimals.efg)];
  });
  return [...shieldings, ...gradients];
}

/** The same crystal as extended XYZ: every atom of the cell, tensors turned by R T Rᵀ, in another Cartesian frame. */
export function xyzTwin(
  structure: PublishedStructure,
  tensors: readonly InventedTensors[],
  rows: Mat3,
  twinRows: Mat3,
): string {
  const betweenFrames = multiply(transpose(twinRows), inverse(transpose(rows)));
  const atoms = structure.sites.flatMap(([label, element, x, y, z], i) =>
    cellImages(structure, [Number(x), Number(y), Number(z)], rows).map(({ position, rotation }) => {
      const turn = multiply(betweenFrames, rotation);
      const { shieldingPpm, gradientAu } = tensors[i]!;
      return [
        element,
        label,
        ...apply(transpose(twinRows), position).map((value) => fixed(value, twinDecimals.position)),
        ...turned(turn, shieldingPpm).map((value) => fixed(value, twinDecimals.shielding)),
        ...(gradientAu === null
          ? Array<string>(9).fill('nan')
          : turned(turn, gradientAu).map((value) => fixed(value, twinDecimals.efg))),
      ].join(' ');
    }),
  );
  const lattice = rowsOf(twinRows)
    .flat()
    .map((value) => fixed(value, 8))
    .join(' ');
  const columns = 'species:S:1:site:S:1:pos:R:3:shielding:R:9:efg:R:9';
  const comment = [
    `Lattice="${lattice}"`,
    'pbc="T T T"',
    `Properties=${columns}`,
    'shielding_unit=ppm efg_unit=au',
    `name="${structure.id}, tensors invented"`,
    `note="structure: ${structure.sources.join(' ')} All tensors are invented."`,
  ].join(' ');
  return `${atoms.length}\n${comment}\n${atoms.join('\n')}\n`;
}

/** Images of a position in the cell, with the Cartesian matrix of the first operation that makes each. */
function cellImages(
  structure: PublishedStructure,
  site: Vec3,
  rows: Mat3,
): { position: Vec3; rotation: Mat3 }[] {
  const images: { position: Vec3; rotation: Mat3 }[] = [];
  for (const operation of structure.operations.map(plainOperation)) {
    const image = imageOf(operation, site);
    if (images.some(({ position }) => nearestDistance(position, image, rows) < 0.1)) continue;
    const position = image.map((value) => {
      const inside = value - Math.floor(value);
      return inside > 1 - 1e-9 ? 0 : inside;
    }) as unknown as Vec3;
    images.push({ position, rotation: cartesianOf(operation, rows) });
  }
  return images;
}
