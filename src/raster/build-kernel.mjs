import { spawnSync } from 'node:child_process';
import {
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
 * Compiles assembly/kernel.ts to WebAssembly and writes it as base64 text into a module, which the page, its Workers, Node
 * and the tests all import alike, without a request. Nothing to do where the module is newer than its sources.
 */
const folder = fileURLToPath(new URL('.', import.meta.url));
const target = join(folder, 'kernel-text.generated.ts');
const compiler = fileURLToPath(new URL('../../node_modules/assemblyscript/bin/asc.js', import.meta.url));
const sources = readdirSync(join(folder, 'assembly')).map((name) => join(folder, 'assembly', name));
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
    const options = ['--runtime', 'stub', '--importMemory', '--enable', 'simd', '--enable', 'bulk-memory'];
    const how = ['-O3', '--noAssert', '--use', 'abort=', '--disableWarning', '112'];
    const run = spawnSync(
      process.execPath,
      [compiler, join(folder, 'assembly', 'kernel.ts'), '-o', wasm, ...options, ...how],
      { cwd: folder, encoding: 'utf8' },
    );
    if (run.status !== 0) throw new Error(`the kernel did not compile:\n${run.stdout}${run.stderr}`);
    const text = readFileSync(wasm).toString('base64');
    const made = join(folder, `kernel-text.${process.pid}.tmp`);
    writeFileSync(
      made,
      `/** WebAssembly of assembly/kernel.ts, base64; made by build-kernel.mjs. */\nexport const kernelText =\n  '${text}';\n`,
    );
    renameSync(made, target);
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

if (!isFresh()) compile();
