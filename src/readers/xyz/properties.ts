/** One entry of `Properties`: a name, a type and how many fields of a row it takes. */
export interface Column {
  /** As written. */
  readonly name: string;
  /** Lower case, for comparing. */
  readonly key: string;
  /** Text, integer, real or logical. */
  readonly type: 'S' | 'I' | 'R' | 'L';
  readonly count: number;
  /** Field of the row it starts at, from 0. */
  readonly first: number;
}

export interface Properties {
  readonly columns: readonly Column[];
  /** Fields a row must have. */
  readonly fields: number;
  /** What stopped the reading, as a sentence; null when all was read. */
  readonly fault: string | null;
}

/** Fields a row may have at most. */
export const maxColumns = 1000;

/** What holds where a comment line has no `Properties`: a symbol and three coordinates. */
export const plainProperties: Properties = {
  columns: [
    { name: 'species', key: 'species', type: 'S', count: 1, first: 0 },
    { name: 'pos', key: 'pos', type: 'R', count: 3, first: 1 },
  ],
  fields: 4,
  fault: null,
};

/**
 * `name:type:count` triples in any order: types S, I, R, L, any count. Reading stops at the first triple that is not
 * sound, and what stands before it is kept.
 */
export function parseProperties(text: string): Properties {
  const parts = text.trim().split(':', 3 * maxColumns + 1);
  const columns: Column[] = [];
  let fields = 0;
  for (let i = 0; i < parts.length; i += 3) {
    const name = (parts[i] ?? '').trim();
    const type = (parts[i + 1] ?? '').trim().toUpperCase();
    const written = (parts[i + 2] ?? '').trim();
    const fault = tripleFault(name, type, written, fields);
    if (fault !== null) return { columns, fields, fault };
    const count = Number(written);
    columns.push({ name, key: name.toLowerCase(), type: type as Column['type'], count, first: fields });
    fields += count;
  }
  return { columns, fields, fault: null };
}

function tripleFault(name: string, type: string, count: string, fieldsBefore: number): string | null {
  const shown = `${name}:${type}:${count}`.slice(0, 60);
  if (name === '') return `An entry of Properties has no name ("${shown}").`;
  if (!/^[SIRL]$/.test(type))
    return `Properties names the type "${type.slice(0, 20)}" for ${name.slice(0, 40)}.`;
  if (!/^\+?\d{1,9}$/.test(count) || Number(count) < 1) {
    return `Properties gives "${count.slice(0, 20)}" as the number of fields of ${name.slice(0, 40)}.`;
  }
  if (fieldsBefore + Number(count) > maxColumns) {
    return `Properties asks for ${fieldsBefore + Number(count)} fields a row with ${name.slice(0, 40)}; at most ${maxColumns} are read.`;
  }
  return null;
}
