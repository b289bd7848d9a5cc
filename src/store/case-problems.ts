import type { Problem } from '#src/base/problem.ts';
import { problem } from '#src/base/problem.ts';
import type { FileInput } from './file-input.ts';

/** Said where a case file comes with another one, or is to be added to a crystal. */
export function oneCaseOnly(cases: readonly FileInput[]): Problem {
  return problem('error', 'case-not-alone', 'A case file is opened on its own; nothing was opened.', {
    got: cases.map(({ name }) => name).join(', '),
    allowed: 'one case file by Open, further files of tensors beside it',
    hint: 'Open it by itself, or take the structure and tensor files instead.',
  });
}

/** Said where kept work ended the page each time it was brought back. */
export function workLeftAside(): Problem {
  return problem(
    'warning',
    'work-left-aside',
    'The work kept in this browser could not be brought back, twice; it is left aside.',
    {
      hint: 'Open its files, or the case you saved. It stays in the browser until newer work needs its place.',
    },
  );
}

/** Said where a case file could not be read from the disk, or took more memory than there is. */
export function caseUnreadable(name: string, error: unknown): Problem {
  const got = error instanceof Error ? error.message : String(error);
  return problem('error', 'file-unreadable', `${name} could not be read.`, {
    got,
    hint: 'It may have been moved or changed since, or be too large for this machine. Choose it again.',
  });
}

/** Said where the case could not be written into a file. */
export function notSaved(error: unknown): Problem {
  const message = error instanceof Error ? error.message : String(error);
  return problem('error', 'case-not-saved', `The case could not be saved: ${message}`, {
    hint: 'A file of it may have been moved or changed since it was opened; open it again.',
  });
}
