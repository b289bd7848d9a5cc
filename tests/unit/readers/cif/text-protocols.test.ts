import { describe, expect, it } from 'vitest';
import { textFieldContent } from '#src/readers/cif/text-protocols.ts';

describe('textFieldContent', () => {
  it.each([
    ['plain\ntext', 'plain\ntext'],
    ['', ''],
    ['\n indented', '\n indented'],
    ['a\r\nb\rc', 'a\nb\nc'],
    ['\\\nlong \\\nline\nnext', 'long line\nnext'],
    ['\\  \nlong \\ \t\nline', 'long line'],
    ['\\\nC:\\dir\\\\\n\nx', 'C:\\dir\\\nx'],
    ['\\', ''],
    ['\\\nend\\', 'end'],
    ['>\\\n>;\n>x', ';\nx'],
    ['> \\ \n> a\n> ', 'a\n'],
    ['>\\\\\n>one \\\n>two', 'one two'],
    ['>\\\n>a\nb', '>\\\n>a\nb'],
    ['C:\\', 'C:\\'],
    ['\\\\\na\\\nb', '\\\\\na\\\nb'],
    ['x\\\\\\\nx', 'x\\\\\\\nx'],
    ['first\nlast \\', 'first\nlast \\'],
  ])('%j is %j', (raw, text) => expect(textFieldContent(raw)).toBe(text));
});
