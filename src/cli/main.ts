#!/usr/bin/env node
import { readFileSync } from 'node:fs';
import { readFile, writeFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { gatheredOutput } from './gathered-output.ts';
import type { CommandIo } from './io.ts';
import { main } from './run.ts';

const require = createRequire(import.meta.url);

/** The same distance from the package's root as source and as build. */
function packageVersion(): string {
  const facts = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as {
    version: string;
  };
  return facts.version;
}

async function standardInput(): Promise<Uint8Array> {
  const chunks: Buffer[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}

async function bytesOf(path: string): Promise<Uint8Array> {
  try {
    return await readFile(path);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === 'ENOENT') throw new Error('there is no such file.', { cause: error });
    if (code === 'EISDIR') throw new Error('this is a folder; name a file.', { cause: error });
    throw new Error(`cannot be read (${code ?? 'unknown reason'}).`, { cause: error });
  }
}

async function keepBytes(path: string, bytes: Uint8Array): Promise<void> {
  try {
    await writeFile(path, bytes);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === 'ENOENT') throw new Error('its folder does not exist.', { cause: error });
    if (code === 'EISDIR') throw new Error('this is a folder; name a file.', { cause: error });
    throw new Error(`cannot be written (${code ?? 'unknown reason'}).`, { cause: error });
  }
}

const output = gatheredOutput((bytes) => void process.stdout.write(bytes));

const io: CommandIo = {
  readFile: bytesOf,
  readStandardInput: standardInput,
  writeOut: output.text,
  writeOutBytes: output.bytes,
  writeFile: keepBytes,
  writeError: (text) => void process.stderr.write(text),
  symmetryModule: () => readFileSync(require.resolve('@spglib/moyo-wasm/moyo_wasm_bg.wasm')),
};

process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
});
try {
  process.exitCode = await main(process.argv.slice(2), io, packageVersion());
} finally {
  output.flush();
}
