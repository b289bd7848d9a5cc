import type { FoundEntry, FoundGroup, GroupRole } from './found-text.ts';
import { groupSignatures } from './group-signature.ts';
import type { JudgedGroup } from './judge-group.ts';

interface Weighed {
  readonly judged: JudgedGroup;
  readonly byAtom: ReadonlyMap<string, FoundEntry>;
  role: GroupRole;
  roleWord: string | null;
  proposed: boolean;
  readonly evidence: string[];
}

function atomOf({ element, index, label }: FoundEntry): string {
  return index === null
    ? `label ${label ?? ''}`
    : `${element ?? ''} ${index} ${/\d[A-Za-z']+$/.test(label ?? '') ? label : ''}`;
}

function pairs(a: Weighed, b: Weighed): [readonly number[], readonly number[]][] {
  const found: [readonly number[], readonly number[]][] = [];
  for (const [atom, entry] of a.byAtom) {
    const other = b.byAtom.get(atom);
    if (other) found.push([entry.tensor, other.tensor]);
  }
  return found;
}

function sharesAtom(a: Weighed, b: Weighed): boolean {
  const [few, many] = a.byAtom.size < b.byAtom.size ? [a, b] : [b, a];
  for (const atom of few.byAtom.keys()) if (many.byAtom.has(atom)) return true;
  return false;
}

function areClose(p: readonly number[], q: readonly number[], digits: number): boolean {
  const slack = 1.1 * 10 ** -digits;
  return p.every((value, at) => Object.is(value, q[at]) || Math.abs(value - q[at]!) <= slack);
}

const transposed = (m: readonly number[]): number[] =>
  m.map((_, at) => m[(at % 3) * 3 + Math.floor(at / 3)]!);
const symmetric = (m: readonly number[]): number[] => m.map((value, at) => (value + transposed(m)[at]!) / 2);

/** Sets of several forms of the same tensors apart, and proposes the total of the last. Groups come in the order of the text. */
export function weighGroups(judged: readonly JudgedGroup[]): FoundGroup[] {
  const all = judged.map((one): Weighed => ({
    judged: one,
    byAtom: new Map(one.entries.map((entry) => [atomOf(entry), entry])),
    role: one.decoy !== null ? 'decoy' : one.quantity === 'unknown' ? 'unknown' : (one.role ?? 'total'),
    roleWord: one.decoy ?? one.roleWord,
    proposed: false,
    evidence: [...one.evidence],
  }));
  for (const family of ['shielding', 'efg'] as const) {
    const ours = all.filter(
      ({ judged: one, role }) =>
        role !== 'decoy' && (one.quantity === family || (family === 'shielding' && one.quantity === 'shift')),
    );
    markStrays(ours);
    markSums(ours);
    markRepeated(ours);
    propose(ours);
  }
  const standing = all.filter(({ judged: one }) => one.entries.length > 0);
  const signatures = groupSignatures(
    standing.map(({ judged: { group, roleWord } }) => ({ ...group, roleWord })),
  );
  return standing.map((one, at) => foundGroup(one, signatures[at]!));
}

/** One more tensor after that of the last of many atoms, without a name of its own, belongs to none of them. */
function markStrays(groups: Weighed[]): void {
  const many = groups.filter(({ byAtom, judged }) => byAtom.size >= 3 && judged.group.ordinal === 0);
  for (const one of groups) {
    if (one.byAtom.size > 1 || one.judged.group.ordinal === 0) continue;
    if (!many.some((other) => sharesAtom(one, other))) continue;
    one.role = 'decoy';
    one.roleWord = 'of no atom that is named beside it';
  }
}

/** Parts of a whole that stand before it: at most so many are added up. */
const mostParts = 8;

/** A group that is the sum of those before it is their total, whatever words stand there. */
function markSums(groups: Weighed[]): void {
  for (let at = 2; at < groups.length; at++) {
    const whole = groups[at]!;
    for (let first = at - 2; first >= Math.max(0, at - mostParts); first--) {
      const parts = groups.slice(first, at);
      if (!isSum(whole, parts)) continue;
      whole.role = 'total';
      whole.roleWord = null;
      whole.evidence.push(`the sum of ${parts.length} contributions above`);
      for (const part of parts) {
        if (part.role === 'contribution') continue;
        part.role = 'contribution';
        part.roleWord = 'part of a sum';
      }
      break;
    }
  }
}

function isSum(whole: Weighed, parts: readonly Weighed[]): boolean {
  let seen = 0;
  for (const [atom, entry] of whole.byAtom) {
    const tensors = parts.map(({ byAtom }) => byAtom.get(atom)?.tensor);
    if (tensors.some((tensor) => tensor === undefined)) return false;
    const sum = entry.tensor.map((_, at) => tensors.reduce((all, tensor) => all + tensor![at]!, 0));
    const slack = (parts.length + 1) * 0.6 * 10 ** -whole.judged.digits;
    if (!entry.tensor.every((value, at) => Math.abs(value - sum[at]!) <= slack)) return false;
    if (entry.tensor.every((value) => value === 0)) continue;
    if (++seen >= 50) break;
  }
  return seen > 0;
}

/** The same tensors again with fewer digits, or only their symmetric part. */
function markRepeated(groups: Weighed[]): void {
  for (const [at, one] of groups.entries()) {
    for (let next = at + 1; next < groups.length; next++) {
      const other = groups[next]!;
      if (one.role === 'contribution' || other.role === 'contribution') continue;
      const common = pairs(one, other);
      if (common.length === 0) continue;
      const isPrincipal =
        one.judged.group.tensors[0]?.shape === 'principal' ||
        other.judged.group.tensors[0]?.shape === 'principal';
      const digits = Math.min(one.judged.digits, other.judged.digits, isPrincipal ? 1 : 99);
      if (common.every(([p, q]) => areClose(p, q, digits))) {
        const worse = isWorse(one, other) ? one : other;
        worse.role = 'repeated';
        worse.roleWord = `the tensors of line ${(worse === one ? other : one).judged.entries[0]!.line} again`;
      } else if (common.every(([p, q]) => areClose(symmetric(p), q, digits))) setForms(one, other);
      else if (common.every(([p, q]) => areClose(p, symmetric(q), digits))) setForms(other, one);
    }
  }
}

function isWorse(one: Weighed, other: Weighed): boolean {
  const principal = (w: Weighed): boolean => w.judged.group.tensors[0]?.shape === 'principal';
  if (principal(one) !== principal(other)) return principal(one);
  if (one.judged.digits !== other.judged.digits) return one.judged.digits < other.judged.digits;
  return one.byAtom.size <= other.byAtom.size;
}

function setForms(full: Weighed, half: Weighed): void {
  half.role = 'symmetrised';
  half.roleWord = `the symmetric part of line ${full.judged.entries[0]!.line}`;
  if (full.role === 'raw') full.role = 'total';
}

/** Last first; a group that shares an atom with one already proposed is an earlier form of it. */
function propose(groups: Weighed[]): void {
  const standing = groups.filter(({ role }) => role === 'total');
  const forms = groups.filter(({ role }) => role === 'raw' || role === 'symmetrised');
  const chosen: Weighed[] = [];
  const consider = (list: readonly Weighed[]): void => {
    for (const one of [...list].reverse()) {
      if (one.proposed) continue;
      const winner = chosen.find((other) => sharesAtom(one, other));
      if (winner) {
        if (one.role === 'total') one.role = 'earlier';
        one.roleWord ??= `replaced by line ${winner.judged.entries[0]!.line}`;
      } else {
        one.proposed = true;
        chosen.push(one);
      }
    }
  };
  // Words such as “total”, or a sum that was checked, go before groups that say nothing.
  const sure = standing.filter(
    ({ judged: { role }, evidence }) =>
      role === 'total' || evidence.some((text) => text.startsWith('the sum of')),
  );
  const full = standing.filter((one) => !sure.includes(one));
  consider(forms.filter(({ role, roleWord }) => role === 'symmetrised' && roleWord === null));
  consider(sure);
  consider(full);
  consider(forms);
  // A single group is not a part of anything, whatever its heading says.
  const parts = groups.filter(({ role }) => role === 'contribution');
  for (const one of parts) {
    if (
      chosen.some((other) => sharesAtom(one, other)) ||
      parts.some((other) => other !== one && sharesAtom(one, other))
    )
      continue;
    if (one.roleWord === 'part without a trace') continue;
    one.role = 'total';
    one.proposed = true;
    one.evidence.push(`“${one.roleWord ?? ''}” stands above, but no total of these atoms was found`);
    chosen.push(one);
  }
}

const roleSentences: Readonly<Record<GroupRole, string | null>> = {
  total: null,
  contribution: 'a contribution, not the whole',
  symmetrised: 'symmetrised',
  raw: 'not symmetrised',
  earlier: 'an earlier cycle or task',
  repeated: 'printed before',
  decoy: 'none of shielding, shift and field gradient',
  unknown: 'quantity not settled by the text: choose it',
};

function foundGroup({ judged, role, roleWord, proposed, evidence }: Weighed, signature: string): FoundGroup {
  const word = roleWord === null ? '' : ` (${roleWord})`;
  const sentence = roleSentences[role];
  const all = [...evidence, ...(sentence === null ? [] : [`${sentence}${word}`])];
  return {
    line: judged.entries[0]?.line ?? 0,
    shape: judged.group.tensors[0]?.shape ?? 'block',
    quantity: judged.quantity,
    unit: judged.unit,
    reason: all.length === 0 ? 'a tensor by its shape; nothing around it says of what' : all.join('; '),
    evidence: all,
    role,
    roleWord,
    proposed,
    structureIndex: judged.structureIndex,
    entries: judged.entries,
    signature,
    sixOrder: judged.sixOrder,
    isOrderProved: judged.isOrderProved,
  };
}
