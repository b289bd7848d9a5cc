import type { Attachment } from '#src/attach/attachment.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { nuclide, usualIsotope } from '#src/data/nuclides.ts';
import type { CrystalDossier, DossierSettings, SiteDossier } from '#src/dossier/dossier.ts';
import { quantityAndUnit, questionsOf, reordered } from '#src/readers/text/choose-groups.ts';
import type { GroupQuestion } from '#src/readers/text/choose-groups.ts';
import type { FoundEntry, FoundGroup, FoundText } from '#src/readers/text/found-text.ts';
import { sixOrders } from '#src/readers/text/six-order.ts';
import { describeEfg } from '#src/tensor/efg.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { efgTensorToAtomicUnits } from '#src/tensor/units.ts';
import type {
  ComponentOrder,
  FoundCandidate,
  FoundEntriesRequest,
  FoundEntryView,
  FoundFileView,
  FoundGroupView,
  FoundMark,
  FoundMarksRequest,
  FoundSummary,
  FoundValue,
} from './found-protocol.ts';

/** A text that was searched. */
export interface SearchedText {
  readonly sourceId: string;
  readonly file: string;
  readonly asFound: FoundText;
  readonly asChosen: FoundText;
}

/** Entries shown with a group and with each candidate. */
const sampleCount = 3;
/** Marks of one request, at most. */
const mostMarks = 2000;

export function foundSummary({ sourceId, file, asChosen: { groups } }: SearchedText): FoundSummary {
  const taken = groups.filter(
    ({ proposed, quantity, unit }) => proposed && quantity !== 'unknown' && unit !== 'unknown',
  );
  return {
    sourceId,
    file,
    groupCount: groups.length,
    tensorCount: taken.reduce((sum, { entries }) => sum + entries.length, 0),
    questionCount: groups.reduce((sum, group) => sum + questionsOf(group).length, 0),
  };
}

/** Answers what the panel and the text view ask about texts that were searched. */
export class FoundDesk {
  readonly #texts: readonly SearchedText[];
  readonly #settings: DossierSettings;
  readonly #sites: SiteFinder;

  constructor(
    texts: readonly SearchedText[],
    dossier: CrystalDossier,
    boundSets: () => readonly Attachment[],
  ) {
    this.#texts = texts;
    this.#settings = dossier.settings;
    this.#sites = siteFinder(dossier.sites, boundSets);
  }

  files(): FoundFileView[] {
    return this.#texts.map(({ sourceId, file, asFound, asChosen }) => ({
      sourceId,
      file,
      structureCount: asFound.structures.length,
      groups: asChosen.groups.map((group, at) => this.#group(file, group, asFound.groups[at]!, at)),
    }));
  }

  entries({ sourceId, group, first, count }: FoundEntriesRequest): FoundEntryView[] {
    const text = this.#texts.find((one) => one.sourceId === sourceId);
    const chosen = text?.asChosen.groups[group];
    if (!text || !chosen) return [];
    return chosen.entries
      .slice(first, first + count)
      .map((entry, at) => this.#entry(text.file, chosen, entry, first + at));
  }

  marks({ file, first, last }: FoundMarksRequest): FoundMark[] {
    const text = this.#texts.find((one) => one.file === file);
    const marks: FoundMark[] = [];
    for (const [at, group] of (text?.asChosen.groups ?? []).entries())
      for (const entry of group.entries) {
        if (entry.line > last || entry.lastLine < first) continue;
        const { line, lastLine, label } = entry;
        const siteIndex = this.#sites(file, entry, group.proposed);
        marks.push({ group: at, proposed: group.proposed, line, lastLine, label, siteIndex });
        if (marks.length >= mostMarks) return marks;
      }
    return marks;
  }

  #group(file: string, group: FoundGroup, asFound: FoundGroup, at: number): FoundGroupView {
    const { line, shape, quantity, unit, role, roleWord, evidence, proposed, choice } = group;
    return {
      ...{ line, shape, quantity, unit, role, roleWord, evidence, proposed },
      group: at,
      signature: group.signature ?? '',
      choice: choice ?? null,
      asFound: { quantity: asFound.quantity, unit: asFound.unit, proposed: asFound.proposed },
      entryCount: group.entries.length,
      sample: group.entries
        .slice(0, sampleCount)
        .map((entry, place) => this.#entry(file, group, entry, place)),
      questions: questionsOf(group).map((kind) => ({
        kind,
        candidates: this.#candidates(kind, group, asFound),
      })),
      orders: ordersOf(group),
    };
  }

  #entry(file: string, group: FoundGroup, entry: FoundEntry, at: number): FoundEntryView {
    const { line, lastLine, label, element, isComplete, tensor } = entry;
    return {
      ...{ line, lastLine, label, element, isComplete },
      entry: at,
      siteIndex: this.#sites(file, entry, group.proposed),
      value: valueOf(tensor, group, element, this.#settings),
      proofs: [...new Set(entry.matched.map(({ kind }) => kind))],
    };
  }

  #candidates(kind: GroupQuestion, group: FoundGroup, asFound: FoundGroup): FoundCandidate[] {
    const changes = candidateChanges(kind, asFound);
    return changes.map((change) => {
      const choice = {
        quantity: group.choice?.quantity ?? null,
        unit: group.choice?.unit ?? null,
        order: group.choice?.order ?? null,
        ...change,
      };
      const reading = quantityAndUnit(asFound, choice);
      const sign = group.choice?.sign ?? 1;
      const values = asFound.entries.slice(0, sampleCount).map(({ tensor, element }) => {
        const read = reordered(tensor, asFound, choice.order, sign);
        if (reading.quantity !== 'efg' || reading.unit !== 'unknown')
          return valueOf(read, reading, element, this.#settings);
        // without a unit the asymmetry alone can be told
        const { asymmetry } = valueOf(read, { quantity: 'efg', unit: 'au' }, element, this.#settings);
        return { ...nothing, asymmetry };
      });
      return { change, values: change.taken === false ? [] : values };
    });
  }
}

/** Rows against columns says nothing of six components, and nothing of a tensor built from its axes. */
function ordersOf({ shape, sixOrder }: FoundGroup): ComponentOrder[] {
  if (sixOrder) return sixOrders.map(([name]) => name);
  return shape === 'block' || shape === 'row' ? ['exchanged'] : [];
}

/** A gradient in V m⁻² has numbers of this size at least. */
const leastInVPerM2 = 1e15;

function candidateChanges(
  kind: GroupQuestion,
  { entries, quantity }: FoundGroup,
): FoundCandidate['change'][] {
  if (kind === 'order') return sixOrders.map(([order]) => ({ order }));
  const largest = Math.max(0, ...entries.slice(0, 50).flatMap(({ tensor }) => tensor.map(Math.abs)));
  const units = largest > leastInVPerM2 ? (['V/m2'] as const) : (['au', '1e21V/m2', 'V/A2'] as const);
  if (kind === 'unit') return units.map((unit) => ({ unit }));
  return [
    { quantity: 'shielding' },
    { quantity: 'shift' },
    // where a unit goes with it, one answer settles both
    ...units.map((unit) => ({ quantity: 'efg' as const, unit })),
    ...(quantity === 'unknown' ? [{ taken: false }] : []),
  ];
}

const nothing: FoundValue = {
  isotropicPpm: null,
  spanPpm: null,
  vzz: null,
  asymmetry: null,
  couplingMHz: null,
  isotope: null,
};

/** The numbers a tensor gives when read so, by the same functions as the dossier's. */
export function valueOf(
  tensor: Mat3,
  { quantity, unit }: Pick<FoundGroup, 'quantity' | 'unit'>,
  element: string | null,
  settings: Pick<DossierSettings, 'isotopes' | 'quadrupoleMomentsBarn'>,
): FoundValue {
  if (quantity === 'unknown' || !tensor.every(Number.isFinite)) return nothing;
  if (quantity !== 'efg') {
    const { isotropic, span } = describeShielding(tensor);
    return { ...nothing, isotropicPpm: isotropic, spanPpm: span };
  }
  if (unit === 'unknown' || unit === 'ppm') return nothing;
  const isotope =
    element === null ? null : (settings.isotopes[element] ?? usualIsotope(element, 'efg')?.symbol ?? null);
  const moment = isotope === null ? null : (settings.quadrupoleMomentsBarn[isotope] ?? null);
  const described = describeEfg(
    efgTensorToAtomicUnits(tensor, unit),
    isotope === null ? null : nuclide(isotope),
    moment,
  );
  const { components, asymmetry, couplingMHz } = described;
  return { ...nothing, vzz: components[2], asymmetry, couplingMHz, isotope };
}

type SiteFinder = (
  file: string,
  entry: Pick<FoundEntry, 'line' | 'label' | 'element'>,
  isTaken: boolean,
) => number | null;

/** Site on whose atoms a tensor was put; for those of groups not taken the site of that label. */
function siteFinder(sites: readonly SiteDossier[], boundSets: () => readonly Attachment[]): SiteFinder {
  const byLabel = new Map<string, number | null>();
  for (const { index, label, element } of sites) {
    const key = `${element} ${label}`;
    byLabel.set(key, byLabel.has(key) ? null : index);
  }
  let byPlace: Map<string, number> | null = null;
  return (file, { line, label, element }, isTaken) => {
    if (isTaken) byPlace ??= sitesByPlace(boundSets());
    const own = isTaken ? byPlace?.get(`${line} ${file}`) : undefined;
    return own ?? byLabel.get(`${element ?? ''} ${label ?? ''}`) ?? null;
  };
}

function sitesByPlace(attachments: readonly Attachment[]): Map<string, number> {
  const byPlace = new Map<string, number>();
  for (const { bySite } of attachments)
    for (const [siteIndex, tensors] of bySite.entries())
      for (const { entry } of tensors) byPlace.set(`${entry.place.line} ${entry.place.file}`, siteIndex);
  return byPlace;
}
