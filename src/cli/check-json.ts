import type { Attachment } from '#src/attach/attachment.ts';
import { nested } from '#src/base/matrix3.ts';
import type { Problem } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import {
  hydrogenLengths,
  implausibleValues,
  shortContacts,
  tensorSanity,
} from '#src/dossier/sound-calculation.ts';
import { fitFormula } from '#src/readers/cif/interpret/composition.ts';
import { parseFormula } from '#src/readers/cif/interpret/formula.ts';

/** Everything the check is about: the dossier, how each tensor set was bound, and the crystal it was bound to. */
export interface Checked {
  readonly dossier: CrystalDossier;
  readonly attachments: readonly Attachment[];
  readonly crystal: Crystal;
}

function mappingJson({ mapping, rotation }: Attachment) {
  const { maxDisplacement: largest } = mapping;
  return {
    method: mapping.method,
    atoms: mapping.atoms,
    matched: mapping.matched,
    unmatched: mapping.unmatched,
    doubtful: mapping.doubtful,
    rmsDisplacement: mapping.rmsDisplacementAngstrom,
    maxDisplacement: largest && { label: largest.label, value: largest.value },
    basis: mapping.basis && nested(mapping.basis),
    originShift: mapping.originShift,
    rotation: nested(rotation),
    strain: mapping.strain,
    handedness: mapping.handedness,
  };
}

function framesJson({ frame, quantity }: Attachment) {
  return (frame?.frames ?? []).map(({ name, rotationDegrees, residual, relative, verdict }) => ({
    name,
    rotationDegrees,
    residual,
    unit: quantity === 'efg' ? 'a.u.' : 'ppm',
    relativeResidual: relative,
    verdict,
    decided:
      verdict === 'best' ? (frame?.decided ?? true) : verdict === 'excluded' || verdict === 'same frame',
  }));
}

function setJson(one: Attachment) {
  return {
    name: one.name,
    file: one.file,
    quantity: one.quantity,
    mapping: mappingJson(one),
    frames: framesJson(one),
    frameInUse: one.frame?.inUse ?? null,
    frameFrom: one.frame?.by ?? null,
    decided: one.frame?.decided ?? true,
  };
}

/** Cell content against formula × Z; `agrees` null where the file states no formula. */
export function compositionCheck({ dossier, crystal }: Checked) {
  const { sum, units } = crystal.formula;
  const formula = sum === null ? null : parseFormula(sum);
  if (!formula) return { cell: dossier.composition, formulaTimesZ: null, agrees: null };
  const content = dossier.composition;
  const agreeing = (fit: ReturnType<typeof fitFormula>): boolean =>
    fit !== null && fit.heavyAgree && (fit.hydrogenAgrees || fit.missingHydrogens === 0);
  // some write the formula of the whole cell beside Z > 1: then the content is the formula once
  const fits = [units, ...(units === null ? [] : [1])].map((z) => ({
    z,
    fit: fitFormula(content, formula, z),
  }));
  const { fit } = fits.find((one) => agreeing(one.fit)) ?? fits[0]!;
  const z = fit?.units ?? units ?? 1;
  const times = Object.fromEntries(Object.entries(formula).map(([element, count]) => [element, count * z]));
  return { cell: dossier.composition, formulaTimesZ: times, agrees: agreeing(fit) };
}

/** Problems that say a calculation did not end or converge. */
export function unfinishedRuns(problems: readonly Problem[]): Problem[] {
  return problems.filter(({ code }) => /unfinished|converge/.test(code));
}

/** The document of `ellipsite check --json`, schema `ellipsite/check/1`; `mapping` and `frames` are those of the first set. */
export function checkJson(checked: Checked | null, problems: readonly Problem[]): object {
  const schema = 'ellipsite/check/1';
  if (!checked) {
    const none = { contacts: [], sanity: [], hydrogens: [], implausible: [], unfinished: [] };
    return {
      schema,
      mapping: null,
      frames: [],
      decided: null,
      composition: null,
      sets: [],
      ...none,
      problems,
    };
  }
  const { dossier, attachments } = checked;
  // tensors of the crystal's own file need no mapping: what came from another is what is asked about
  const main = attachments.find(({ method }) => method !== 'same-file') ?? attachments[0];
  return {
    schema,
    crystal: dossier.name,
    mapping: main ? mappingJson(main) : null,
    frames: main ? framesJson(main) : [],
    decided: main ? attachments.every(({ frame }) => frame?.decided ?? true) : null,
    orientation: dossier.orientation ?? null,
    composition: compositionCheck(checked),
    contacts: shortContacts(dossier).map(({ atoms, distanceAngstrom, areAlternatives }) => ({
      atoms,
      distance: distanceAngstrom,
      alternatives: areAlternatives,
    })),
    sanity: tensorSanity(dossier.sites),
    hydrogens: hydrogenLengths(dossier).map(({ label, partner, lengthAngstrom, normAngstrom }) => ({
      label,
      partner,
      length: lengthAngstrom,
      norm: normAngstrom,
    })),
    implausible: implausibleValues(dossier.sites),
    unfinished: unfinishedRuns(problems).map(({ message, file, line }) => ({ message, file, line })),
    sets: attachments.map(setJson),
    problems,
  };
}
