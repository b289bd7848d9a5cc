/** One `key=value` of an extended XYZ comment line. */
export interface CommentEntry {
  /** As written; compare in lower case. */
  readonly key: string;
  /** Without its quotes and with escapes undone; brackets are kept. A key without `=` has the value `T`. */
  readonly value: string;
  /** False for a word that stands alone. */
  readonly assigned: boolean;
  /** Columns from 0 at which key and value start. */
  readonly keyStart: number;
  readonly valueStart: number;
}

export interface CommentFault {
  readonly column: number;
  readonly code: 'xyz-unclosed-quote' | 'xyz-unclosed-bracket' | 'xyz-key-twice';
  readonly message: string;
}

export interface CommentLine {
  readonly entries: readonly CommentEntry[];
  /** Those with `=`, by lower-case key; of a repeated key the first counts. */
  readonly byKey: ReadonlyMap<string, CommentEntry>;
  /** Worth reporting only where the line is meant as keys and values. */
  readonly faults: readonly CommentFault[];
}

/** Text between a start and where reading goes on. */
interface Piece {
  readonly text: string;
  readonly next: number;
  readonly closed: boolean;
}

/** After so many unclosed quotes and brackets the rest of a line is taken as bare words: reading stays linear. */
const maxUnclosed = 5;
/** Faults of one line that are kept. */
const maxFaults = 100;

const closerOf: Readonly<Record<string, string>> = { '{': '}', '[': ']' };

/**
 * The comment line of extended XYZ as keys and values: bare, `"…"` and `'…'` with backslash escapes, `{…}` and `[…]`
 * with any nesting, a key alone as true, spaces around `=` allowed. An unclosed quote or bracket ends where the next
 * `key=` begins, so that one slip does not swallow the rest. One pass over the line.
 */
export function parseCommentLine(line: string): CommentLine {
  const entries: CommentEntry[] = [];
  const byKey = new Map<string, CommentEntry>();
  const faults: CommentFault[] = [];
  let unclosed = 0;
  let at = skipSpace(line, 0);
  while (at < line.length) {
    const keyStart = at;
    const bareOnly = unclosed >= maxUnclosed;
    const key = readKey(line, at, bareOnly);
    unclosed += noteUnclosed(faults, key, keyStart, line);
    const equals = skipSpace(line, key.next);
    const assigned = line[equals] === '=';
    const valueStart = assigned ? skipSpace(line, equals + 1) : key.next;
    const value = assigned
      ? readValue(line, valueStart, bareOnly)
      : { text: 'T', next: key.next, closed: true };
    if (assigned) unclosed += noteUnclosed(faults, value, valueStart, line);
    const entry = { key: key.text, value: value.text, assigned, keyStart, valueStart };
    entries.push(entry);
    const lower = key.text.toLowerCase();
    if (assigned && !byKey.has(lower)) byKey.set(lower, entry);
    else if (assigned && faults.length < maxFaults) faults.push(repeatedKey(key.text, keyStart));
    at = skipSpace(line, Math.max(value.next, keyStart + 1));
  }
  return { entries, byKey, faults };
}

function readKey(line: string, start: number, bareOnly: boolean): Piece {
  const quote = line[start];
  if (!bareOnly && (quote === '"' || quote === "'")) return readQuoted(line, start, quote);
  let end = start;
  while (end < line.length && line[end] !== '=' && !isSpace(line.charCodeAt(end))) end++;
  // A stray `=` is a key of its own, so that reading always moves on.
  if (end === start) end++;
  return { text: line.slice(start, end), next: end, closed: true };
}

function readValue(line: string, start: number, bareOnly: boolean): Piece {
  const first = bareOnly ? '' : (line[start] ?? '');
  if (first === '"' || first === "'") return readQuoted(line, start, first);
  if (closerOf[first] !== undefined) return readBracketed(line, start);
  let end = start;
  while (end < line.length && !isSpace(line.charCodeAt(end))) end++;
  return { text: line.slice(start, end), next: end, closed: true };
}

function readQuoted(line: string, start: number, quote: string): Piece {
  const parts: string[] = [];
  let from = start + 1;
  for (let i = from; i < line.length; i++) {
    if (line[i] === '\\' && i + 1 < line.length) {
      parts.push(line.slice(from, i), line[i + 1] === 'n' ? '\n' : (line[i + 1] ?? ''));
      i++;
      from = i + 1;
    } else if (line[i] === quote) {
      // `a="1 b="2"`: the second quote opens the value of b, the first was never closed.
      if (/\s[A-Za-z_]\w*=$/.test(line.slice(Math.max(start, i - 64), i))) break;
      parts.push(line.slice(from, i));
      return { text: parts.join(''), next: i + 1, closed: true };
    }
  }
  return cutAtNextKey(line, start + 1);
}

function readBracketed(line: string, start: number): Piece {
  const waiting: string[] = [];
  for (let i = start; i < line.length; i++) {
    const unit = line[i] ?? '';
    if (unit === '"' || unit === "'") {
      const end = line.indexOf(unit, i + 1);
      if (end > 0) i = end;
    } else if (closerOf[unit] !== undefined) waiting.push(closerOf[unit]);
    else if (unit === waiting.at(-1)) {
      waiting.pop();
      if (waiting.length === 0) return { text: line.slice(start, i + 1), next: i + 1, closed: true };
    }
  }
  return cutAtNextKey(line, start);
}

/** The unclosed text up to the next thing that looks like `key=`. */
function cutAtNextKey(line: string, start: number): Piece {
  const nextKey = /\s[A-Za-z_]\w*=/g;
  nextKey.lastIndex = start;
  const found = nextKey.exec(line);
  const end = found?.index ?? line.length;
  return { text: line.slice(start, end), next: end, closed: false };
}

function noteUnclosed(faults: CommentFault[], piece: Piece, column: number, line: string): number {
  if (piece.closed) return 0;
  const opening = line[column] ?? '"';
  const quoted = opening === '"' || opening === "'";
  faults.push({
    column,
    code: quoted ? 'xyz-unclosed-quote' : 'xyz-unclosed-bracket',
    message: `The ${quoted ? 'quote' : 'bracket'} ${opening} is not closed; its text was taken up to the next key.`,
  });
  return 1;
}

function repeatedKey(key: string, column: number): CommentFault {
  return {
    column,
    code: 'xyz-key-twice',
    message: `The key ${key.slice(0, 40)} stands twice; the first one counts.`,
  };
}

function skipSpace(line: string, start: number): number {
  let at = start;
  while (at < line.length && isSpace(line.charCodeAt(at))) at++;
  return at;
}

/** ASCII blanks and controls, no-break space and the other Unicode spaces. */
export function isSpace(unit: number): boolean {
  if (unit <= 32) return true;
  return (
    unit >= 0xa0 &&
    (unit === 0xa0 || (unit >= 0x2000 && unit <= 0x200a) || unit === 0x202f || unit === 0x3000)
  );
}
