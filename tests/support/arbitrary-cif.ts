import fc from 'fast-check';
import type { CifBlock, CifDocument, CifValue } from '#src/readers/cif/cif-document.ts';
import type { ModelBlock, ModelValue } from './cif-writer.ts';

type Version = CifDocument['version'];

const ascii = [
  ...'abzXYZ019_;#\'"\\$?.:-+()/,&',
  ' ',
  '  ',
  '\t',
  '[',
  ']',
  '{',
  '}',
  "'''",
  'data_',
  'loop_',
];
const beyond = ['é', 'Å', '𝕏', '\u00a0', 'Ω'];

function pieces(version: Version, more: readonly string[]): fc.Arbitrary<string> {
  const alphabet = version === '2.0' ? [...ascii, ...beyond, ...more] : [...ascii, ...more];
  return fc.array(fc.constantFrom(...alphabet), { maxLength: 14 }).map((parts) => parts.join(''));
}

const reservedWord = /^(?:data_|save_|(?:loop|global|stop)_$)|^loop__/i;

/** Words that both grammars, or the stricter one, allow without quotes. */
function bareText(version: Version): fc.Arbitrary<string> {
  const brackets = version === '2.0' ? /[[\]{}]/ : /^[[\]]/;
  return pieces(version, []).filter(
    (text) =>
      text !== '' &&
      !/[ \t\u00a0]/.test(text) &&
      !/^[#_$'"]/.test(text) &&
      text !== '?' &&
      text !== '.' &&
      !reservedWord.test(text) &&
      !brackets.test(text),
  );
}

function scalar(version: Version): fc.Arbitrary<ModelValue> {
  return fc.oneof(
    fc.constant<ModelValue>({ kind: 'unknown' }),
    fc.constant<ModelValue>({ kind: 'inapplicable' }),
    bareText(version).map((text): ModelValue => ({ kind: 'text', text, delimited: false })),
    pieces(version, ['\n', '\n;', '\\\n', '\n_x 1\n']).map((text): ModelValue => ({
      kind: 'text',
      text,
      delimited: true,
    })),
  );
}

function value(version: Version): fc.Arbitrary<ModelValue> {
  if (version === '1.1') return scalar(version);
  const key = fc.string({ unit: fc.constantFrom('a', 'b', ' ', '"', ':', '[', '\n'), maxLength: 5 });
  const { any } = fc.letrec<{ any: ModelValue }>((tie) => ({
    any: fc.oneof(
      { maxDepth: 3 },
      scalar(version),
      fc.array(tie('any'), { maxLength: 3 }).map((items): ModelValue => ({ kind: 'list', items })),
      fc
        .uniqueArray(fc.tuple(key, tie('any')), { maxLength: 3, selector: ([name]) => name })
        .map((entries): ModelValue => ({ kind: 'table', entries })),
    ),
  }));
  return any;
}

function blockContent(version: Version): fc.Arbitrary<Omit<ModelBlock, 'name' | 'frames'>> {
  const item = value(version);
  const loop = fc
    .tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 4 }))
    .chain(([width, rows]) =>
      fc
        .array(item, { minLength: width * rows, maxLength: width * rows })
        .map((values) => ({ width, values })),
    );
  return fc
    .record({ items: fc.array(item, { maxLength: 5 }), loops: fc.array(loop, { maxLength: 2 }) })
    .map(({ items, loops }) => ({
      items: items.map((each, index) => [`_item.n${index}[1]`, each] as const),
      loops: loops.map(({ width, values }, index) => ({
        names: Array.from({ length: width }, (_, column) => `_loop${index}_c${column}`),
        values,
      })),
    }));
}

/** Documents in which every name is used once, so that nothing has to be reported. */
export function arbitraryCif(version: Version): fc.Arbitrary<readonly ModelBlock[]> {
  const content = blockContent(version);
  const frames = fc
    .array(content, { maxLength: 2 })
    .map((all) => all.map((one, index) => ({ ...one, name: `Frame${index}`, frames: [] })));
  return fc
    .array(fc.tuple(content, frames), { minLength: 1, maxLength: 3 })
    .map((all) => all.map(([one, inner], index) => ({ ...one, name: `block-${index}`, frames: inner })));
}

/** A document as read, without offsets. */
export function modelOf(blocks: readonly CifBlock[]): ModelBlock[] {
  return blocks.map((block) => ({
    name: block.name,
    items: [...block.items].map(([name, item]) => [name, modelValue(item)] as const),
    loops: block.loops.map(({ names, values }) => ({ names, values: values.map(modelValue) })),
    frames: modelOf(block.frames),
  }));
}

function modelValue(read: CifValue): ModelValue {
  switch (read.kind) {
    case 'text':
      return { kind: 'text', text: read.text, delimited: read.delimited };
    case 'list':
      return { kind: 'list', items: read.items.map(modelValue) };
    case 'table':
      return { kind: 'table', entries: [...read.entries].map(([key, item]) => [key, modelValue(item)]) };
    default:
      return { kind: read.kind };
  }
}
