import type { Vec3 } from '#src/base/matrix3.ts';
import { settingsNamed } from './space-group-names.ts';
import type { SymbolText } from './symbol-text.ts';

/** A symbol without what its end says about setting or origin. */
export interface WithoutTail {
  readonly text: SymbolText;
  /** Origin in fractions of the cell that the end stands for; null where it names none we know. */
  readonly origin: Vec3 | null;
  /** What the end means, in words; null where it was understood as a plain choice of setting. */
  readonly reason: string | null;
  /** True where the end was left aside and may mean an origin that is not known. */
  readonly doubtful: boolean;
}

/** Where macromolecular files put the origin with a letter a at the end, by symbol. Common practice, value from memory. */
const lettered: Readonly<Record<string, { readonly origin: Vec3; readonly where: string }>> = {
  P21212: { origin: [0.25, 0.25, 0], where: 'the origin at (1/4, 1/4, 0), where the screw axes meet' },
};

const old = /^([A-Z])1-$/;
const triclinic = /^([A-Z]-?1)11$/;
const tail = /^(.+?)([12]|-?[abc][123]?)$/;

/**
 * Takes a setting, a unique axis, an origin choice or a letter off the end of a compact symbol that has no meaning as it stands: `P21/cb1`,
 * `P2/mc`, `Pmmn2`, `P21212a`; also `P1-` for P -1 and `P111` for P 1. Null where nothing known is left.
 */
export function withoutTail(text: SymbolText): WithoutTail | null {
  const plain = { origin: null, reason: null, doubtful: false };
  const { compact } = text;
  const other = compact.replace(old, '$1-1').replace(triclinic, '$1');
  if (other !== compact) return { ...plain, text: { ...text, compact: other } };
  const [, base = '', end = ''] = tail.exec(compact) ?? [];
  const [setting] = settingsNamed(base);
  if (!setting) return null;
  const rest = { ...text, compact: base };
  if (/^[12]$/.test(end)) {
    const offered = settingsNamed(base).some((one) => one.setting.startsWith(end));
    return offered ? { ...plain, text: { ...rest, origin: Number(end) as 1 | 2 } } : null;
  }
  if (setting.number >= 3 && setting.number <= 15) {
    const axis = /^[abc]$/.test(end) ? { uniqueAxis: end as 'a' | 'b' | 'c' } : { code: end };
    return { ...plain, text: { ...rest, ...axis } };
  }
  if (end.length > 1) return null;
  const known = end === 'a' ? lettered[base] : undefined;
  const reason = known
    ? `the letter a at its end stands for ${known.where}`
    : `the letter ${end} at its end, which may stand for another origin, was left aside`;
  return { text: rest, origin: known?.origin ?? null, reason, doubtful: !known };
}
