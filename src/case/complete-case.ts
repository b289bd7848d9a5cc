import type { CaseDecisions, CaseDocument, CaseSource, CaseViews } from './case-document.ts';
import { caseSchema, caseVersion } from './case-document.ts';
import { defaultCaseDecisions, defaultCaseViews } from './new-case.ts';
import type { JsonSchema } from './json-schema.ts';
import { isObject, matchingForm, resolved } from './json-schema.ts';

/** A checked document with a default for every key that is missing and without keys the schema doesn't know. */
export function completeCase(checked: Readonly<Record<string, unknown>>, schema: JsonSchema): CaseDocument {
  const known = onlyKnown(checked, schema, schema) as Partial<CaseDocument>;
  const decisions: Partial<CaseDecisions> = known.decisions ?? {};
  const views: Partial<CaseViews> = known.views ?? {};
  const plain = defaultCaseViews;
  return {
    schema: caseSchema,
    version: caseVersion,
    title: known.title ?? known.sources?.[0]?.name ?? '',
    decisions: {
      ...defaultCaseDecisions,
      ...decisions,
      settings: { ...defaultCaseDecisions.settings, ...decisions.settings },
    },
    views: {
      ...plain,
      ...views,
      picture: { ...plain.picture, ...views.picture },
      look: { ...plain.look, ...views.look },
      table: { ...plain.table, ...views.table },
      saved: (views.saved ?? []).map((view) => ({
        ...view,
        picture: { ...plain.picture, ...view.picture },
        look: { ...plain.look, ...view.look },
      })),
    },
    sources: known.sources as readonly CaseSource[],
  };
}

function onlyKnown(value: unknown, given: JsonSchema, root: JsonSchema): unknown {
  if (value === null || typeof value !== 'object') return value;
  const schema = matchingForm(value, resolved(given, root), root);
  if (Array.isArray(value)) return value.map((item) => onlyKnown(item, schema.items ?? {}, root));
  if (!isObject(value)) return value;
  const { properties, additionalProperties } = schema;
  const entries = Object.entries(value).flatMap(([key, held]) => {
    const own = properties && Object.hasOwn(properties, key) ? properties[key] : additionalProperties;
    return own ? [[key, onlyKnown(held, own, root)] as const] : [];
  });
  return Object.fromEntries(entries);
}
