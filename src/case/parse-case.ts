import { countOf } from '#src/base/count-of.ts';
import type { Problem, ProblemDetails, Severity } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { CaseDocument } from './case-document.ts';
import { caseSchema, caseVersion } from './case-document.ts';
import { publishedSchema } from './case-schema.ts';
import { completeCase } from './complete-case.ts';
import type { JsonPath, SchemaFault } from './json-schema.ts';
import { isObject, schemaFaults } from './json-schema.ts';
import { jsonFault, offsetOfPath, placeInText } from './json-text.ts';
import type { Migration } from './migrate-case.ts';
import { migrated, migrations } from './migrate-case.ts';
import { sha256 } from './sha256.ts';

export interface ParsedCase {
  /** null where the file can't be opened; the problems say why. */
  readonly case: CaseDocument | null;
  readonly problems: readonly Problem[];
}

export interface ParseOptions {
  /** Name of the file, for the places of problems. */
  readonly name?: string;
  /** For tests of older versions. */
  readonly steps?: Readonly<Record<number, Migration>>;
  readonly lowestVersion?: number;
}

/** Characters of a case file that are read; what it holds is limited by the readers as well. */
export const mostCaseCharacters = 300_000_000;

/**
 * Reads the text of a case file: JSON, version, schema, hashes. Sources and decisions that change numbers must be right
 * as a whole; a wrong view (colour, camera, saved view …) falls back to its default with a warning; keys that aren't known are
 * left out with a note. Never rejects.
 *
 * Reports `case-too-large`, `case-not-json`, `case-not-ours`, `case-version`, `case-newer`, `case-invalid`,
 * `case-view-dropped`, `case-unknown-key`, `case-text-changed`.
 */
export async function parseCase(text: string, options: ParseOptions = {}): Promise<ParsedCase> {
  const reading = new CaseReading(text, options.name ?? 'case');
  const document = reading.document();
  const current = document && reading.current(document, options);
  const checked = current && reading.checked(current);
  const whole = checked && completeCase(checked, publishedSchema);
  if (whole) await reading.compareHashes(whole);
  return { case: whole, problems: reading.log.list() };
}

type Members = Readonly<Record<string, unknown>>;

/** Times the views are looked through; each time up to 20 wrong values are dropped. */
const mostRounds = 5;
/** Faults that are looked for in the text; each may cost a pass over it. */
const mostPlaces = 20;

class CaseReading {
  readonly log = new ProblemLog();
  readonly #text: string;
  readonly #name: string;
  #places = 0;

  constructor(text: string, name: string) {
    this.#text = text;
    this.#name = name;
  }

  document(): Members | null {
    const length = this.#text.length;
    if (length > mostCaseCharacters) {
      return this.#refuse('case-too-large', `${this.#name} is larger than what is read of a case file.`, {
        got: `${length} characters`,
        allowed: `at most ${mostCaseCharacters} characters`,
        hint: 'Open the files it was made of instead.',
      });
    }
    let parsed: unknown;
    try {
      parsed = JSON.parse(this.#text.charCodeAt(0) === 0xfeff ? this.#text.slice(1) : this.#text);
    } catch {
      return this.#notJson();
    }
    if (isObject(parsed) && parsed['schema'] === caseSchema) return parsed;
    return this.#refuse('case-not-ours', `${this.#name} is JSON, but not a case file of Ellipsite.`, {
      place: this.#place([]),
      got: isObject(parsed) ? `"schema": ${JSON.stringify(parsed['schema'])}` : 'no object',
      allowed: `"schema": "${caseSchema}"`,
    });
  }

  /** The document in the form of the present version. */
  current(document: Members, options: ParseOptions): Members | null {
    const { version } = document;
    const { steps = migrations, lowestVersion = 1 } = options;
    const place = this.#place(['version']);
    if (typeof version !== 'number' || !Number.isInteger(version) || version < lowestVersion) {
      return this.#refuse('case-version', `${this.#name} doesn't say which version of a case file it is.`, {
        place,
        got: JSON.stringify(version) ?? 'no version',
        allowed: `${lowestVersion} to ${caseVersion}`,
      });
    }
    if (version > caseVersion) {
      return this.#refuse(
        'case-newer',
        `${this.#name} is a case file of version ${version}; this Ellipsite reads up to version ${caseVersion}.`,
        {
          place,
          got: String(version),
          allowed: `up to ${caseVersion}`,
          hint: 'Open it in a newer Ellipsite.',
        },
      );
    }
    const held = migrated(document, version, caseVersion, steps);
    if (held) return held;
    const message = `${this.#name} is of version ${version}, from which no way leads to version ${caseVersion}.`;
    return this.#refuse('case-version', message, { place, got: String(version) });
  }

  /** The document without what is wrong in its views; null where something else is wrong. */
  checked(document: Members): Members | null {
    let held: Members = document;
    // Dropping a value can bring the next fault to light: at most a few are listed at a time.
    for (let round = 0; round < mostRounds; round++) {
      const faults = schemaFaults(held, publishedSchema);
      const wrong = faults.filter(({ kind }) => kind === 'invalid');
      const fatal = wrong.filter(({ path }) => removable(path) === null);
      if (fatal.length > 0) return this.#invalid(fatal);
      if (wrong.length === 0) {
        faults.forEach((fault) => this.#noteUnknown(fault));
        return this.#withSoundIndices(held);
      }
      const views = new Map(wrong.map((fault) => [removable(fault.path)!.join('.'), fault]));
      for (const fault of views.values()) this.#noteDropped(fault);
      held = without(
        held,
        [...views.values()].map(({ path }) => removable(path)!),
      );
    }
    const message = `${this.#name} holds more wrong values than are looked for.`;
    return this.#refuse('case-invalid', message, { hint: 'It was damaged or not written by Ellipsite.' });
  }

  async compareHashes({ sources }: CaseDocument): Promise<void> {
    for (const { name, sha256: stated, text } of sources) {
      const found = await sha256(text);
      if (found === stated) continue;
      this.#add(
        'warning',
        'case-text-changed',
        `The text of ${name} was changed since the case was saved; the changed text is used.`,
        {
          place: { file: name, line: 1 },
          got: `SHA-256 ${found}`,
          allowed: `SHA-256 ${stated}`,
          hint: 'Compare it with the original file. Saving the case again takes the changed text as it is.',
        },
      );
    }
  }

  /** Decisions name sources by number: each number must have its source. */
  #withSoundIndices(document: Members): Members | null {
    const count = (document['sources'] as readonly unknown[]).length;
    const { structure, accepted = [] } = (document['decisions'] ?? {}) as {
      readonly structure?: { readonly source: number } | null;
      readonly accepted?: readonly { readonly source: number }[];
    };
    const stated: readonly (readonly [JsonPath, number])[] = [
      ...(structure ? [[['decisions', 'structure', 'source'], structure.source] as const] : []),
      ...accepted.map(({ source }, i) => [['decisions', 'accepted', i, 'source'], source] as const),
    ];
    const beyond = stated.filter(([, source]) => source >= count);
    if (beyond.length === 0) return document;
    const allowed = `0 to ${count - 1}, there being ${countOf(count, 'source')}`;
    return this.#invalid(beyond.map(([path, got]) => ({ path, kind: 'invalid', got: String(got), allowed })));
  }

  #notJson(): null {
    const fault = jsonFault(this.#text) ?? { offset: this.#text.length, expected: 'JSON' };
    const isCut = this.#text.slice(fault.offset).trim() === '' || fault.offset >= this.#text.length;
    const place = { file: this.#name, ...placeInText(this.#text, fault.offset) };
    const got = isCut
      ? 'the end of the file'
      : JSON.stringify(this.#text.slice(fault.offset, fault.offset + 20));
    const what = isCut ? 'ends too early' : 'is not JSON';
    return this.#refuse(
      'case-not-json',
      `The case file ${what}: in line ${place.line}, column ${place.column} there should be ${fault.expected}.`,
      {
        place,
        got,
        allowed: fault.expected,
        hint: isCut
          ? 'It was cut off on its way; fetch or copy it again.'
          : 'It was damaged or edited by hand; compare it with another copy.',
      },
    );
  }

  #invalid(faults: readonly SchemaFault[]): null {
    for (const { path, got, allowed } of faults) {
      this.#add('error', 'case-invalid', `${inWords(path)} of the case file can't be used.`, {
        place: this.#place(path),
        got,
        allowed,
        hint: 'It was edited or damaged; nothing was opened, so that no number is silently another.',
      });
    }
    return null;
  }

  #noteDropped({ path, got, allowed }: SchemaFault): void {
    const message = `${inWords(path)} of the case file can't be used; its default was taken.`;
    this.#add('warning', 'case-view-dropped', message, { place: this.#place(path), got, allowed });
  }

  #noteUnknown({ path, got, allowed }: SchemaFault): void {
    const message = `${inWords(path)} of the case file is not known here; it is left out and not saved again.`;
    this.#add('note', 'case-unknown-key', message, { place: this.#place(path), got, allowed });
  }

  #place(path: JsonPath): { file: string; line: number; column: number } {
    if (++this.#places > mostPlaces) return { file: this.#name, line: 1, column: 1 };
    const offset = offsetOfPath(this.#text, path) ?? offsetOfPath(this.#text, path.slice(0, -1)) ?? 0;
    return { file: this.#name, ...placeInText(this.#text, offset) };
  }

  #refuse(code: string, message: string, details: ProblemDetails): null {
    this.#add('error', code, message, details);
    return null;
  }

  #add(severity: Severity, code: string, message: string, details: ProblemDetails): void {
    this.log.add(severity, code, message, details);
  }
}

function inWords(path: JsonPath): string {
  return path.length === 0 ? 'The whole' : path.join('.');
}

/** The part of the views that goes when something at the path is wrong; null where nothing may go. */
function removable(path: JsonPath): JsonPath | null {
  if (path[0] !== 'views') return null;
  const isWhole = path[1] === undefined || path[1] === 'camera';
  return path.slice(0, isWhole ? 2 : 3);
}

/** A copy without the values at the given paths; of a list, its items. */
function without(document: Members, paths: readonly JsonPath[]): Members {
  return removed(document, paths) as Members;
}

function removed(value: unknown, paths: readonly JsonPath[]): unknown {
  const at = (key: string | number): readonly JsonPath[] =>
    paths.filter(([first]) => first === key).map((path) => path.slice(1));
  const goes = (below: readonly JsonPath[]): boolean => below.some((path) => path.length === 0);
  if (Array.isArray(value)) {
    return value.flatMap((item, i) => (goes(at(i)) ? [] : [removed(item, at(i))]));
  }
  if (paths.length === 0 || !isObject(value)) return value;
  return Object.fromEntries(
    Object.entries(value).flatMap(([key, held]) => (goes(at(key)) ? [] : [[key, removed(held, at(key))]])),
  );
}
