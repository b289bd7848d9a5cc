import type { MeasuredCopies, ShorterImage } from '#src/scene/measure-copies.ts';
import type { MeasuredCrystal, MeasuredValue } from '#src/scene/measure.ts';
import { placeOf } from '#src/scene/measure.ts';
import type { MeasuredAtom, MeasuredAxis, Measurement, MeasurementKind } from '#src/scene/measurement.ts';
import { convention } from '#src/store/conventions.ts';
import { counted, formatNumber, formatOperation } from '#src/table/number-format.ts';

/** Kinds that are measured by picking atoms, and how many they take. */
export const atomsNeeded = { distance: 2, angle: 3, dihedral: 4 } as const;

export type PickedKind = keyof typeof atomsNeeded;

export const kindWords: Readonly<Record<MeasurementKind, string>> = {
  distance: 'distance',
  angle: 'angle',
  dihedral: 'dihedral',
  axes: 'angle between axes',
};

/** `1.609 Å`, `109.5°`, `undefined`. */
export function valueText({ value, unit, digits }: MeasuredValue): string {
  if (value === null) return 'undefined';
  return unit === '°' ? `${formatNumber(value, digits)}°` : `${formatNumber(value, digits)} ${unit}`;
}

/** What was measured: `Si1–O1 (−y, x−y, z+1/3)`, `O1–Si1–O2`, `V33 of Al1 to c`. */
export function measuredName(measurement: Measurement, crystal: MeasuredCrystal): string {
  const labels = measurement.atoms.map((atom) => atomName(atom, crystal));
  if (measurement.kind !== 'axes') return labels.join('–');
  return (measurement.axes ?? []).map((axis) => axisName(axis, labels)).join(' to ');
}

/** `O1`, the site's own atom; else with its operation and the cell its copy stands in: `O1 (−y, x−y, z) in cell [1 0 0]`. */
function atomName(atom: MeasuredAtom, crystal: MeasuredCrystal): string {
  const place = placeOf(atom, crystal);
  if (!place) return '?';
  const { operation } = place.atom;
  const isOwn = operation.replaceAll(' ', '') === 'x,y,z';
  const cell = atom.cellShift.some((n) => n !== 0) ? ` in cell [${indices(atom.cellShift)}]` : '';
  return `${place.site.label}${isOwn ? '' : ` (${formatOperation(operation)})`}${cell}`;
}

export function axisName(axis: MeasuredAxis, labels: readonly string[]): string {
  switch (axis.of) {
    case 'tensor':
      return `${axisSymbol(axis.quantity, axis.axis)} of ${labels[axis.atom] ?? '?'}`;
    case 'line':
      return `${labels[axis.from] ?? '?'}–${labels[axis.to] ?? '?'}`;
    case 'direction':
      return `[${indices(axis.uvw)}]`;
    case 'normal':
      return `normal of (${indices(axis.hkl)})`;
  }
}

const componentKeys = {
  shielding: ['s11', 's22', 's33'],
  shift: ['d11', 'd22', 'd33'],
  efg: ['Vxx', 'Vyy', 'Vzz'],
} as const;

/** Symbol of a principal component, in plain text: `σ11`, `Vzz`. */
export function axisSymbol(quantity: keyof typeof componentKeys, axis: 0 | 1 | 2): string {
  const key = componentKeys[quantity][axis];
  return convention(quantity, key)?.symbol.replace('_', '') ?? key;
}

function indices(values: readonly number[]): string {
  return values.map((value) => formatNumber(value, Number.isInteger(value) ? 0 : 3)).join(' ');
}

/** How often it comes in the cell, and whether the chosen pair is the nearest: `6 alike in the cell`. */
export function copiesText(copies: MeasuredCopies | null, nearer: ShorterImage | null): string {
  const parts: string[] = [];
  if (copies) {
    const mirrored = copies.mirrored > 0 ? `, ${copies.mirrored} of them with the other sign` : '';
    parts.push(copies.inCell === 1 ? 'once in the cell' : `${copies.inCell} alike in the cell${mirrored}`);
  }
  if (nearer) {
    const cell = nearer.second.cellShift.map((n) => formatNumber(n, 0)).join(' ');
    parts.push(
      `the same atoms are nearer in another cell: ${formatNumber(nearer.distanceAngstrom, 3)} Å, second atom in cell [${cell}]`,
    );
  }
  return parts.join('; ');
}

/** What is still to pick: `angle: pick 2 more atoms, the apex next`. */
export function pickingText(kind: PickedKind, picked: number): string {
  const left = atomsNeeded[kind] - picked;
  const apex = kind === 'angle' && picked === 1 ? ', the apex next' : '';
  return `${kindWords[kind]}: pick ${counted(left, 'more atom')}${apex}`;
}
