import type { CaseDocument } from './case-document.ts';
import { publishedSchema } from './case-schema.ts';
import type { JsonSchema } from './json-schema.ts';
import { isObject, matchingForm, resolved } from './json-schema.ts';

/** Lists of plain values are kept on one line up to this many characters. */
const lineLength = 100;

/**
 * A case as the text of its file: JSON with an indent of two, one decision a line, keys in the order of the published
 * schema and names in the order of their code points, so that two cases can be compared line by line. The same case
 * always gives the same text. Ends in a line feed.
 */
export function serialiseCase(document: CaseDocument): string {
  return `${printed(ordered(document, publishedSchema, publishedSchema), '')}\n`;
}

/** The value with the keys of its objects in the schema's order; keys the schema doesn't know are left out. */
function ordered(value: unknown, given: JsonSchema, root: JsonSchema): unknown {
  if (value === null || typeof value !== 'object') return value;
  const schema = matchingForm(value, resolved(given, root), root);
  if (Array.isArray(value)) return value.map((item) => ordered(item, schema.items ?? {}, root));
  if (!isObject(value)) return value;
  const properties = schema.properties ?? {};
  const keys = schema.additionalProperties ? Object.keys(value).sort() : Object.keys(properties);
  const present = keys.filter((key) => Object.hasOwn(value, key) && value[key] !== undefined);
  return Object.fromEntries(
    present.map((key) => [
      key,
      ordered(
        value[key],
        (Object.hasOwn(properties, key) ? properties[key] : schema.additionalProperties) ?? {},
        root,
      ),
    ]),
  );
}

function printed(value: unknown, indent: string): string {
  if (value === null || typeof value !== 'object') return JSON.stringify(value);
  const inner = `${indent}  `;
  if (Array.isArray(value)) {
    const items = value.map((item) => printed(item, inner));
    const isPlain = value.every((item) => item === null || typeof item !== 'object');
    const line = isPlain ? `[${items.join(', ')}]` : '';
    if (items.length === 0 || (line !== '' && line.length <= lineLength)) return `[${items.join(', ')}]`;
    return `[\n${items.map((item) => `${inner}${item}`).join(',\n')}\n${indent}]`;
  }
  const members = Object.entries(value).map(
    ([key, held]) => `${inner}${JSON.stringify(key)}: ${printed(held, inner)}`,
  );
  return members.length === 0 ? '{}' : `{\n${members.join(',\n')}\n${indent}}`;
}
