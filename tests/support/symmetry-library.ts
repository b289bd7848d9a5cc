import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import { symmetryTablesFromBytes } from '#src/crystal/symmetry-tables.ts';

/** The symmetry library's module, as the command line reads it. */
export function symmetryModuleBytes(): Uint8Array<ArrayBuffer> {
  const place = import.meta.resolve('@spglib/moyo-wasm/moyo_wasm_bg.wasm');
  return new Uint8Array(readFileSync(fileURLToPath(place)));
}

/** Tables ready for use, and with them the library's own functions. */
export function readySymmetryTables(): SymmetryTables {
  return symmetryTablesFromBytes(symmetryModuleBytes());
}
