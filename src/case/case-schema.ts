import type { JsonSchema } from './json-schema.ts';
import published from './case.schema.json';

/** The published JSON Schema of case files; the one description of the format: checking and key order follow it. */
export const publishedSchema: JsonSchema = published;
