import { bohrAngstrom } from '#src/base/constants.ts';

/** A length unit as a text names it; `scale` means multiples of a length given elsewhere, such as a lattice parameter. */
export type LengthUnit = 'angstrom' | 'bohr' | 'nm' | 'scale';

/** Å in one of the unit; a scaled length needs its own factor. */
export const angstromIn: Readonly<Record<Exclude<LengthUnit, 'scale'>, number>> = {
  angstrom: 1,
  bohr: bohrAngstrom,
  nm: 10,
};

const scaled = /\balat\b|units? of (?:the )?(?:lattice (?:parameter|constant)|scal)|\blatt(?:ice)? units?\b/i;
const angstrom = /\bang(?:str(?:om|oem|öm)?s?)?\b|[ÅÅ]|[[(,]\s*A\s*[\]),]|\d\s+A\s*$|=\s*A\s*$/;
const angstromAnyCase = /\bang(?:str(?:om|oem|öm)?s?)?\b|ångstr/i;
const bohr = /\bbohrs?\b|\ba\.\s?u\.?(?!\w)|[[(]\s*au\s*[\])]|\batomic units?\b|\ba0\b|\bau\b/i;
const nanometre = /\bnm\b|\bnanomet/i;
/** Units in which a length is only a part: eV/Å, 1/Å, Å^-1, Å³, V/Å². */
const compound =
  /(?:\w|\d)\s*\/\s*\(?\s*(?:[AÅ]\b|ang\w*|bohrs?|a\.?u\.?|nm)(?:\s*\^?\s*-?\d)?|(?:[AÅ]|ang\w*|bohrs?|a\.u\.|nm)\)?\s*(?:\^\s*-?\s*[123]|\*\*\s*-?[123]|-1|³|⁻¹)/gi;

/** The length units a text names, in the order in which they stand; parts of other units do not count. */
export function lengthUnits(text: string): LengthUnit[] {
  const plain = text.replace(compound, ' ');
  const found: [number, LengthUnit][] = [];
  const note = (pattern: RegExp, unit: LengthUnit): void => {
    const at = plain.search(pattern);
    if (at >= 0) found.push([at, unit]);
  };
  note(scaled, 'scale');
  if (angstromAnyCase.test(plain)) note(angstromAnyCase, 'angstrom');
  else note(angstrom, 'angstrom');
  note(bohr, 'bohr');
  note(nanometre, 'nm');
  return found.sort(([p], [q]) => p - q).map(([, unit]) => unit);
}
