import { spawnSync } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdtempSync,
  readFileSync,
  readdirSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * Compiles scalar/ and assembly/, which stands in for files of the same name, to WebAssembly and writes it as text (one letter a byte, from U+0100 on: less than base64 once it is packed) into a module, which the page, its Workers, Node
 * and the tests all import alike, without a request. Nothing to do where the module is newer than its sources.
 */
const folder = fileURLToPath(new URL('.', import.meta.url));
const target = join(folder, 'kernel-text.generated.ts');
const compiler = fileURLToPath(new URL('../../node_modules/assemblyscript/bin/asc.js', import.meta.url));
const parts = ['scalar', 'assembly'].map((name) => join(folder, name));
const sources = parts.flatMap((part) => readdirSync(part).map((name) => join(part, name)));
sources.push(join(folder, 'slots.ts'), fileURLToPath(import.meta.url));

function isFresh() {
  if (!existsSync(target)) return false;
  const made = statSync(target).mtimeMs;
  return sources.every((path) => statSync(path).mtimeMs < made);
}

function compile() {
  const scratch = mkdtempSync(join(tmpdir(), 'ellipsite-kernel-'));
  try {
    const wasm = join(scratch, 'kernel.wasm');
    const source = join(scratch, 'kernel');
    for (const part of parts) cpSync(part, source, { recursive: true });
    for (const name of ['number-types.d.ts', 'tsconfig.json']) rmSync(join(source, name), { force: true });
    cpSync(join(folder, 'slots.ts'), join(scratch, 'slots.ts'));
    const options = ['--runtime', 'stub', '--importMemory', '--enable', 'simd', '--enable', 'bulk-memory'];
    const how = ['-O3', '--noAssert', '--use', 'abort=', '--disableWarning', '112'];
    const run = spawnSync(
      process.execPath,
      [compiler, join(source, 'kernel.ts'), '-o', wasm, ...options, ...how],
      { cwd: scratch, encoding: 'utf8' },
    );
    if (run.status !== 0) throw new Error(`the kernel did not compile:\n${run.stdout}${run.stderr}`);
    const text = Array.from(readFileSync(wasm), (byte) => String.fromCharCode(0x100 + byte)).join('');
    const made = join(folder, `kernel-text.${process.pid}.tmp`);
    writeFileSync(
      made,
      `/** WebAssembly of assembly/kernel.ts, a byte a letter from U+0100 on; made by build-kernel.mjs. */\nexport const kernelText =\n  '${text}';\n`,
    );
    renameSync(made, target);
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

if (!isFresh()) compile();
