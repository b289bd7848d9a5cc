/** What a UTF-16 unit means to the lexer. Blank classes come first, so that `class > lineEnd` asks for a visible character. */
export const charClass = {
  blank: 1,
  lineEnd: 2,
  ordinary: 3,
  hash: 4,
  underscore: 5,
  quote: 6,
  semicolon: 7,
  /** First letter of a reserved word: d, s, l, g in either case. */
  keyword: 8,
  /** `?` or `.`, special when it stands alone. */
  special: 9,
  dollar: 10,
  openBracket: 11,
  closeBracket: 12,
} as const;

/** Indexed by UTF-16 unit, so that one look-up classes any character. */
export type CharTable = Uint8Array;

function buildTable(noBreakSpaceIsBlank: boolean): CharTable {
  const table = new Uint8Array(65536).fill(charClass.ordinary);
  table.fill(charClass.blank, 0, 33);
  const classes: [string, number][] = [
    ['\n\r', charClass.lineEnd],
    ['\u007f\ufeff', charClass.blank],
    ['#', charClass.hash],
    ['_', charClass.underscore],
    ['"\'', charClass.quote],
    [';', charClass.semicolon],
    ['dDsSlLgG', charClass.keyword],
    ['?.', charClass.special],
    ['$', charClass.dollar],
    ['[{', charClass.openBracket],
    [']}', charClass.closeBracket],
  ];
  if (noBreakSpaceIsBlank) classes.push(['\u00a0', charClass.blank]);
  for (const [characters, kind] of classes)
    for (const character of characters) table[character.charCodeAt(0)] = kind;
  return table;
}

/**
 * CIF 1.1 knows space, tab and line ends only; the other control characters, a byte order mark inside the text
 * and, in 1.1, the no-break space are read as blanks too (and reported once), since files use them so.
 */
export const charTables: Readonly<Record<'1.1' | '2.0', CharTable>> = {
  '1.1': buildTable(true),
  '2.0': buildTable(false),
};

/** UTF-16 units that are compared one by one. */
export const code = {
  lineFeed: 10,
  carriageReturn: 13,
  doubleQuote: 34,
  singleQuote: 39,
  comma: 44,
  colon: 58,
  semicolon: 59,
  questionMark: 63,
  underscore: 95,
} as const;
