/** How much a problem weighs: an error means content was lost, a warning that a repair or doubt stands, a note that a choice was made. */
export type Severity = 'error' | 'warning' | 'note';

/** One thing that was guessed, repaired, dropped or undefined, with its place in the file and what to do about it. */
export interface Problem {
  /** Kebab-case, stable, prefixed by the stage that raised it, such as `cif-missing-value`. */
  readonly code: string;
  readonly severity: Severity;
  /** One plain sentence: what was found and what was done about it. */
  readonly message: string;
  readonly file: string | null;
  /** Counted from 1. */
  readonly line: number | null;
  /** Counted from 1, in characters. */
  readonly column: number | null;
  /** What stood there. */
  readonly got: string | null;
  /** What may stand there. */
  readonly allowed: string | null;
  /** What the user can do. */
  readonly hint: string | null;
}

/** A place in a text that was read; line and column count from 1. */
export interface Place {
  readonly file: string;
  readonly line: number;
  readonly column?: number;
}

export interface ProblemDetails {
  readonly place?: Place | null;
  readonly got?: string | null;
  readonly allowed?: string | null;
  readonly hint?: string | null;
}

/** Builds a problem; whatever is not given becomes `null`. */
export function problem(
  severity: Severity,
  code: string,
  message: string,
  details: ProblemDetails = {},
): Problem {
  const { place = null, got = null, allowed = null, hint = null } = details;
  return {
    code,
    severity,
    message,
    file: place?.file ?? null,
    line: place?.line ?? null,
    column: place?.column ?? null,
    got,
    allowed,
    hint,
  };
}

/** Problems of one kind kept before the rest is only counted. */
const keptPerCode = 50;

/**
 * Collects problems of one reading or derivation. Of one code at most 50 are kept; the rest is counted in a
 * closing note, so that a hostile file cannot flood the user or the memory.
 */
export class ProblemLog {
  readonly #kept: Problem[] = [];
  readonly #counts = new Map<string, number>();

  add(severity: Severity, code: string, message: string, details: ProblemDetails = {}): void {
    this.push(problem(severity, code, message, details));
  }

  push(found: Problem): void {
    const count = (this.#counts.get(found.code) ?? 0) + 1;
    this.#counts.set(found.code, count);
    if (count <= keptPerCode) this.#kept.push(found);
  }

  /** All that was kept, in order, with one note for each code of which more came. */
  list(): Problem[] {
    const more = [...this.#counts]
      .filter(([, count]) => count > keptPerCode)
      .map(([code, count]) =>
        problem(
          'note',
          'more-of-the-same',
          `${code} came ${count} times; the first ${keptPerCode} are listed.`,
        ),
      );
    return [...this.#kept, ...more];
  }
}
