import type { CifLexer, TokenKind, ValueRun } from './lexer.ts';
import { recoverField } from './text-field.ts';

/**
 * In a loop whose values do not fill its rows or that ends in an open text field: the first text field that runs over names was most
 * likely never closed. It is ended there and reading goes back; gives the next token, or `null` where no such field is. Going back is
 * bounded.
 */
export function reopenField(lexer: CifLexer, run: ValueRun): TokenKind | null {
  if (lexer.charactersInVain > lexer.text.length) return null;
  for (const { index, offset, end } of run.fields) {
    const shorter = recoverField(lexer, offset, end);
    if (!shorter) continue;
    lexer.charactersInVain += lexer.position - lexer.end;
    lexer.position = lexer.end;
    run.count = index + 1;
    if (run.values) {
      run.values.length = index;
      run.values.push(shorter);
    }
    return lexer.next();
  }
  return null;
}
