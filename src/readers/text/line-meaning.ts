import type { EfgUnit } from '#src/tensor/units.ts';
import { efgUnitOf } from '#src/tensor/units.ts';

/** Things of a tensor's shape that are none of ours, by the words they stand under. */
export type DecoyKind =
  | 'susceptibility'
  | 'hyperfine coupling'
  | 'g tensor'
  | 'zero-field splitting'
  | 'spin-spin coupling'
  | 'effective charge'
  | 'stress'
  | 'dielectric tensor'
  | 'reciprocal lattice'
  | 'symmetry operation'
  | 'directions'
  | 'lattice'
  | 'moment of inertia'
  | 'multipole moment'
  | 'force constants'
  | 'displacement parameters'
  | 'frequencies'
  | 'positions'
  | 'forces';

/** Part of a tensor rather than all of it, or one of several forms of it. */
export type RoleWord =
  | { readonly kind: 'total' }
  | { readonly kind: 'contribution'; readonly word: string }
  | { readonly kind: 'raw' }
  | { readonly kind: 'symmetrised' }
  | { readonly kind: 'unfinished'; readonly word: string };

/** What the words of one line say about tensors; all null for most lines. */
export interface LineMeaning {
  readonly quantity: 'shielding' | 'shift' | 'efg' | null;
  /** The words that say so. */
  readonly quantityWords: string | null;
  readonly decoy: DecoyKind | null;
  readonly decoyWords: string | null;
  readonly role: RoleWord | null;
  /** `ppm`, or the unit of a field gradient. */
  readonly unit: 'ppm' | EfgUnit | null;
  readonly unitWords: string | null;
  /** Six places (0 to 8, row-major) in the order that the line names. */
  readonly order: readonly number[] | null;
  /** `rows` or `columns` where the line says which of them are the first index. */
  readonly transposed: boolean;
}

const decoys: readonly (readonly [DecoyKind, RegExp])[] = [
  ['susceptibility', /suscept\w*|magneti[sz]abilit\w*/i],
  [
    'hyperfine coupling',
    /hyper-?fine|fermi.contact|\ba[- ](?:tensor|matrix)\b|\bhfc\w*|spin[- ]dip\w*|spin dens\w*|dipolar (?:coupling|tensor|hyper)\w*/i,
  ],
  [
    'g tensor',
    /(?:^|[^\p{L}])(?:delta[- ]?|δ)?g[- ](?:tensor|matri|shift|factor)\w*|\bg_?tot\b|electronic zeeman/iu,
  ],
  ['zero-field splitting', /zero[- ]?field|\bzfs\b|\bd[- ]tensor\b/i],
  [
    'spin-spin coupling',
    /spin[-‐ ]spin|\bj[- ]?(?:coupling|tensor|matrix|couplings)\b|\bk[- ]?(?:coupling|tensor)\b|indirect coupl\w*|nuclear spin coupl\w*|\bj_?iso\b|scalar coupl\w*/i,
  ],
  ['effective charge', /born|effective charge\w*|dynamical charge\w*|\bbec\b|polar tensor|\bapt\b|\bz\*/i],
  ['stress', /stress\w*|virial|pressure|\bkbar\b|\bgpa\b|strain|elastic\w*|stiffness|compliance|piezo\w*/i],
  [
    'dielectric tensor',
    /dielectric|permittivit\w*|polari[sz]abilit\w*|raman|hyperpol\w*|refractive|optical/i,
  ],
  ['reciprocal lattice', /reciprocal|\bb\(\s*\d\s*\)\s*=/i],
  [
    'symmetry operation',
    /symmetry op\w*|rotation(?:al)? matri\w*|rotations?\b(?! of the tensor)|\bs_(?:frac|cart)\b|sym\.? ?op\w*|isym\b|point[- ]group op\w*|transformation matrix|cryst\. +s\b/i,
  ],
  [
    'directions',
    /eigenvec\w*|direction cosines?|euler|principal (?:axis|axes|direction\w*)|orientations? of|main directions?/i,
  ],
  [
    'lattice',
    /lattice|unit[- ]cell|basis[- ]vec\w*|cell vec\w*|(?:crystal|primitive|translation|cell) (?:axes|vec\w*)|supercell|\bmetric\b/i,
  ],
  ['moment of inertia', /inertia|rotational const\w*/i],
  [
    'multipole moment',
    /dipole moment|(?<!nuclear )(?<!nuclear electric )(?<!electric )quadrupole moment|octopole|multipole|second moment/i,
  ],
  ['force constants', /hessian|force const\w*|dynamical matri\w*|normal modes?/i],
  [
    'displacement parameters',
    /thermal param\w*|displacement param\w*|\badps?\b|\bu_?ij\b|anisotropic displ\w*/i,
  ],
  ['forces', /\bforces?\b|velocit\w*|momentum|momenta/i],
  ['frequencies', /[([/,]\s*[kMG]?Hz\b|\bin [kMG]?Hz\b/],
  ['positions', /coordinates?|positions?\b/i],
];

const shielding =
  /shield\w*|(?:^|[^\p{L}])sigma(?![\p{L}-])|σ|\babsolute (?:chemical )?shift\w*|\bscreening tensor\w*/iu;
const shift =
  /chem(?:ical)?\.?[ _-]?shifts?|(?:^|[^\p{L}])shifts? (?:tensor|matri)\w*|\bcs[at]?[- _]?(?:tensor|matri)\w*|(?:^|[^\p{L}])(?:delta|δ)(?=[_ -]?(?:iso|ij|x|y|z|1|2|3|tensor|\/|\())|\bshift\w*\b.*\bppm\b|nmr tensor/iu;
const gradient =
  /(?:electric[ -])?field[- ]gradients?|(?:^|[^\p{L}])efgs?(?![\p{L}])|(?:^|[^\p{L}])v_?(?:zz|xx|ij)|\bquadrupol\w* coupling\w*|\bcq\b|\bc_q\b|gradient tensor|gradient at (?:the )?nucle\w*|(?:nuclear|electric) quadrupole moment|quadrupolar param\w*/iu;

const unitPatterns: readonly (readonly [RegExp, string])[] = [
  [/10\s*(?:\*\*|\^)?\s*\{?\+?21\}?\s*[*·x× ]*V\s*\/?\s*m\s*(?:\*\*|\^)?\s*\{?-?2\}?/i, '1e21V/m2'],
  [/1\.?0*E\+?21\s*\*?\s*V\s*\/?\s*m/i, '1e21V/m2'],
  [/10(?:²¹)\s*[·*]?\s*V\s*\/?\s*m(?:²|⁻²|\^?-?2)/i, '1e21V/m2'],
  [/V\s*\/?\s*m\s*(?:\*\*|\^)?\s*2\s*[*x×·( ]*\s*10\s*(?:\*\*|\^)?\s*21/i, '1e21V/m2'],
  [/\bZV\s*\/?\s*m/i, '1e21V/m2'],
  [/V\s*\/\s*\(?(?:A|Å|Ang(?:strom|str)?s?)\.?\s*(?:\*\*|\^)?\s*(?:2|²)/i, 'V/A2'],
  [/V\s*[*·.]?\s*(?:A|Å|Ang(?:strom|str)?s?)\s*(?:\*\*|\^)?\s*\(?(?:-2|⁻²)/i, 'V/A2'],
  [/V\s*\/\s*m\s*(?:\*\*|\^)?\s*(?:2|²)|V\s*[*·.]?\s*m\s*(?:\*\*|\^)?\s*\(?(?:-2|⁻²)/i, 'V/m2'],
  [
    /\ba\.\s?u\.?(?![a-z])|\batomic units?\b|\(au\)|\[au\]|\bau\b|(?:E_?h|hartrees?|Ha)\s*\/?\s*\(?\s*(?:e\s*\*?\s*)?(?:a_?0|bohr)|\ba\.u\.?\*\*-?3|\be\s*\/\s*(?:a_?0|bohr)\s*(?:\*\*|\^)?\s*(?:3|³)|\be\s*a_?0\s*(?:\*\*|\^)?-3/i,
    'au',
  ],
];

const contribution =
  /\b(?:dia(?:magnetic)?|para(?:magnetic)?(?:_\w+)?|core|valence|bare|frozen[- ]core|macroscopic|gauge|orbital term|spin[- ]orbit|so|local|on[- ]?site|ionic|ions?\b(?=[- ]contrib)|electron(?:s|ic)?\b(?=.{0,24}(?:contrib|part|term))|nucle(?:i|ar|us)\b(?=.{0,16}(?:contrib|part|term))|smooth|augment\w*|one[- ]cent\w*|reconstruct\w*|lattice sum|point[- ]charge|hartree\b(?=.{0,16}(?:contrib|part|term))|exchange\b(?=.{0,16}(?:contrib|part|term))|correlation correction|relaxation|first[- ]order|second[- ]order|plane[- ]wave part|sphere|interstitial|perturbed|unperturbed|fc|sd|dso|pso|contributions?|term|correction)\b/i;
const total = /\b(?:total|sum|tot|full|final|overall|complete)\b/i;
const raw =
  /\b(?:un-?symmetri[sz]ed|non-?symmetri[sz]ed|not symmetri[sz]ed|raw|before symmetri\w*|without symmetri\w*|asymmetric tensor|as computed)\b/i;
const symmetrised =
  /\b(?:symmetri[sz]ed|symmetric part|after symmetri\w*|symm?\. tensor|symmetric tensor)\b/i;
const unfinished = /\b(?:preliminary|iteration|cycle|step|not converged|unconverged|intermediate)\b/i;

const anything =
  /shield|sigma|σ|shift|δ|delta|efg|grad|v_?zz|v_?xx|v_?ij|cq|c_q|tensor|matri|ppm|a\.\s?u|\bau\b|atomic unit|v\s*[/*·]?\s*\(?(?:m|å|a)|10\s*(?:\*\*|\^)|e\+?21|suscept|hyper|fermi|hfc|born|charge|apt|stress|virial|pressure|kbar|gpa|strain|elast|stiff|compl|piezo|dielec|permit|polar|raman|refrac|optic|recip|b\(|symm?|rotat|isym|transform|eigenvec|direc|euler|axes|axis|lattice|cell|vec|metric|inertia|moment|pole|hess|force|veloc|normal mode|therm|displac|u_?ij|coord|posit|spin|coupl|zero|zfs|dia|para|core|valence|bare|macro|gauge|local|site|ionic|electron|nucle|smooth|augm|recon|term|contrib|total|sum|final|full|raw|prelim|iter|cycle|step|interm|converg|term|corr|xx|bohr|hartree|zeeman|\bg\b|g-|main|so\b|magnet|Hz\b/i;

const nothing: LineMeaning = {
  quantity: null,
  quantityWords: null,
  decoy: null,
  decoyWords: null,
  role: null,
  unit: null,
  unitWords: null,
  order: null,
  transposed: false,
};

function firstMatch(pattern: RegExp, text: string): string | null {
  const found = pattern.exec(text)?.[0].trim();
  return found === undefined || found === '' ? null : found.replace(/^[^\p{L}\d*^]+/u, '').slice(0, 60);
}

function unitIn(text: string): { unit: 'ppm' | EfgUnit; words: string } | null {
  for (const [pattern, name] of unitPatterns) {
    const words = firstMatch(pattern, text);
    const unit = words === null ? null : efgUnitOf(name);
    // A power of ten that is none of the known ones: better no unit than one that is off by it.
    const isScaled =
      unit === 'V/m2' &&
      /(?:10\s*(?:\*\*|\^)?\s*\{?[+-]?\d+\}?|10[⁺⁻⁰¹²³⁴-⁹]+|\d[eE][+-]?\d+)[\s*·x×]*V/u.test(text);
    if (unit !== null && words !== null && !isScaled) return { unit, words };
  }
  return /\bppm\b|p\.p\.m/i.test(text) ? { unit: 'ppm', words: 'ppm' } : null;
}

function roleIn(text: string, inField: boolean): RoleWord | null {
  if (/\banti-?symm?etric\b|\bskew-?symmetric\b/i.test(text) && !/\+|symmetric and|full|total/i.test(text))
    return { kind: 'contribution', word: 'antisymmetric' };
  if (raw.test(text)) return { kind: 'raw' };
  if (symmetrised.test(text)) return { kind: 'symmetrised' };
  if (total.test(text) && !/total[- ](?:energ|charge|force|number|cpu|time|spin)/i.test(text))
    return { kind: 'total' };
  const word = firstMatch(contribution, text);
  const isAlone = /^[^\p{L}]*\p{L}+(?:[^\p{L}]+\p{L}+)?[^\p{L}]*$/u.test(text);
  if (
    word !== null &&
    (isAlone || inField || /contrib|part|term|tensor|sigma|shield|efg|grad|matri/i.test(text))
  ) {
    return { kind: 'contribution', word };
  }
  const open = firstMatch(unfinished, text);
  return open === null ? null : { kind: 'unfinished', word: open };
}

const sixOrder =
  /(?:^|[^\p{L}])((?:(?:[\p{L}]{1,6}_?)?[xyz]{2}[\s,;/|]+){5}(?:[\p{L}]{1,6}_?)?[xyz]{2})(?![\p{L}])/iu;
const numberOrder = /(?:^|[^\d.])((?:[123]{2}[\s,;/|]+){5}[123]{2})(?![\d.])/;

function orderIn(text: string): readonly number[] | null {
  const axes = sixOrder.exec(text)?.[1];
  const digits = axes === undefined ? numberOrder.exec(text)?.[1] : undefined;
  const words = (axes ?? digits)?.trim().split(/[\s,;/|]+/) ?? [];
  if (words.length !== 6) return null;
  const from = axes === undefined ? '123' : 'xyz';
  const places = words.map((word) => {
    const pair = word.slice(-2).toLowerCase();
    return from.indexOf(pair[0] ?? '') * 3 + from.indexOf(pair[1] ?? '');
  });
  return new Set(places).size === 6 ? places : null;
}

/** Names of fields as words: `electric_field_gradient`, `shieldingTensors`. */
function plainWords(text: string): string {
  const plain = text.includes('$') ? text.replace(/[${}\\]/g, '') : text;
  return plain.replace(/(\p{Ll})(?=\p{Lu}\p{Ll}{2})/gu, '$1 ').replace(/_(?=\p{Ll}{3})/gu, ' ');
}

/** What the words of a line say about the numbers under it. Words alone: no number is looked at. */
export function lineMeaning(text: string): LineMeaning {
  const key = text.length > 120 ? text : text.replace(/\d+\.\d+(?:[eEdD][+-]?\d+)?/g, '0.0');
  const known = remembered.get(key);
  if (known) return known;
  const found = readMeaning(text);
  if (remembered.size >= mostRemembered) remembered.clear();
  remembered.set(key, found);
  return found;
}

/** Lines of a log repeat themselves but for their numbers. */
const remembered = new Map<string, LineMeaning>();
const mostRemembered = 5000;

function readMeaning(text: string): LineMeaning {
  if (!anything.test(text)) return nothing;
  const plain = plainWords(text.length > 400 ? text.slice(0, 400) : text);
  const efgWords = firstMatch(gradient, plain);
  const shieldingWords = firstMatch(shielding, plain);
  const shiftWords = firstMatch(shift, plain);
  const quantity = efgWords ? 'efg' : shieldingWords ? 'shielding' : shiftWords ? 'shift' : null;
  const decoy = decoys.find(([, pattern]) => pattern.test(plain));
  const unit = unitIn(plain);
  return {
    quantity,
    quantityWords: efgWords ?? shieldingWords ?? shiftWords,
    decoy: decoy?.[0] ?? null,
    decoyWords: decoy ? firstMatch(decoy[1], plain) : null,
    role: roleIn(plain, quantity !== null),
    unit: unit?.unit ?? null,
    unitWords: unit?.words ?? null,
    order: orderIn(plain),
    transposed: /columns?\b.{0,24}\b(?:are|is|=|:).{0,24}\b(?:field|b0|first index)|transpos/i.test(plain),
  };
}

/** True where a line says anything at all. */
export function isTelling(meaning: LineMeaning): boolean {
  return (
    meaning.quantity !== null ||
    meaning.decoy !== null ||
    meaning.role !== null ||
    meaning.unit !== null ||
    meaning.order !== null
  );
}
