/** The keywords of JSON Schema (draft 2020-12) that the schema of case files uses; others would be ignored. */
export interface JsonSchema {
  readonly $ref?: string;
  readonly $defs?: Readonly<Record<string, JsonSchema>>;
  readonly type?: string | readonly string[];
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly anyOf?: readonly JsonSchema[];
  readonly minimum?: number;
  readonly maximum?: number;
  readonly exclusiveMinimum?: number;
  readonly exclusiveMaximum?: number;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly pattern?: string;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly items?: JsonSchema;
  readonly maxProperties?: number;
  readonly required?: readonly string[];
  readonly properties?: Readonly<Record<string, JsonSchema>>;
  readonly additionalProperties?: JsonSchema;
}

/** Keys and indices from the root to a value. */
export type JsonPath = readonly (string | number)[];

export interface SchemaFault {
  readonly path: JsonPath;
  /** `unknown` names a key the schema doesn't have; it breaks no rule. */
  readonly kind: 'invalid' | 'unknown';
  readonly got: string;
  readonly allowed: string;
}

/** Faults reported at most; a hostile file has as many as it likes. */
const mostFaults = 20;

/** A `#/$defs/…` reference replaced by what it names. */
export function resolved(schema: JsonSchema, root: JsonSchema): JsonSchema {
  const name = schema.$ref?.replace('#/$defs/', '');
  return name === undefined ? schema : (root.$defs?.[name] ?? {});
}

export function typeOf(value: unknown): string {
  if (value === null) return 'null';
  if (Array.isArray(value)) return 'array';
  return typeof value;
}

export function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeOf(value) === 'object';
}

/** Everything in which a value departs from its schema, at most 20 faults, in the order of the value. */
export function schemaFaults(value: unknown, root: JsonSchema): SchemaFault[] {
  const faults: SchemaFault[] = [];
  check(value, root, { root, path: [], faults });
  return faults.slice(0, mostFaults);
}

/** The first form of an `anyOf` that the value has; the schema itself where it has none. */
export function matchingForm(value: unknown, schema: JsonSchema, root: JsonSchema): JsonSchema {
  const plain = resolved(schema, root);
  const form = plain.anyOf?.find((one) => isFormOf(value, one, root));
  return form ? matchingForm(value, form, root) : plain;
}

interface Walk {
  readonly root: JsonSchema;
  readonly path: JsonPath;
  readonly faults: SchemaFault[];
}

function isFormOf(value: unknown, schema: JsonSchema, root: JsonSchema): boolean {
  const faults: SchemaFault[] = [];
  check(value, schema, { root, path: [], faults });
  return faults.every(({ kind }) => kind === 'unknown');
}

function check(value: unknown, given: JsonSchema, walk: Walk): void {
  if (walk.faults.length >= mostFaults) return;
  const plain = resolved(given, walk.root);
  if (plain.anyOf) {
    const form = plain.anyOf.find((one) => isFormOf(value, one, walk.root));
    if (form) check(value, form, walk);
    else fault(walk, value, plain.anyOf.map((one) => inWords(resolved(one, walk.root))).join(', or '));
    return;
  }
  if (!fitsScalar(value, plain)) {
    fault(walk, value, inWords(plain));
    return;
  }
  if (Array.isArray(value)) checkItems(value, plain, walk);
  else if (isObject(value)) checkKeys(value, plain, walk);
}

function checkItems(value: readonly unknown[], { items }: JsonSchema, walk: Walk): void {
  if (!items) return;
  for (let i = 0; i < value.length && walk.faults.length < mostFaults; i++) {
    check(value[i], items, { ...walk, path: [...walk.path, i] });
  }
}

function checkKeys(value: Readonly<Record<string, unknown>>, schema: JsonSchema, walk: Walk): void {
  for (const key of schema.required ?? []) {
    if (!Object.hasOwn(value, key)) fault(walk, value, `an object with ${key}`, `no ${key}`);
  }
  for (const [key, held] of Object.entries(value)) {
    const known = schema.properties && Object.hasOwn(schema.properties, key);
    const own = known ? schema.properties?.[key] : schema.additionalProperties;
    const path = [...walk.path, key];
    if (own) check(held, own, { ...walk, path });
    else if (schema.properties && walk.faults.length < mostFaults) {
      const allowed = Object.keys(schema.properties).join(', ');
      walk.faults.push({ path, kind: 'unknown', got: key, allowed });
    }
  }
}

function fitsScalar(value: unknown, schema: JsonSchema): boolean {
  if ('const' in schema && value !== schema.const) return false;
  if (schema.enum && !schema.enum.includes(value)) return false;
  if (!hasType(value, schema.type)) return false;
  if (typeof value === 'number') return fitsNumber(value, schema);
  if (typeof value === 'string') {
    const { minLength = 0, maxLength = Infinity, pattern } = schema;
    const isLong = value.length >= minLength && value.length <= maxLength;
    return isLong && (pattern === undefined || new RegExp(pattern, 'u').test(value));
  }
  if (Array.isArray(value)) {
    return value.length >= (schema.minItems ?? 0) && value.length <= (schema.maxItems ?? Infinity);
  }
  return !isObject(value) || Object.keys(value).length <= (schema.maxProperties ?? Infinity);
}

function fitsNumber(value: number, schema: JsonSchema): boolean {
  return (
    value >= (schema.minimum ?? -Infinity) &&
    value <= (schema.maximum ?? Infinity) &&
    value > (schema.exclusiveMinimum ?? -Infinity) &&
    value < (schema.exclusiveMaximum ?? Infinity)
  );
}

function hasType(value: unknown, types: JsonSchema['type']): boolean {
  if (types === undefined) return true;
  const own = typeOf(value);
  const isOf = (type: string): boolean =>
    type === own || (type === 'integer' && own === 'number' && Number.isInteger(value));
  return typeof types === 'string' ? isOf(types) : types.some(isOf);
}

function fault(walk: Walk, value: unknown, allowed: string, got = shortly(value)): void {
  if (walk.faults.length < mostFaults) walk.faults.push({ path: walk.path, kind: 'invalid', got, allowed });
}

/** A value as it can stand in a sentence. */
function shortly(value: unknown): string {
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (isObject(value)) return `an object of ${Object.keys(value).slice(0, 5).join(', ') || 'no keys'}`;
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}

/** What a schema allows, in words. */
function inWords(schema: JsonSchema): string {
  if ('const' in schema) return JSON.stringify(schema.const);
  if (schema.enum) return schema.enum.map((one) => JSON.stringify(one)).join(', ');
  const { minimum, maximum, exclusiveMinimum, exclusiveMaximum } = schema;
  const bounds = [
    minimum === undefined ? '' : `≥ ${minimum}`,
    exclusiveMinimum === undefined ? '' : `> ${exclusiveMinimum}`,
    maximum === undefined ? '' : `≤ ${maximum}`,
    exclusiveMaximum === undefined ? '' : `< ${exclusiveMaximum}`,
    schema.maxLength === undefined ? '' : `of at most ${schema.maxLength} characters`,
    schema.pattern === undefined ? '' : `of the form ${schema.pattern}`,
    itemsInWords(schema),
    schema.required ? `with ${schema.required.join(', ')}` : '',
  ].filter((words) => words !== '');
  const { type = 'anything' } = schema;
  return [typeof type === 'string' ? type : type.join(' or '), ...bounds].join(' ');
}

function itemsInWords({ minItems, maxItems }: JsonSchema): string {
  if (maxItems === undefined) return '';
  return minItems === maxItems ? `of ${maxItems}` : `of at most ${maxItems}`;
}
