import { asMat3 } from '#src/base/matrix3.ts';
import type { EfgUnit } from '#src/tensor/units.ts';
import { efgUnitLabel } from '#src/tensor/units.ts';
import { valueReading } from './element-scales.ts';
import type { UnitLine } from './find-tensors.ts';
import type { FoundEntry, MatchedValue } from './found-text.ts';
import type { FoundStructure } from './found-structure.ts';
import { nameAtoms } from './name-atoms.ts';
import type { PrintedValue, RawTensor } from './raw-tensor.ts';
import { fromSix } from './row-finder.ts';
import { sixOrder } from './six-order.ts';
import type { TensorGroup } from './tensor-groups.ts';
import { factsOf, proves, traceShare, unitOfCoupling } from './tensor-proof.ts';
import type { Topic } from './topic.ts';

/** A group with what its words and numbers say, before it is weighed against others. */
export interface JudgedGroup {
  readonly group: TensorGroup;
  readonly quantity: 'shielding' | 'shift' | 'efg' | 'unknown';
  readonly unit: 'ppm' | EfgUnit | 'unknown';
  readonly evidence: readonly string[];
  /** What else of a tensor's shape it is; null for ours. */
  readonly decoy: string | null;
  readonly role: 'total' | 'contribution' | 'symmetrised' | 'raw' | null;
  readonly roleWord: string | null;
  readonly structureIndex: number | null;
  readonly entries: readonly FoundEntry[];
  readonly digits: number;
  /** Entries with a printed value that agrees. */
  readonly proved: number;
  /** Places of six components; null where nine stand there. */
  readonly sixOrder: readonly number[] | null;
  readonly isOrderProved: boolean;
  readonly ghosts: number;
}

/** What stands elsewhere in the text and may concern a group. */
export interface TextEvidence {
  readonly structures: readonly FoundStructure[];
  readonly unitLines: readonly UnitLine[];
  /** Elements of so many atoms without names, from a list of species and their counts above the line. */
  readonly speciesOf: (count: number, line: number) => readonly string[] | null;
  /** Values of tables, by number of the atom. */
  readonly printedOf: (raw: RawTensor) => readonly PrintedValue[];
}

interface Facts {
  readonly raw: RawTensor;
  readonly values: readonly number[];
  readonly printed: readonly PrintedValue[];
  readonly element: string | null;
}

/** Decides quantity and unit of a group from the words around it and from its own numbers. */
export function judgeGroup(whole: TensorGroup, text: TextEvidence): JudgedGroup {
  const topic = mainTopic(whole);
  const tensors = whole.tensors.filter(({ atom }) => atom !== null && !atom.isGhost);
  const group = { ...whole, tensors };
  const sixes = tensors[0]?.sixes ? sixOrder(tensors, topic) : null;
  const { names, structureIndex } = nameAtoms(tensors, text.structures, text.speciesOf);
  const facts = tensors.map((raw, at): Facts => ({
    raw,
    values: raw.sixes && sixes ? fromSix(raw.sixes, sixes.order) : raw.values,
    printed: [...raw.printed, ...text.printedOf(raw)],
    element: names[at]?.element ?? null,
  }));
  const matches = facts.map(matchesOf);
  const proved = matches.filter(({ length }) => length > 0).length;
  const evidence: string[] = [];
  const looks = tensors[0]?.looks ?? 'tensor';
  const decoy = topic.decoy?.value ?? (looks === 'tensor' ? null : looks);
  if (topic.decoy) evidence.push(`“${topic.decoy.words}” in line ${topic.decoy.line}`);
  const refuted = decoy === null ? refutedIn(facts) : null;
  if (refuted !== null)
    evidence.push(`the isotropic value printed in line ${refuted} is not that of these components`);
  const quantity = decoy === null && refuted === null ? quantityOf(topic, facts, whole, evidence) : 'unknown';
  const unit = quantity === 'unknown' ? unitSaid(topic) : unitOf(quantity, topic, facts, text, evidence);
  if (sixes) evidence.push(sixes.evidence);
  if (proved > 0) evidence.push(proofSentence(matches, facts.length));
  const entries = facts.map(({ raw, values }, at): FoundEntry => ({
    line: raw.line,
    lastLine: raw.lastLine,
    ...(names[at] ?? { label: null, element: null, index: null, atomIndex: null }),
    tensor: asMat3(values),
    isComplete: values.every(Number.isFinite),
    matched: matches[at] ?? [],
  }));
  const { role, roleWord } = roleOf(topic, quantity, facts);
  return {
    group,
    quantity,
    unit,
    evidence,
    decoy,
    role,
    roleWord,
    structureIndex,
    entries,
    digits: tensors[0]?.digits ?? 0,
    proved,
    sixOrder: sixes?.order ?? null,
    isOrderProved: sixes?.isProved ?? true,
    ghosts: whole.tensors.length - tensors.length,
  };
}

/** Topic of the first tensor that has one; later ones stand nearer to their own lines than to the heading. */
function mainTopic({ topics, topic }: TensorGroup): Topic {
  return topics.find(({ quantity, decoy }) => quantity !== null || decoy !== null) ?? topic;
}

function matchesOf({ raw, values, printed }: Facts): MatchedValue[] {
  const own = factsOf(values);
  if (own === null || own.size === 0) return [];
  return printed
    .filter((value) => proves(value, own, raw.digits))
    .map(({ kind, values: given, line }) => ({ kind, printed: given, line }));
}

/** First line whose own isotropic value is not that of its numbers, where that holds for most such lines of the group. */
function refutedIn(facts: readonly Facts[]): number | null {
  let agreeing = 0;
  const others: number[] = [];
  for (const { raw, values, printed } of facts) {
    const own = factsOf(values);
    const isotropic = printed.filter(({ kind, line }) => kind === 'isotropic' && line === raw.line);
    if (own === null || isotropic.length === 0 || raw.shape === 'block') continue;
    if (isotropic.some((value) => proves(value, own, raw.digits))) agreeing++;
    else others.push(raw.line);
  }
  return others.length > agreeing ? others[0]! : null;
}

function proofSentence(matches: readonly (readonly MatchedValue[])[], count: number): string {
  const kinds = new Set(matches.flatMap((list) => list.map(({ kind }) => kind)));
  const names = [...kinds].map((kind) =>
    kind === 'principal' ? 'principal values' : kind === 'isotropic' ? 'isotropic values' : kind,
  );
  const hits = matches.filter(({ length }) => length > 0).length;
  return `printed ${names.join(', ')} agree for ${hits} of ${count}`;
}

/** True where no tensor of the group has a trace beyond rounding; null where all are zero or incomplete. */
function isTraceless(facts: readonly Facts[]): boolean | null {
  const shares = facts.flatMap(({ values, raw }) => {
    const share = traceShare(values, raw.digits);
    return share === null || Math.hypot(...values) === 0 ? [] : [share];
  });
  if (shares.length === 0) return null;
  return shares.filter((share) => share < 2e-3).length >= 0.97 * shares.length;
}

type Quantity = JudgedGroup['quantity'];

function quantityOf(
  topic: Topic,
  facts: readonly Facts[],
  { tensors }: TensorGroup,
  evidence: string[],
): Quantity {
  const said = topic.quantity;
  if (said) evidence.push(`“${said.words}” in line ${said.line}`);
  const traceless = isTraceless(facts);
  const couplings = facts.some(({ printed }) => printed.some(({ kind }) => kind === 'coupling'));
  const prefix = tensors[0]?.prefix ?? '';
  const named = quantityOfPrefix(prefix);
  if (traceless) {
    if (said?.value === 'efg') {
      evidence.push('zero trace');
      return 'efg';
    }
    const words = couplings ? 'coupling constants' : named === 'efg' ? 'components named V' : null;
    if (words !== null || (topic.isMixed && said !== null) || (said === null && topic.efgUnit !== null)) {
      evidence.push(`zero trace${words ? ` and ${words}` : ''}`);
      return 'efg';
    }
    return said ? said.value : 'unknown';
  }
  if (said?.value === 'efg') {
    const isPart = topic.role?.value.kind === 'contribution';
    if (traceless === null || isPart) return 'efg';
    evidence.push('the trace is not zero, so this is no field gradient');
    return topic.isPpm ? shieldingOrShift('shielding', facts, evidence) : 'unknown';
  }
  if (said && topic.role?.value.kind === 'contribution') return said.value;
  if (said) {
    const differs = named !== null && named !== 'efg' && named !== said.value;
    if (differs) evidence.push(`components named ${prefix}`);
    return shieldingOrShift(
      differs ? named : said.value === 'shift' ? 'shift' : 'shielding',
      facts,
      evidence,
    );
  }
  if (named === 'shielding' || named === 'shift') {
    evidence.push(`components named ${prefix}`);
    return shieldingOrShift(named, facts, evidence);
  }
  if (topic.isPpm) {
    evidence.push(`“ppm” in line ${topic.isPpm.line}`);
    return shieldingOrShift(null, facts, evidence);
  }
  return 'unknown';
}

/** Letters that the trade names components by: σ and s for shielding, δ for shift, V for the field gradient. */
function quantityOfPrefix(prefix: string): 'shielding' | 'shift' | 'efg' | null {
  if (/^(?:s|σ|sig|sigma|shield|shielding|ms)$/.test(prefix)) return 'shielding';
  if (/^(?:δ|delta|cs|shift)$/.test(prefix)) return 'shift';
  return /^(?:v|vv|efg)$/.test(prefix) ? 'efg' : null;
}

/** Words against what values of these elements can be. */
function shieldingOrShift(
  said: 'shielding' | 'shift' | null,
  facts: readonly Facts[],
  evidence: string[],
): Quantity {
  const votes = { shielding: 0, shift: 0, minusShielding: 0 };
  let example = '';
  for (const { values, element } of facts) {
    const own = factsOf(values);
    const reading = element === null || own === null ? null : valueReading(element, own.isotropic);
    if (!reading || !own) continue;
    if (reading.shielding) votes.shielding++;
    if (reading.shift) votes.shift++;
    if (reading.minusShielding) votes.minusShielding++;
    if (example === '') example = `${element} at ${Number(own.isotropic.toPrecision(4))} ppm`;
  }
  if (votes.minusShielding > votes.shift && votes.minusShielding > votes.shielding) {
    evidence.push(`${example}: minus the shielding, a shift without a reference`);
    return 'shift';
  }
  if (votes.shielding > votes.shift) {
    evidence.push(`${example} is a shielding${said === 'shift' ? ', whatever the title says' : ''}`);
    return 'shielding';
  }
  if (votes.shift > votes.shielding && said !== 'shielding') {
    evidence.push(`${example} is a shift`);
    return 'shift';
  }
  return said ?? 'unknown';
}

function unitSaid(topic: Topic): JudgedGroup['unit'] {
  return topic.isPpm?.value ?? topic.efgUnit?.value ?? 'unknown';
}

function unitOf(
  quantity: Quantity,
  topic: Topic,
  facts: readonly Facts[],
  { unitLines }: TextEvidence,
  evidence: string[],
): JudgedGroup['unit'] {
  if (quantity !== 'efg') {
    evidence.push(
      topic.isPpm
        ? `“ppm” in line ${topic.isPpm.line}`
        : 'ppm: no unit is named, and these are printed in ppm',
    );
    return 'ppm';
  }
  const proved = provedUnit(facts);
  const lead = (facts[0]?.raw.lead ?? '').split(' ');
  const ofKeyword = unitLines.find(
    ({ words, unit }) => unit !== 'ppm' && words.some((word) => lead.includes(word)),
  );
  const said = ofKeyword
    ? { value: ofKeyword.unit as EfgUnit, words: ofKeyword.text, line: ofKeyword.line }
    : (topic.efgUnit ?? unitElsewhere(unitLines, facts));
  if (proved !== null) {
    const agrees = said === null || said.value === proved.unit;
    evidence.push(
      `couplings printed in line ${proved.line} and others agree in ${efgUnitLabel[proved.unit]}${agrees ? '' : `, not in the unit of line ${said.line}`}`,
    );
    if (said !== null && agrees) evidence.push(`“${said.words}” in line ${said.line}`);
    return proved.unit;
  }
  if (said !== null) {
    evidence.push(`“${said.words}” in line ${said.line}`);
    return said.value;
  }
  evidence.push('no unit is named');
  return 'unknown';
}

/** Lines above and below a group in which a unit of everything is its unit too. */
const besideAbove = 4;
const besideBelow = 12;

/** Unit of field gradients that a line after the group names, else one before it. */
function unitElsewhere(
  lines: readonly UnitLine[],
  facts: readonly Facts[],
): { value: EfgUnit; words: string; line: number } | null {
  const first = facts[0]?.raw.line ?? 0;
  const last = facts[facts.length - 1]?.raw.lastLine ?? 0;
  const isBeside = (line: number): boolean =>
    (line < first && first - line <= besideAbove) || (line > last && line - last <= besideBelow);
  const fitting = lines.filter(
    ({ ofGradients, ofAll, unit, line }) =>
      unit !== 'ppm' && (ofGradients || (ofAll === true && isBeside(line))),
  );
  const found = fitting.find(({ line }) => line > last) ?? fitting[fitting.length - 1];
  return found ? { value: found.unit as EfgUnit, words: found.text, line: found.line } : null;
}

/** Unit in which most of the printed couplings agree with the tensors. */
function provedUnit(facts: readonly Facts[]): { unit: EfgUnit; line: number } | null {
  const votes = new Map<EfgUnit, { count: number; line: number }>();
  let tried = 0;
  for (const { values, printed, element } of facts) {
    const own = factsOf(values);
    const coupling = printed.find(({ kind, values: [value = 0] }) => kind === 'coupling' && value !== 0);
    if (own === null || !coupling) continue;
    const moment = printed.find(({ kind }) => kind === 'moment')?.values[0] ?? null;
    const size = coupling.values[0]!;
    if (Math.abs(size) < 20 * 10 ** -coupling.digits || own.size < 20 * 10 ** -(facts[0]?.raw.digits ?? 0))
      continue;
    tried++;
    const found = unitOfCoupling(size, own, element, moment);
    if (!found) continue;
    const vote = votes.get(found.unit) ?? { count: 0, line: coupling.line };
    votes.set(found.unit, { ...vote, count: vote.count + 1 });
  }
  const best = [...votes].sort(([, p], [, q]) => q.count - p.count)[0];
  return best && best[1].count * 2 > tried ? { unit: best[0], line: best[1].line } : null;
}

function roleOf(
  topic: Topic,
  quantity: Quantity,
  facts: readonly Facts[],
): Pick<JudgedGroup, 'role' | 'roleWord'> {
  const role = topic.role?.value;
  if (quantity === 'shielding' && isTraceless(facts) && facts.length > 1) {
    return { role: 'contribution', roleWord: 'part without a trace' };
  }
  if (role === undefined || role.kind === 'unfinished') return { role: null, roleWord: null };
  if (role.kind === 'contribution') return { role: 'contribution', roleWord: role.word };
  return { role: role.kind, roleWord: null };
}
