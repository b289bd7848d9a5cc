// Writes the generated files of samples/ anew: node tests/support/write-samples.mjs
import { writeFile } from 'node:fs/promises';
import { runnerImport } from 'vite';

const folder = new URL('../../samples/', import.meta.url);
const { module } = await runnerImport(new URL('./make-samples.ts', import.meta.url).pathname);
for (const [name, text] of module.makeSamples()) {
  await writeFile(new URL(name, folder), text);
  console.log(`samples/${name}: ${text.length} characters`);
}
