import type { Shown, ShownBlock } from './cif-syntax.ts';

/** A production of a grammar with a text it allows and one it does not, and what each is read as. */
export interface GrammarRow {
  readonly production: string;
  readonly good: { readonly text: string; readonly blocks: readonly ShownBlock[] };
  readonly bad: { readonly text: string; readonly code: string; readonly blocks: readonly ShownBlock[] };
}

export function row(
  production: string,
  [goodText, goodBlocks]: readonly [string, readonly ShownBlock[]],
  [badText, code, badBlocks]: readonly [string, string, readonly ShownBlock[]],
): GrammarRow {
  return {
    production,
    good: { text: goodText, blocks: goodBlocks },
    bad: { text: badText, code, blocks: badBlocks },
  };
}

export function block(
  name: string,
  items: ShownBlock['items'] = {},
  loops: ShownBlock['loops'] = [],
): ShownBlock {
  return { name, items, loops };
}

export function loop(
  names: readonly string[],
  ...rows: readonly (readonly Shown[])[]
): ShownBlock['loops'][0] {
  return { names, rows };
}

export function withFrames(outer: ShownBlock, ...frames: readonly ShownBlock[]): ShownBlock {
  return { ...outer, frames };
}
