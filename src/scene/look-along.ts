import type { Vec3 } from '#src/base/matrix3.ts';
import { add, cross, dot, length, normalize, scale } from '#src/base/vector3.ts';
import type { CellAxis } from './scene.ts';

/** A direction that points towards the viewer, Cartesian, and its name: `[1 1 0]`, `−c`, `a*`, `V33 of Al1`. */
export interface LookAlong {
  /** Unit length. */
  readonly towards: Vec3;
  readonly words: string;
}

/** A principal axis one can look along, by the name it is typed with; `axis` null where it is undefined. */
export interface NamedAxis {
  /** Such as `σ33`. */
  readonly name: string;
  /** Such as `Al1`. */
  readonly of: string;
  /** Other spellings of the name, such as `33`. */
  readonly others?: readonly string[];
  readonly axis: Vec3 | null;
}

/** Why a text names no direction: what was found, what is allowed. */
export interface LookFault {
  readonly fault: string;
}

const forms = 'Allowed: a, b, c, a*, b*, c*, x, y, z, [1 1 0], (1 0 −1), each with a minus before it';

/**
 * Reads a direction to look along. `a` is the cell vector, `a*` the reciprocal one, `[u v w]` the lattice direction ua + vb + wc,
 * `(h k l)` the normal ha* + kb* + lc* of the planes (with four indices (h k i l) where h + k + i = 0), `x` a Cartesian axis;
 * a minus before any of them turns it round. Indices are numbers parted by blanks or commas, or run together where each is
 * one digit: `[110]`, `[1-10]`. A principal axis is typed by site and component where `namedAxes` has it: `Al1 Vzz`.
 */
export function parseLookAlong(
  text: string,
  axes: readonly CellAxis[],
  namedAxes: readonly NamedAxis[] = [],
): LookAlong | LookFault {
  const plain = text.trim().replaceAll(/[−–]/g, '-');
  if (plain === '') return { fault: `No direction is given. ${forms}.` };
  const isBack = plain.startsWith('-');
  const bare = isBack ? plain.slice(1).trim() : plain;
  const found = directionOf(bare, axes, namedAxes);
  if ('fault' in found || !isBack) return found;
  return { towards: scale(-1, found.towards), words: `−${found.words}` };
}

function directionOf(
  text: string,
  axes: readonly CellAxis[],
  namedAxes: readonly NamedAxis[],
): LookAlong | LookFault {
  const letter = /^([abc])(\*?)$/i.exec(text);
  if (letter) return alongLetter(letter[1]!.toLowerCase(), letter[2] === '*', axes);
  const cartesian = 'xyz'.indexOf(text.toLowerCase());
  if (cartesian >= 0 && text.length === 1) return { towards: unit(cartesian), words: text.toLowerCase() };
  const bracket = /^(?:\[([^[\]]*)\]|\(([^()]*)\))$/.exec(text);
  if (bracket) {
    const isNormal = bracket[2] !== undefined;
    return alongIndices(bracket[1] ?? bracket[2] ?? '', isNormal, axes);
  }
  const named = axisNamed(text, namedAxes);
  if (named?.axis) return { towards: normalize(named.axis), words: `${named.name} of ${named.of}` };
  if (named) return { fault: `${named.name} of ${named.of} has no axis: its principal value is degenerate.` };
  const [first] = namedAxes;
  const own = first ? `; principal axes: ${namesOf(namedAxes, first)}` : '';
  return { fault: `“${text}” is no direction. ${forms}${own}.` };
}

/** Names of the first site's axes, and the other ways to write one of them. */
function namesOf(namedAxes: readonly NamedAxis[], { of }: NamedAxis): string {
  const names = namedAxes.filter((one) => one.of === of).map(({ name }) => name);
  const last = names.at(-1)!;
  return `${of} ${names.join(', ')}, also written ${last}(${of}), ${last} of ${of}, p33 of ${of}, ${of} 33`;
}

/** Ways to type a component: its name, `s33` and `sigma33` for σ33, `d33` and `delta33` for δ33, `p33` for any 33. */
function spellingsOf({ name, others = [] }: NamedAxis): string[] {
  const greek = { σ: ['s', 'sigma'], δ: ['d', 'delta'] }[name[0] ?? ''] ?? [];
  const all = [name, ...others, ...greek.map((letter) => letter + name.slice(1))];
  return [...all, ...others.filter((other) => /^\d\d$/.test(other)).map((digits) => `p${digits}`)];
}

/**
 * The axis a text names: `σ11`, `Al1 V_zz`, `V33 of Al1`, `p33(Al1)`, `Al1 33`, in any case. A site without a component, or a component
 * without a site, is that of the first axis that fits: the selected atom, the quantity that is shown.
 */
function axisNamed(text: string, namedAxes: readonly NamedAxis[]): NamedAxis | null {
  const typed = plainName(text);
  return (
    namedAxes.find((named) =>
      spellingsOf(named).some((one) => {
        const component = plainName(one);
        const site = plainName(named.of);
        return [component, `${site}${component}`, `${component}of${site}`, `${component}${site}`].includes(
          typed,
        );
      }),
    ) ?? null
  );
}

function alongLetter(
  letter: string,
  isReciprocal: boolean,
  axes: readonly CellAxis[],
): LookAlong | LookFault {
  const at = 'abc'.indexOf(letter);
  return combined(unit(at), isReciprocal, axes, letter + (isReciprocal ? '*' : ''));
}

function alongIndices(list: string, isNormal: boolean, axes: readonly CellAxis[]): LookAlong | LookFault {
  const read = indicesOf(list, isNormal);
  return 'fault' in read ? read : combined(read.indices, isNormal, axes, read.words);
}

/** A line of the lattice: along ua + vb + wc, or along the normal of planes. */
export interface LatticeLine {
  readonly kind: 'direction' | 'normal';
  readonly indices: Vec3;
}

/** Reads `a`, `a*`, `[u v w]` or `(h k l)` as a line without sense; a minus before it says nothing. */
export function parseLatticeLine(text: string): LatticeLine | LookFault {
  const plain = text.trim().replaceAll(/[−–]/g, '-').replace(/^-\s*/, '');
  const letter = /^([abc])(\*?)$/i.exec(plain);
  if (letter) {
    const indices = unit('abc'.indexOf(letter[1]!.toLowerCase()));
    return { kind: letter[2] ? 'normal' : 'direction', indices };
  }
  const bracket = /^(?:\[([^[\]]*)\]|\(([^()]*)\))$/.exec(plain);
  if (!bracket)
    return {
      fault: `“${text.trim()}” is no line of the lattice. Allowed: a, b, c, a*, b*, c*, [1 1 0], (1 0 −1).`,
    };
  const isNormal = bracket[2] !== undefined;
  const read = indicesOf(bracket[1] ?? bracket[2] ?? '', isNormal);
  return 'fault' in read ? read : { kind: isNormal ? 'normal' : 'direction', indices: read.indices };
}

function indicesOf(
  list: string,
  isNormal: boolean,
): { readonly indices: Vec3; readonly words: string } | LookFault {
  const indices = readIndices(list);
  const kind = isNormal ? 'plane (h k l)' : 'direction [u v w]';
  if (!indices)
    return { fault: `“${list.trim()}” holds something that is no number; a ${kind} has three numbers.` };
  const isFour = isNormal && indices.length === 4;
  if (indices.length !== 3 && !isFour)
    return { fault: `A ${kind} has three numbers; “${list.trim()}” has ${indices.length}.` };
  if (isFour && Math.abs(indices[0]! + indices[1]! + indices[2]!) > 1e-9)
    return { fault: `In (h k i l) the index i is −(h + k); (${shown(indices)}) has another.` };
  const words = isNormal ? `(${shown(indices)})` : `[${shown(indices)}]`;
  if (indices.every((index) => index === 0))
    return { fault: `${words} is no direction: one index must differ from 0.` };
  return { indices: [indices[0]!, indices[1]!, indices.at(-1)!], words };
}

function combined(
  indices: Vec3,
  isReciprocal: boolean,
  axes: readonly CellAxis[],
  words: string,
): LookAlong | LookFault {
  const [a, b, c] = axes.map(({ vector }) => vector);
  if (!a || !b || !c) return { fault: `There is no cell, so ${words} has no meaning. Allowed: x, y, z.` };
  const basis = isReciprocal ? reciprocalDirections(a, b, c) : ([a, b, c] as const);
  const sum = add(add(scale(indices[0], basis[0]), scale(indices[1], basis[1])), scale(indices[2], basis[2]));
  return length(sum) === 0 ? { fault: `${words} is no direction.` } : { towards: normalize(sum), words };
}

/** a*, b*, c* times the (positive) volume, so that the largest cells lose no digits. */
function reciprocalDirections(a: Vec3, b: Vec3, c: Vec3): readonly [Vec3, Vec3, Vec3] {
  const hand = dot(a, cross(b, c)) < 0 ? -1 : 1;
  return [scale(hand, cross(b, c)), scale(hand, cross(c, a)), scale(hand, cross(a, b))];
}

/** Numbers parted by blanks or commas, or single digits run together, each with its own minus; null where none are. */
function readIndices(list: string): number[] | null {
  const plain = list.trim();
  const runTogether = /^(?:-?\d){3,4}$/.test(plain) ? plain.match(/-?\d/g) : null;
  const parts = runTogether ?? plain.split(/[\s,;]+/).filter((part) => part !== '');
  const numbers = parts.map((part) => (/^[+-]?(\d+\.?\d*|\.\d+)$/.test(part) ? Number(part) : NaN));
  return numbers.length > 0 && numbers.every(Number.isFinite) ? numbers : null;
}

function shown(indices: readonly number[]): string {
  return indices.map((index) => String(index || 0).replace('-', '−')).join(' ');
}

function unit(at: number): Vec3 {
  return [Number(at === 0), Number(at === 1), Number(at === 2)];
}

/** Names compare without case, blanks, underscores, brackets and digits set low. */
function plainName(name: string): string {
  const digits = name.replaceAll(/[₀-₉]/g, (digit) => String(digit.charCodeAt(0) - 0x2080));
  return digits.toLowerCase().replaceAll(/[\s_()]/g, '');
}
