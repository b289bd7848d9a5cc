/** Keyword of the iTXt chunk of a PNG that holds the text of a case file. */
export const caseKeyword = 'ellipsite-case';
