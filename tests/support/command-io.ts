import { readFileSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { main } from '#src/cli/run.ts';

const require = createRequire(import.meta.url);
const symmetryModule = readFileSync(require.resolve('@spglib/moyo-wasm/moyo_wasm_bg.wasm'));

export interface CommandResult {
  readonly status: number;
  readonly out: string;
  readonly error: string;
  /** Bytes written to standard output. */
  readonly outBytes: Uint8Array | null;
  /** Files written, by name; nothing reaches the disk. */
  readonly written: Readonly<Record<string, Uint8Array>>;
}

/** Runs the command line in this process on texts given by name; names not given are read from the disk. */
export async function runCommand(
  argv: readonly string[],
  files: Readonly<Record<string, string | Uint8Array>> = {},
): Promise<CommandResult> {
  let out = '';
  let error = '';
  let outBytes: Uint8Array | null = null;
  const written: Record<string, Uint8Array> = {};
  const bytesOf = (content: string | Uint8Array) =>
    typeof content === 'string' ? new TextEncoder().encode(content) : content;
  const status = await main(
    argv,
    {
      readFile: async (path) => (path in files ? bytesOf(files[path] ?? '') : await readFile(path)),
      readStandardInput: async () => bytesOf(files['-'] ?? ''),
      writeOut: (text) => (out += text),
      writeOutBytes: (bytes) => (outBytes = bytes),
      writeFile: async (path, bytes) => {
        if (path.startsWith('no-such-folder/')) throw new Error('its folder does not exist.');
        written[path] = bytes;
      },
      writeError: (text) => (error += text),
      symmetryModule: () => symmetryModule,
    },
    '0.0.0-test',
  );
  return { status, out, error, outBytes, written };
}
