import type { Problem } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { LineFinder, TextLine } from './text-line.ts';

const quick = /converg|finish|terminat|abort|exceed|reached|incomplete|interrupt/i;

const unfinished = [
  /\b(?:not|no|never|without|isn't|hasn't|un)[\s-]*(?:yet\s+)?(?:been\s+|be\s+|fully\s+|reach(?:ed)?\s+|achieve[d]?\s+|self-consisten\w*\s+)?converg\w*/i,
  /converg\w*\s+(?:is\s+|was\s+|has\s+|criteri\w+\s+)?(?:not|failed|failure|never)\b/i,
  /fail(?:ed|s|ure)?\s+to\s+(?:reach\s+)?converg\w*/i,
  /(?:maximum|max\.?)\s+(?:number|no\.?)\s+of\s+(?:\w+\s+){0,3}(?:steps|iterations|cycles)\s+(?:was |has been |is )?(?:reached|exceeded)/i,
  /\b(?:calculation|run|job|optimi[sz]ation|relaxation)\s+(?:was\s+|is\s+|has\s+been\s+)?(?:not\s+(?:finished|complete\w*)|incomplete|aborted|interrupted|terminated)/i,
  /\b(?:time|wall\s*time)\s+limit\s+(?:was\s+)?(?:reached|exceeded)/i,
];
/** Questions, settings and answers in the negative that hold the same words. */
const harmless =
  /\bif\b[^.]*\bnot\s+converg|not\s+converged?\s*[:=]\s*(?:no|none|f(?:alse)?|0)\b|[:=]\s*(?:none|no|0|false)\s*$|\bno\s+unconverged\b|\bnumber of unconverged\D+0\s*$/i;

/** False where no line of these words can say that a run did not end well. */
export function mayBeUnfinished(text: string): boolean {
  return quick.test(text);
}

/** Lines that say that a run did not end well, as warnings with their place. */
export function unfinishedFinder(file: string): LineFinder<Problem[]> {
  const log = new ProblemLog();
  return {
    take({ text, number, shaped }: TextLine): void {
      if (shaped?.shape.mayBeUnfinished === false) return;
      if (text.length > 400 || !quick.test(text)) return;
      if (!unfinished.some((pattern) => pattern.test(text)) || harmless.test(text)) return;
      const said = text.trim().slice(0, 120);
      log.add('warning', 'find-unfinished', `Line ${number} says that the run did not end well: “${said}”.`, {
        place: { file, line: number },
        got: said,
        allowed: 'a run that reached its aim',
        hint: 'Tensors of an unfinished run can be wrong by several ppm: repeat it with more steps, or read them with care.',
      });
    },
    finish(): Problem[] {
      return log.list();
    },
  };
}
