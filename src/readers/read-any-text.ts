import type { SourceText } from '#src/bytes/source-text.ts';
import type { ReadOptions } from './read.ts';
import { readText } from './read.ts';
import type { Reading } from './reading.ts';

/**
 * As `readText` does, and searches a text of no known format for tensors and structures. The finder is loaded when it is
 * needed: most files have a format.
 */
export async function readAnyText(source: SourceText, options: ReadOptions = {}): Promise<Reading> {
  const reading = readText(source, options);
  if (reading.format !== 'unknown' || source.text.trim() === '') return reading;
  const { readFoundText } = await import('./text/read-found-text.ts');
  return readFoundText(source, options.progress, options.choices) ?? reading;
}
