import type { JsonPath } from './json-schema.ts';

/** Where a text stops being JSON (RFC 8259), and what could have stood there. */
export interface JsonFault {
  readonly offset: number;
  readonly expected: string;
}

/** Nesting that is followed; a case file has about ten. */
const mostNesting = 200;

/** Line and column, from 1, of an offset. */
export function placeInText(
  text: string,
  offset: number,
): { readonly line: number; readonly column: number } {
  let line = 1;
  let start = 0;
  for (let at = text.indexOf('\n'); at >= 0 && at < offset; at = text.indexOf('\n', at + 1)) {
    line++;
    start = at + 1;
  }
  return { line, column: offset - start + 1 };
}

/** The first place at which a text isn't JSON; null where it is. JSON.parse says it in other words in every browser. */
export function jsonFault(text: string): JsonFault | null {
  const scan = new Scan(text, null);
  scan.document();
  return scan.fault;
}

/** Offset at which the value at a path stands in a JSON text; null where it isn't there. */
export function offsetOfPath(text: string, path: JsonPath): number | null {
  const scan = new Scan(text, path);
  scan.document();
  return scan.found;
}

/** One pass over a text, which stops at its first fault or at the wanted path. */
class Scan {
  readonly #text: string;
  readonly #wanted: JsonPath | null;
  readonly #path: (string | number)[] = [];
  #at = 0;
  fault: JsonFault | null = null;
  found: number | null = null;

  constructor(text: string, wanted: JsonPath | null) {
    this.#text = text;
    this.#wanted = wanted;
  }

  document(): void {
    if (this.#text.charCodeAt(0) === 0xfeff) this.#at++;
    this.#value();
    this.#blank();
    if (!this.#isDone() && this.#at < this.#text.length) this.#expect('the end of the text');
  }

  #isDone(): boolean {
    return this.fault !== null || this.found !== null;
  }

  #expect(expected: string): void {
    this.fault ??= { offset: this.#at, expected };
  }

  #blank(): void {
    while (/[ \t\n\r]/.test(this.#text.charAt(this.#at))) this.#at++;
  }

  #value(): void {
    this.#blank();
    if (this.#wanted && samePath(this.#path, this.#wanted)) {
      this.found = this.#at;
      return;
    }
    const first = this.#text.charAt(this.#at);
    if (this.#path.length > mostNesting) this.#expect(`at most ${mostNesting} levels`);
    else if (first === '{') this.#members();
    else if (first === '[') this.#items();
    else if (first === '"') this.#string();
    else this.#word();
  }

  #members(): void {
    this.#at++;
    this.#blank();
    if (this.#take('}')) return;
    do {
      this.#blank();
      if (this.#text.charAt(this.#at) !== '"') return this.#expect('a key in quotation marks');
      const start = this.#at;
      this.#string();
      if (this.#isDone()) return;
      this.#path.push(keyOf(this.#text.slice(start, this.#at)));
      this.#blank();
      if (!this.#take(':')) return this.#expect('a colon');
      this.#value();
      this.#path.pop();
      this.#blank();
    } while (!this.#isDone() && this.#take(','));
    if (!this.#isDone() && !this.#take('}')) this.#expect('a comma or }');
  }

  #items(): void {
    this.#at++;
    this.#blank();
    if (this.#take(']')) return;
    let index = 0;
    do {
      this.#path.push(index++);
      this.#value();
      this.#path.pop();
      this.#blank();
    } while (!this.#isDone() && this.#take(','));
    if (!this.#isDone() && !this.#take(']')) this.#expect('a comma or ]');
  }

  #take(character: string): boolean {
    if (this.#text.charAt(this.#at) !== character) return false;
    this.#at++;
    return true;
  }

  #string(): void {
    for (this.#at++; this.#at < this.#text.length; this.#at++) {
      const unit = this.#text.charCodeAt(this.#at);
      if (unit === 0x22) {
        this.#at++;
        return;
      }
      if (unit < 0x20) return this.#expect('no line break or control character inside a string');
      if (unit !== 0x5c) continue;
      const escape = /^(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/.exec(this.#text.slice(this.#at + 1, this.#at + 6));
      if (!escape) return this.#expect('an escape such as \\n or \\u00e9');
      this.#at += escape[0].length;
    }
    this.#expect('a closing quotation mark');
  }

  #word(): void {
    const word = /^(?:true|false|null|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?)(?![\w.+-])/.exec(
      this.#text.slice(this.#at, this.#at + 400),
    );
    if (word) this.#at += word[0].length;
    else this.#expect('a value');
  }
}

function keyOf(quoted: string): string {
  return String(JSON.parse(quoted));
}

function samePath(a: JsonPath, b: JsonPath): boolean {
  return a.length === b.length && a.every((part, i) => part === b[i]);
}
