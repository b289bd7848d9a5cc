import type { Mat3 } from '#src/base/matrix3.ts';
import { inventTensors } from './samples/invent-tensors.ts';
import { rowsAlongX, rowsAlongZ, turnedRows } from './samples/plain-crystal.ts';
import type { PublishedStructure } from './samples/published-structures.ts';
import { publishedStructures } from './samples/published-structures.ts';
import { cifSample, xyzTwin } from './samples/write-sample.ts';

interface Frames {
  readonly rows: Mat3;
  readonly frame: string;
  /** The twin is written in another frame, so that both must be read right for the two to agree. */
  readonly twinRows: Mat3;
}

const alongX = 'a along x, b in the xy plane';
const alongZ = 'c along z, b in the yz plane';

function framesOf({ id, cell }: PublishedStructure): Frames {
  if (id === 'drum-1-quartz') return { rows: rowsAlongX(cell), frame: alongX, twinRows: rowsAlongZ(cell) };
  if (id === 'drum-2-diopside') return { rows: rowsAlongZ(cell), frame: alongZ, twinRows: rowsAlongX(cell) };
  return { rows: rowsAlongX(cell), frame: alongX, twinRows: turnedRows(rowsAlongX(cell), [1, 2, 3], 40) };
}

/** The generated files of `samples/` by name: three crystals as CIF, their twins as extended XYZ, and the index. */
export function makeSamples(): Map<string, string> {
  const files = new Map<string, string>();
  publishedStructures.forEach((structure, number) => {
    const { rows, frame, twinRows } = framesOf(structure);
    const tensors = inventTensors(structure, rows, 1000 + number);
    files.set(`${structure.id}.cif`, cifSample(structure, tensors, rows, frame));
    files.set(`${structure.id}.xyz`, xyzTwin(structure, tensors, rows, twinRows));
  });
  files.set('index.json', indexText());
  return files;
}

/** What the start page offers, laid out as the formatter would. */
function indexText(): string {
  const cases = publishedStructures.map(({ id, title, sentence }) =>
    [
      '    {',
      `      "id": ${JSON.stringify(id)},`,
      `      "title": ${JSON.stringify(title)},`,
      `      "sentence": ${JSON.stringify(sentence)},`,
      `      "files": [${JSON.stringify(`${id}.cif`)}]`,
      '    }',
    ].join('\n'),
  );
  return `{\n  "cases": [\n${cases.join(',\n')}\n  ]\n}\n`;
}
