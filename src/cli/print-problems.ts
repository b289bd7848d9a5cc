import type { Problem } from '#src/base/problem.ts';

/** `file:line:column: severity CODE message (got …; allowed …) hint`, parts that are unknown left out. */
export function problemLine(found: Problem): string {
  const place = [found.file, found.line, found.column].filter((part) => part !== null).join(':');
  const facts = [
    found.got === null ? null : `got ${found.got}`,
    found.allowed === null ? null : `allowed ${found.allowed}`,
  ].filter((fact) => fact !== null);
  const tail = facts.length > 0 ? ` (${facts.join('; ')})` : '';
  const hint = found.hint === null ? '' : ` ${found.hint}`;
  const line = `${place === '' ? 'ellipsite' : place}: ${found.severity} ${found.code} ${found.message}${tail}${hint}`;
  return line.replaceAll(/[\r\n]+/g, ' ');
}

/** 1 when any problem is an error, else 0. */
export function statusOf(problems: readonly Problem[]): 0 | 1 {
  return problems.some(({ severity }) => severity === 'error') ? 1 : 0;
}
