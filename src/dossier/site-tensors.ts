import type { Attachment, SiteTensor } from '#src/attach/attachment.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import type { Place } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import { nuclide, usualIsotope } from '#src/data/nuclides.ts';
import type { EfgDescription } from '#src/tensor/efg.ts';
import { describeEfg } from '#src/tensor/efg.ts';
import { printedNoise, tensorNoise } from '#src/tensor/noise.ts';
import { equivalentSpread, meanTensor, projectOnSiteSymmetry, turnBack } from '#src/tensor/projection.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { describeReferencedShift, describeShift } from '#src/tensor/shift.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import { efgToAtomicUnits, efgUnitOf } from '#src/tensor/units.ts';
import type { DossierSettings, EfgDossier, OtherTensors, ShieldingDossier, ShiftDossier } from './dossier.ts';

/** What the tensors of one site are described from. */
export interface SiteTensorInput {
  readonly site: Site;
  /** Cartesian matrices of the operations that leave the site in place, identity included. */
  readonly stabiliser: readonly Mat3[];
  /** Atoms of the site in the cell. */
  readonly multiplicity: number;
  readonly attachments: readonly Attachment[];
  readonly settings: DossierSettings;
}

/** The part of a site's dossier that its tensors fill. */
export interface SiteTensorDossiers {
  readonly isotope: string | null;
  readonly shielding: ShieldingDossier | null;
  readonly shift: ShiftDossier | null;
  readonly efg: EfgDossier | null;
}

/** One tensor of a site with what its copies say about it. */
interface Evidence {
  readonly tensor: Mat3;
  readonly projected: Mat3;
  readonly symmetryResidual: number;
  readonly equivalentSpread: number | null;
  readonly anisotropicNorm: number;
  readonly noise: number;
  readonly unitGiven: string;
  readonly source: Place;
}

/** Anisotropy a nearly isotropic tensor is credited with when its residual is judged: ppm, ppm, a.u. */
const leastScale: Readonly<Record<Quantity, number>> = { shielding: 5, shift: 5, efg: 0.05 };

/** Factor from the printed unit to the canonical one, for judging printed digits. */
function unitFactor(quantity: Quantity, unitGiven: string): number {
  const unit = quantity === 'efg' ? efgUnitOf(unitGiven) : null;
  return unit ? efgToAtomicUnits(1, unit) : 1;
}

function weigh(
  quantity: Quantity,
  found: readonly SiteTensor[],
  unitGiven: string,
  stabiliser: readonly Mat3[],
): Evidence | null {
  const [first] = found;
  if (!first) return null;
  const back = found.map(({ tensor, rotation }) => turnBack(rotation, tensor));
  const tensor = back[0]!;
  const own = projectOnSiteSymmetry(tensor, stabiliser);
  const { residual, anisotropicNorm } = own;
  const { projected } = back.length === 1 ? own : projectOnSiteSymmetry(meanTensor(back), stabiliser);
  const printed = printedNoise(first.entry.tensor, quantity, unitFactor(quantity, unitGiven));
  return {
    tensor,
    projected,
    symmetryResidual: residual,
    equivalentSpread: spreadOf(found),
    anisotropicNorm,
    noise: tensorNoise(printed, residual, Math.max(anisotropicNorm, leastScale[quantity])),
    unitGiven,
    source: first.entry.place,
  };
}

function spreadOf(found: readonly SiteTensor[]): number | null {
  if (found.length < 2) return null;
  return equivalentSpread(
    found.map(({ tensor }) => tensor),
    found.map(({ rotation }) => rotation),
  );
}

/** The user's isotope, else the usual one for what the site has. */
function isotopeOf(element: string, settings: DossierSettings, use: Quantity): string | null {
  return settings.isotopes[element] ?? usualIsotope(element, use)?.symbol ?? null;
}

/* Dossiers are written field by field: spreading a description costs as much as making it, and a large crystal has many. */

/** Reasons with that of the spread, which needs the tensors of two equivalent atoms. */
function withSpreadReason(
  reasons: Readonly<Record<string, string>>,
  { equivalentSpread: spread }: Evidence,
  multiplicity: number,
): Readonly<Record<string, string>> {
  if (spread !== null) return reasons;
  return { ...reasons, equivalentSpread: multiplicity === 1 ? loneAtomReason : loneTensorReason };
}

const loneAtomReason = 'the atom has no equivalents';
const loneTensorReason = 'only one of the equivalent atoms has a tensor';

function shieldingDossier(evidence: Evidence, multiplicity: number): ShieldingDossier {
  const described = describeShielding(evidence.tensor, evidence.noise);
  return {
    tensor: described.tensor,
    symmetric: described.symmetric,
    isotropic: described.isotropic,
    components: described.components,
    axes: described.axes,
    span: described.span,
    skew: described.skew,
    reducedAnisotropy: described.reducedAnisotropy,
    anisotropy: described.anisotropy,
    asymmetry: described.asymmetry,
    antisymmetricNorm: described.antisymmetricNorm,
    axialVector: described.axialVector,
    noise: described.noise,
    undefinedBecause: withSpreadReason(described.undefinedBecause, evidence, multiplicity),
    projected: evidence.projected,
    symmetryResidual: evidence.symmetryResidual,
    equivalentSpread: evidence.equivalentSpread,
    source: evidence.source,
  };
}

/** A trace larger than the field gradient itself: no rounding does that, and the tensor is something else. */
function noGradientReason({ trace, components }: EfgDescription): string | null {
  const largest = Math.max(Math.abs(components[2]), leastScale.efg);
  if (Math.abs(trace) <= impossibleTraceShare * largest) return null;
  return `the trace of ${Number(trace.toPrecision(4))} a.u. is larger than Vzz, so that the tensor is no field gradient`;
}

function efgDossier(
  evidence: Evidence,
  isotope: string | null,
  { settings, multiplicity }: SiteTensorInput,
): EfgDossier {
  const own = isotope === null ? null : (settings.quadrupoleMomentsBarn[isotope] ?? null);
  const described = describeEfg(
    evidence.tensor,
    isotope === null ? null : nuclide(isotope),
    own,
    evidence.noise,
  );
  const because =
    described.signDetermined || described.components[2] === 0
      ? described.undefinedBecause
      : { ...described.undefinedBecause, sign: signReason };
  const reason = noGradientReason(described);
  const undefinedBecause = reason
    ? { ...because, ...Object.fromEntries(withheldFields.map((field) => [field, reason])) }
    : because;
  const told = <T>(value: T): T | null => (reason ? null : value);
  return {
    tensor: described.tensor,
    symmetric: described.symmetric,
    components: described.components,
    axes: described.axes,
    asymmetry: told(described.asymmetry),
    isotope: described.isotope,
    quadrupoleMomentBarn: described.quadrupoleMomentBarn,
    quadrupoleMomentSource: described.quadrupoleMomentSource,
    couplingMHz: told(described.couplingMHz),
    productMHz: told(described.productMHz),
    quadrupoleFrequencyMHz: told(described.quadrupoleFrequencyMHz),
    quadrupoleAngularFrequency: told(described.quadrupoleAngularFrequency),
    trace: described.trace,
    signDetermined: described.signDetermined,
    antisymmetricNorm: described.antisymmetricNorm,
    noise: described.noise,
    undefinedBecause: withSpreadReason(undefinedBecause, evidence, multiplicity),
    projected: evidence.projected,
    symmetryResidual: evidence.symmetryResidual,
    equivalentSpread: evidence.equivalentSpread,
    unitGiven: evidence.unitGiven,
    source: evidence.source,
  };
}

const signReason =
  'Vyy and Vzz tie in size within the noise (η ≈ 1), so the sign of Vzz and of C_Q is an accident';

/** A trace above this share of the largest component is no rounding: the tensor may be something else. */
const largestTraceShare = 0.1;
/** Beyond this share of it asymmetry and couplings are withheld. */
const impossibleTraceShare = 1;
const withheldFields = [
  'asymmetry',
  'couplingMHz',
  'productMHz',
  'quadrupoleFrequencyMHz',
  'quadrupoleAngularFrequency',
] as const;

function reportTrace(site: Site, efg: EfgDossier, log: ProblemLog): void {
  const largest = Math.max(Math.abs(efg.components[2]), leastScale.efg);
  if (Math.abs(efg.trace) <= largestTraceShare * largest) return;
  const fate = noGradientReason(efg)
    ? 'it is larger than Vzz, so that asymmetry and couplings are withheld'
    : 'it was taken off';
  log.add(
    'warning',
    'efg-trace',
    `The EFG of ${site.label} has a trace, which no field gradient has; ${fate}.`,
    {
      place: efg.source,
      got: `tr V = ${Number(efg.trace.toPrecision(4))} a.u. beside Vzz = ${Number(efg.components[2].toPrecision(4))} a.u.`,
      allowed: `tr V = 0; a warning above ${largestTraceShare * 100} % of Vzz, no couplings above ${impossibleTraceShare * 100} %`,
      hint: 'The column may hold a shielding or stand in another unit.',
    },
  );
}

/** `couplingMHz` → `coupling`, `reducedAnisotropy` → `reduced anisotropy`: field names as words, without their unit. */
function inWords(field: string): string {
  const bare = field.replace(/(MHz|Barn)$/, '');
  return bare.replaceAll(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
}

/** One note a reason, naming every field it holds for; a spread that needs a second tensor is no news at every site. */
function reportUndefined(
  site: Site,
  name: string,
  reasons: Readonly<Record<string, string>>,
  log: ProblemLog,
): void {
  const all = Object.entries(reasons).filter(([field]) => field !== 'equivalentSpread');
  if (all.length === 0) return;
  const fieldsOf = new Map<string, string[]>();
  for (const [field, reason] of all) {
    fieldsOf.set(reason, [...(fieldsOf.get(reason) ?? []), field]);
  }
  for (const [reason, fields] of fieldsOf) {
    log.add(
      'note',
      'undefined-value',
      `${site.label} ${name}, ${fields.map(inWords).join(', ')}: undefined, for ${reason}.`,
      {
        place: site.place,
      },
    );
  }
}

/** A residual or spread above this share of the anisotropy speaks of a wrong frame or a wrong atom rather than of noise. */
const doubtfulShare = 0.1;

function reportResidual(site: Site, quantity: Quantity, evidence: Evidence, log: ProblemLog): void {
  const scale = Math.max(evidence.anisotropicNorm, leastScale[quantity]);
  const spread = evidence.equivalentSpread ?? 0;
  const name = quantity === 'efg' ? 'EFG' : quantity;
  const share = (size: number): string => `${Math.round((100 * size) / scale)} % of its anisotropy`;
  const findings: string[] = [];
  if (evidence.symmetryResidual > doubtfulShare * scale) {
    findings.push(
      `The ${name} tensor of ${site.label} breaks the site's symmetry by ${share(evidence.symmetryResidual)}.`,
    );
  }
  if (spread > doubtfulShare * scale) {
    findings.push(
      `The ${name} tensors of the atoms equivalent to ${site.label}, turned onto it, differ from their mean by ${share(spread)}.`,
    );
  }
  if (findings.length === 0) return;
  log.add('warning', 'symmetry-broken', findings.join(' '), {
    place: evidence.source,
    allowed: `at most ${doubtfulShare * 100} %`,
    hint: 'A wrong Cartesian frame or a wrong atom does this; a calculation alone rarely does.',
  });
}

/**
 * Shielding, shift and EFG of one site from all its tensors: the site's own (or the first copy turned back), its
 * projection, the spread among the equivalents, every convention. A shift tensor of the file goes before one made from the
 * shielding by the reference of the isotope. Raises `undefined-value` for every null but
 * a missing spread, `symmetry-broken`, `efg-trace`.
 */
export function siteTensors(input: SiteTensorInput, log: ProblemLog): SiteTensorDossiers {
  const { site, stabiliser, attachments, settings } = input;
  const evidenceOf = (quantity: Quantity): Evidence | null => {
    const attachment = attachments.find((one) => one.quantity === quantity);
    const found = attachment?.bySite[site.index] ?? [];
    const evidence = attachment ? weigh(quantity, found, attachment.unitGiven, stabiliser) : null;
    if (evidence) reportResidual(site, quantity, evidence, log);
    return evidence;
  };
  const ofShielding = evidenceOf('shielding');
  const ofShift = evidenceOf('shift');
  const ofEfg = evidenceOf('efg');
  const use = ofEfg && !ofShielding && !ofShift ? 'efg' : 'shielding';
  const isotope = isotopeOf(site.element, settings, use);
  const shielding = ofShielding && shieldingDossier(ofShielding, input.multiplicity);
  const reference = isotope === null ? undefined : settings.references[isotope];
  const referenced =
    ofShielding && reference
      ? describeReferencedShift(ofShielding.tensor, reference, ofShielding.noise)
      : null;
  const shift = ofShift ? describeShift(ofShift.tensor, undefined, ofShift.noise) : referenced;
  const efg = ofEfg && efgDossier(ofEfg, isotopeOf(site.element, settings, 'efg'), input);
  if (shielding) reportUndefined(site, 'shielding', shielding.undefinedBecause, log);
  if (shift) reportUndefined(site, 'shift', shift.undefinedBecause, log);
  if (efg) {
    reportUndefined(site, 'EFG', efg.undefinedBecause, log);
    reportTrace(site, efg, log);
  }
  return { isotope, shielding, shift, efg };
}

/**
 * The tensors of one site from the second sets, as `siteTensors` makes them; nothing where there is no second set or it holds
 * none for the site. Only warnings are passed on: what is undefined in the main set is undefined in the other one for the same reasons.
 */
export function otherTensors(input: SiteTensorInput, log: ProblemLog): { readonly other?: OtherTensors } {
  if (!input.attachments.some(({ bySite }) => (bySite[input.site.index]?.length ?? 0) > 0)) return {};
  const own = new ProblemLog();
  const { shielding, shift, efg } = siteTensors(input, own);
  for (const found of own.list()) if (found.severity === 'warning') log.push(found);
  return { other: { shielding, shift, efg } };
}
