import { countOf } from '#src/base/count-of.ts';
import type { Attachment } from '#src/attach/attachment.ts';
import { beginDossier, wholeDossier } from '#src/dossier/derive-dossier.ts';
import {
  hydrogenLengths,
  implausibleValues,
  shortContacts,
  tensorSanity,
} from '#src/dossier/sound-calculation.ts';
import { parseCommonArguments } from '../arguments.ts';
import { checkJson, compositionCheck, unfinishedRuns } from '../check-json.ts';
import type { Checked } from '../check-json.ts';
import type { CommandIo } from '../io.ts';
import { chooseCase } from '../load-case.ts';
import { problemLine, statusOf } from '../print-problems.ts';
import { fixed, textTable } from '../text-table.ts';

const methods = {
  'same-file': 'they stand in the crystal’s own file',
  geometry: 'every atom was found by its position',
  labels: 'by site labels only: weaker evidence',
  order: 'by order within each element only: weaker evidence',
} as const;

const unitOf = ({ quantity }: Attachment): string => (quantity === 'efg' ? 'a.u.' : 'ppm');

function belonging(one: Attachment): string[] {
  const { mapping } = one;
  const lines = [
    `${one.name}: ${methods[mapping.method]}`,
    `  ${mapping.matched} of ${countOf(mapping.atoms, 'atom')} found` +
      (mapping.unmatched.length > 0 ? `; not found: ${mapping.unmatched.slice(0, 20).join(', ')}` : ''),
  ];
  if (mapping.method === 'geometry') {
    const { maxDisplacement: largest, basis, originShift, strain } = mapping;
    lines.push(
      `  off by ${fixed(mapping.rmsDisplacementAngstrom, 3)} Å rms, at most ${fixed(largest?.value ?? null, 3)} Å (${largest?.label ?? '–'})`,
    );
    if (basis) {
      const rows = [0, 3, 6].map((row) =>
        basis
          .slice(row, row + 3)
          .map((x) => fixed(x, Number.isInteger(x) ? 0 : 3))
          .join(' '),
      );
      lines.push(
        `  its cell is (${rows.join(' / ')}) times the crystal’s, strained by ${fixed((strain ?? 0) * 100, 2)} %`,
      );
    }
    if (originShift)
      lines.push(
        `  origin shift ${originShift.map((x) => fixed(x, 4)).join(', ')}; hand: ${mapping.handedness}`,
      );
  }
  for (const { label, value } of mapping.doubtful)
    lines.push(`  doubtful: ${label} moved by ${fixed(value, 2)} Å`);
  return lines;
}

function frameLines(one: Attachment): string[] {
  const { frame } = one;
  if (!frame || frame.frames.length === 0) return [];
  const verdict = frame.decided
    ? {
        lattice: 'the lattice that came with them',
        positions: 'their positions',
        user: 'your choice',
        symmetry: 'symmetry: no other named setting obeys it',
        nothing: '',
      }[frame.by]
    : 'UNDECIDED: choose with --frame; until then orientations are not to be trusted';
  const rows = frame.frames.map(({ name, rotationDegrees, residual, relative, verdict: told }) => [
    name,
    fixed(rotationDegrees, 1),
    fixed(residual, 3),
    fixed(relative === null ? null : relative * 100, 1),
    told,
  ]);
  return [
    `Frame of ${one.name}: ${frame.inUse}, by ${verdict}`,
    textTable(
      ['  frame', 'turn/°', `residual/${unitOf(one)}`, '% of anisotropy', 'symmetry says'],
      rows.map(([name, ...rest]) => [`  ${name}`, ...rest]),
    ),
  ];
}

function soundness(checked: Checked, problems: Parameters<typeof statusOf>[0]): string[] {
  const { dossier } = checked;
  const composition = compositionCheck(checked);
  const lines: string[] = [];
  if (composition.agrees !== null)
    lines.push(`Composition ${composition.agrees ? 'agrees' : 'DISAGREES'} with formula × Z.`);
  for (const { atoms, distanceAngstrom, areAlternatives } of shortContacts(dossier)) {
    const what = areAlternatives
      ? 'overlapping alternatives of a disorder: a calculation can have used one only'
      : 'too near to be real';
    lines.push(`${atoms.join('–')} ${fixed(distanceAngstrom, 3)} Å: ${what}`);
  }
  for (const { label, partner, lengthAngstrom, normAngstrom } of hydrogenLengths(dossier)) {
    const which = lengthAngstrom < normAngstrom ? 'shorter' : 'longer';
    lines.push(
      `${partner}–${label} ${fixed(lengthAngstrom, 3)} Å: ${which} than neutrons find (${normAngstrom} Å)`,
    );
  }
  for (const { label, quantity, value, allowed } of implausibleValues(dossier.sites)) {
    lines.push(
      `${quantity} of ${label} ${fixed(value, 2)}: no atom of its element has that (${allowed.map((x) => fixed(x, 0)).join(' to ')})`,
    );
  }
  for (const { message } of unfinishedRuns(problems)) lines.push(message);
  return lines.length > 0 ? lines : ['Nothing suspicious in the structure and the sizes of the values.'];
}

function readable(checked: Checked, problems: Parameters<typeof statusOf>[0]): string {
  const { attachments, dossier } = checked;
  const rows = tensorSanity(dossier.sites).map((row) => {
    const digits = row.quantity === 'efg' ? 4 : 2;
    const { label, quantity, symmetryResidual, equivalentSpread, antisymmetricNorm, trace } = row;
    const figures = [
      symmetryResidual,
      equivalentSpread,
      antisymmetricNorm,
      quantity === 'efg' ? trace : null,
    ];
    return [label, quantity === 'efg' ? 'EFG/a.u.' : 'σ/ppm', ...figures.map((x) => fixed(x, digits))];
  });
  return [
    dossier.name,
    '',
    'Do the tensors belong to this crystal?',
    ...(attachments.length === 0 ? ['No tensors were bound.'] : attachments.flatMap(belonging)),
    '',
    ...attachments.flatMap(frameLines),
    '',
    'Is the calculation sound?',
    ...soundness(checked, problems),
    '',
    'Numerical noise of each tensor: what its site symmetry forbids, the spread among equivalent atoms, the part that is not symmetric',
    textTable(['site', 'tensor', 'forbidden', 'spread', 'antisymmetric', 'trace'], rows),
    '',
  ].join('\n');
}

/** `ellipsite check FILE… [options]`: do the tensors belong to the crystal, in which frame, how sound are they. */
export async function checkCommand(argv: readonly string[], io: CommandIo): Promise<number> {
  const common = parseCommonArguments(argv);
  const { input, problems: ofReading } = await chooseCase(common, io);
  const begun = input && beginDossier({ ...input, ranksKnownFrames: true });
  const checked = begun && {
    dossier: wholeDossier(begun),
    attachments: begun.attachments,
    crystal: begun.crystal,
  };
  const problems = checked?.dossier.problems ?? ofReading;
  if (common.json) {
    io.writeOut(`${JSON.stringify(checkJson(checked, problems), null, 1)}\n`);
    return statusOf(problems);
  }
  problems.forEach((found) => io.writeError(`${problemLine(found)}\n`));
  if (checked) io.writeOut(readable(checked, problems));
  return statusOf(problems);
}
