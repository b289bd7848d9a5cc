import type { FileInput, Store } from '#src/store/store.ts';

/** One case of samples/index.json. */
export interface SampleCase {
  readonly id: string;
  readonly title: string;
  /** What it holds, and what in it is invented. */
  readonly sentence: string;
  /** Names of files in samples/, the structure first. */
  readonly files: readonly string[];
}

const indexes = import.meta.glob<{ readonly cases: readonly SampleCase[] }>('/samples/index.json', {
  eager: true,
  import: 'default',
});
const texts = import.meta.glob<string>('/samples/*.{cif,xyz,extxyz}', { query: '?raw', import: 'default' });

/** The cases the page offers, in the order of the index; they are part of the built page, nothing is fetched from elsewhere. */
export function sampleCases(): readonly SampleCase[] {
  return Object.values(indexes)[0]?.cases ?? [];
}

/** The sample case that decisions are about; files of the user's own are none, whatever their names. */
export function sampleOf(title: string, names: readonly string[]): SampleCase | null {
  return (
    sampleCases().find(
      (sample) => sample.title === title && sample.files.every((file) => names.includes(file)),
    ) ?? null
  );
}

/** Opens a sample case like files of the user's own. */
export async function openSample(store: Store, sample: SampleCase): Promise<boolean> {
  const files = await Promise.all(sample.files.map(loadFile));
  return store.open(files, sample.title);
}

async function loadFile(name: string): Promise<FileInput> {
  const text = await texts[`/samples/${name}`]?.();
  if (text === undefined) throw new Error(`samples/${name} is named in the index but is not there`);
  return { name, blob: new Blob([text]) };
}
