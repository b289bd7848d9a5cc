import { countOf } from '#src/base/count-of.ts';
import { ProblemLog } from '#src/base/problem.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import type { FoundGroup, FoundText } from '#src/readers/text/found-text.ts';
import { parseCommonArguments } from '../arguments.ts';
import { findJson } from '../find-json.ts';
import type { CommandIo } from '../io.ts';
import { problemLine, statusOf } from '../print-problems.ts';
import { sourceOf } from '../read-files.ts';
import { textTable } from '../text-table.ts';

const shown = (value: number): string => (Number.isFinite(value) ? String(value).replace('-', '−') : '–');

const componentNames = ['xx', 'xy', 'xz', 'yx', 'yy', 'yz', 'zx', 'zy', 'zz'];

function groupText(group: FoundGroup): string {
  const mark = group.proposed ? 'taken' : group.role;
  const title = `line ${group.line}: ${group.quantity}, ${group.unit}, ${countOf(group.entries.length, 'tensor')}, ${mark}\n  ${group.reason}`;
  if (!group.proposed && group.role !== 'unknown') return title;
  const rows = group.entries.map(({ label, line, tensor, matched }) => [
    label ?? '–',
    String(line),
    ...tensor.map(shown),
    matched.length === 0 ? '–' : [...new Set(matched.map(({ kind }) => kind))].join(' '),
  ]);
  return `${title}\n${textTable(['atom', 'line', ...componentNames, 'proved by'], rows)}`;
}

function readable({ file, groups, structures }: FoundText): string {
  const cells = structures.map(({ line, atoms, lattice }) => {
    const cell = lattice ? `cell of ${lattice.volume.toFixed(2)} Å³` : 'no cell';
    return `line ${line}: structure, ${countOf(atoms.length, 'atom')}, ${cell}`;
  });
  return [file, ...cells, ...groups.map(groupText)].join('\n\n');
}

/** `ellipsite find FILE… [--json]`: the tensors and structures that stand in any text, and why they were taken for that. */
export async function findCommand(argv: readonly string[], io: CommandIo): Promise<number> {
  const { files, json } = parseCommonArguments(argv);
  const log = new ProblemLog();
  const found: FoundText[] = [];
  for (const path of files) {
    const { source, problems } = await sourceOf(path, io);
    problems.forEach((one) => log.push(one));
    if (!source) continue;
    const text = findInText(source);
    text.problems.forEach((one) => log.push(one));
    found.push(text);
  }
  const problems = log.list();
  if (json) {
    const whole: FoundText = {
      file: files.join(', '),
      groups: found.flatMap(({ groups }) => groups),
      structures: found.flatMap(({ structures }) => structures),
      problems,
    };
    io.writeOut(`${JSON.stringify(findJson(whole), null, 1)}\n`);
  } else {
    problems.forEach((one) => io.writeError(`${problemLine(one)}\n`));
    io.writeOut(`${found.map(readable).join('\n\n')}\n`);
  }
  return statusOf(problems);
}
