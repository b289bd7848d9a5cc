import type { CifDocument } from '#src/readers/cif/cif-document.ts';

/** A document without offsets: what a writer is given and a reader must give back. */
export type ModelValue =
  | { readonly kind: 'text'; readonly text: string; readonly delimited: boolean }
  | { readonly kind: 'unknown' | 'inapplicable' }
  | { readonly kind: 'list'; readonly items: readonly ModelValue[] }
  | { readonly kind: 'table'; readonly entries: readonly (readonly [string, ModelValue])[] };

export interface ModelBlock {
  readonly name: string;
  readonly items: readonly (readonly [string, ModelValue])[];
  readonly loops: readonly { readonly names: readonly string[]; readonly values: readonly ModelValue[] }[];
  readonly frames: readonly ModelBlock[];
}

export interface Manner {
  readonly version: CifDocument['version'];
  readonly lineEnd: '\n' | '\r\n' | '\r' | 'mixed';
  /** Uniform in [0, 1): decides among the forms that serve. */
  readonly random: () => number;
}

/** Writes a document in forms chosen at random among all that its version allows. */
export function writeCif(blocks: readonly ModelBlock[], manner: Manner): string {
  const head = manner.version === '2.0' ? '#\\#CIF_2.0\n' : pick(manner, ['', '#\\#CIF_1.1\n', '# any\n']);
  const body = blocks.map((block) => `${casing('data_', manner)}${block.name}${content(block, manner)}`);
  return withLineEnds(`${head}${body.join('\n')}\n`, manner);
}

function content(block: ModelBlock, manner: Manner): string {
  const items = block.items.map(([name, value]) => {
    const written = writeValue(value, manner);
    return `${blank(manner)}${casing(name, manner)}${separated(written, manner)}`;
  });
  const loops = block.loops.map(({ names, values }) => {
    const header = names.map((name) => `${blank(manner)}${casing(name, manner)}`).join('');
    const rows = values.map((value) => separated(writeValue(value, manner), manner)).join('');
    return `${blank(manner)}${casing('loop_', manner)}${header}${rows}`;
  });
  const frames = block.frames.map(
    (frame) =>
      `${blank(manner)}${casing('save_', manner)}${frame.name}${content(frame, manner)}${blank(manner)}save_`,
  );
  return [...items, ...loops, ...frames].join('');
}

function writeValue(value: ModelValue, manner: Manner): string {
  switch (value.kind) {
    case 'unknown':
      return '?';
    case 'inapplicable':
      return '.';
    case 'text':
      return value.delimited ? delimited(value.text, manner) : value.text;
    case 'list':
      return `[${value.items.map((item) => separated(writeValue(item, manner), manner)).join('')}${blank(manner)}]`;
    case 'table': {
      const entries = value.entries.map(
        ([key, entry]) => `${blank(manner)}${keyText(key, manner)}:${entryText(entry, manner)}`,
      );
      return `{${entries.join('')}${blank(manner)}}`;
    }
  }
}

function entryText(value: ModelValue, manner: Manner): string {
  const written = writeValue(value, manner);
  return isField(written) ? `\n${written}` : written;
}

function keyText(key: string, manner: Manner): string {
  return pick(manner, quotedForms(key, '2.0'));
}

/** All forms that hold a text with delimiters. A text field is written from its semicolon on. */
function delimited(text: string, manner: Manner): string {
  const forms = [
    ...quotedForms(text, manner.version),
    prefixed(text, manner, false),
    prefixed(text, manner, true),
  ];
  if (!text.includes('\n;') && !startsProtocol(text)) forms.push(`\ue000${text}\n;`);
  if (!text.includes('\n;') && !text.startsWith(';')) forms.push(`\ue000\\\n${fold(text, manner)}\n;`);
  return pick(manner, forms);
}

function quotedForms(text: string, version: Manner['version']): string[] {
  const forms: string[] = [];
  for (const quote of ["'", '"']) {
    const clashes = version === '2.0' ? text.includes(quote) : new RegExp(`${quote}[ \\t]`).test(text);
    if (!clashes && !text.includes('\n')) forms.push(quote + text + quote);
    const three = quote.repeat(3);
    if (version === '2.0' && !text.includes(three) && !text.endsWith(quote)) forms.push(three + text + three);
  }
  return forms;
}

function prefixed(text: string, manner: Manner, folded: boolean): string {
  const prefix = pick(manner, ['>', '# ', 'p:', '_x ', "'"]);
  const lines = (folded ? fold(text, manner) : text).split('\n');
  return `\ue000${[prefix + (folded ? '\\\\' : '\\'), ...lines.map((line) => prefix + line)].join('\n')}\n;`;
}

function startsProtocol(text: string): boolean {
  return /\\[ \t]*$/.test(text.split('\n')[0]!);
}

/** Breaks lines with a backslash here and there, and always behind a backslash that ends a line. */
function fold(text: string, manner: Manner): string {
  const lines = text.split('\n').map((line) => {
    const broken = [...line]
      .map((character, index) =>
        index > 0 && character !== ';' && manner.random() < 0.1 ? `\\ \n${character}` : character,
      )
      .join('');
    return /\\[ \t]*$/.test(line) ? `${broken}\\\n` : broken;
  });
  return lines.join('\n');
}

/** Text fields are marked by U+E000 until it is known that they start a line. */
function isField(written: string): boolean {
  return written.startsWith('\ue000');
}

function separated(written: string, manner: Manner): string {
  if (isField(written)) return `${pick(manner, ['', ' ', ' # x'])}\n${written}`;
  return written.startsWith(';') ? ` ${written}` : `${blank(manner)}${written}`;
}

function blank(manner: Manner): string {
  return pick(manner, [' ', ' ', '\t', '\n', '  \n ', " # it's _a data_b\n", '\n\n']);
}

function casing(word: string, manner: Manner): string {
  return pick(manner, [word, word, word.toUpperCase()]);
}

function pick<Item>(manner: Manner, items: readonly Item[]): Item {
  return items[Math.floor(manner.random() * items.length)]!;
}

/** A CR is never put before an LF that is to end a line of its own. */
function withLineEnds(text: string, manner: Manner): string {
  let afterReturn = false;
  return text.replace(/\ue000|\n|[^\ue000\n]+/g, (part) => {
    if (part === '\ue000') return ';';
    if (part !== '\n') {
      afterReturn = false;
      return part;
    }
    const end = manner.lineEnd === 'mixed' ? pick(manner, ['\n', '\r', '\r\n']) : manner.lineEnd;
    const safe = afterReturn && end === '\n' ? '\r' : end;
    afterReturn = safe === '\r';
    return safe;
  });
}
