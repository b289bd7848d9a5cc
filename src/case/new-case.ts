import { defaultSettings } from '#src/dossier/default-settings.ts';
import { defaultLook } from '#src/scene/look.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import { defaultTable } from '#src/table/table-settings.ts';
import type { CaseDecisions, CaseDocument, CaseSource, CaseViews } from './case-document.ts';
import { caseSchema, caseVersion } from './case-document.ts';
import { sha256 } from './sha256.ts';

export const defaultCaseDecisions: CaseDecisions = {
  structure: null,
  settings: defaultSettings,
  accepted: [],
  textChoices: [],
};

export const defaultCaseViews: CaseViews = {
  picture: defaultSceneOptions,
  camera: null,
  look: defaultLook,
  saved: [],
  measurements: [],
  table: defaultTable,
};

export interface NewCase {
  readonly title: string;
  readonly sources: readonly Pick<CaseSource, 'name' | 'text'>[];
  readonly decisions?: Partial<CaseDecisions>;
  readonly views?: Partial<CaseViews>;
}

/** A case of texts and decisions, with the hash of every text; what isn't given takes its default. */
export async function newCase({ title, sources, decisions, views }: NewCase): Promise<CaseDocument> {
  return {
    schema: caseSchema,
    version: caseVersion,
    title,
    decisions: { ...defaultCaseDecisions, ...decisions },
    views: { ...defaultCaseViews, ...views },
    sources: await Promise.all(
      sources.map(async ({ name, text }) => ({ name, sha256: await sha256(text), text })),
    ),
  };
}
