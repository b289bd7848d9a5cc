import { latticeSettings } from '#src/crystal/settings.ts';
import { sitesCommand } from './commands/sites.ts';
import { figureHelp } from './figure-help.ts';
import type { CommandIo } from './io.ts';
import { exitStatus, UsageError } from './io.ts';

interface Command {
  readonly summary: string;
  /** Its own options, with an example. */
  readonly help?: string;
  readonly run: (argv: readonly string[], io: CommandIo) => Promise<number>;
}

/** Every command by its name; one file each below `commands`. */
const commands: Readonly<Record<string, Command>> = {
  sites: {
    summary: 'one row a site: symmetry, tensors in every convention, equivalent atoms',
    run: sitesCommand,
  },
  find: {
    summary:
      'the tensors and structures that stand in any text, with the reasons: ellipsite find log.txt --json',
    run: async (argv, io) => (await import('./commands/find.ts')).findCommand(argv, io),
  },
  check: {
    summary: 'do these tensors belong to this crystal, in which frame, and how sound is the calculation',
    run: async (argv, io) => (await import('./commands/check.ts')).checkCommand(argv, io),
  },
  figure: {
    summary: 'a picture to take away: ellipsite figure crystal.cif tensors.xyz --view c -o crystal.png',
    help: figureHelp,
    // Loaded when asked for, so that the table does not wait for the renderer.
    run: async (argv, io) => (await import('./commands/figure.ts')).figureCommand(argv, io),
  },
};

/** Names of the Cartesian settings with their sentences, one a line. */
function frames(): string {
  return latticeSettings
    .map(({ name, sentence }) => `${' '.repeat(29)}${name.padEnd(10)} ${sentence}`)
    .join('\n');
}

const options = `Options of every command
  --json                     one JSON document on standard output
  --block NAME               which of several structures
  --isotope 27Al             nuclide of an element (repeatable)
  --reference 13C=170.5      shift = 170.5 − shielding; 13C=170.5,-0.97 for intercept and slope;
                             13C=170.5,exact for (σref − σ)/(1 − σref) (repeatable)
  --moment 27Al=0.1466       your own quadrupole moment, barn (repeatable)
  --symmetry file|find|none  whose operations: the file's, those found from the atoms, none
  --tolerance Å              of the symmetry search (default 0.01)
  --frame NAME               Cartesian setting of the tensors, instead of the one found:
${frames()}
A FILE is recognised by content: CIF, XYZ or extended XYZ; - reads standard input.
Exit status: 0 clean, 1 the content has errors, 2 wrong usage, 3 our fault.`;

function usage(): string {
  const list = Object.entries(commands).map(([name, { summary }]) => `  ${name.padEnd(10)} ${summary}`);
  return `Usage: ellipsite COMMAND FILE… [options]\n\nCommands\n${list.join('\n')}\n\n${options}\n`;
}

/** The whole command line: words in, exit status out; nothing but `io` is touched. */
export async function main(argv: readonly string[], io: CommandIo, version: string): Promise<number> {
  const [name, ...rest] = argv;
  if (name === '--version') {
    io.writeOut(`${version}\n`);
    return exitStatus.clean;
  }
  const command = name === undefined || !Object.hasOwn(commands, name) ? undefined : commands[name];
  if (name === '--help' || name === 'help' || rest.includes('--help')) {
    io.writeOut(command?.help ? `${command.help}\n\n${options}\n` : usage());
    return exitStatus.clean;
  }
  try {
    if (!command)
      throw new UsageError(name === undefined ? 'Name a command.' : `No command is called ${name}.`);
    return await command.run(rest, io);
  } catch (error) {
    if (error instanceof UsageError) {
      io.writeError(`ellipsite: ${error.message}\n${command ? '' : usage()}`);
      return exitStatus.wrongUsage;
    }
    const story = error instanceof Error ? (error.stack ?? error.message) : String(error);
    io.writeError(`ellipsite: our fault, please report it with the file: ${story}\n`);
    return exitStatus.ourFault;
  }
}
