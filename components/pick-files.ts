import type { FileInput } from '#src/store/store.ts';

/** What the page reads, in words. The file dialog hides nothing: files are known by content, not by name. */
export const acceptedWords =
  'CIF 1.1 and 2.0, XYZ and extended XYZ with tensors, plain or gzipped, case files and pictures saved here, up to 200 MB';

/** Files of a list as the store takes them. */
export function filesOf(list: FileList | readonly File[] | null): FileInput[] {
  return [...(list ?? [])].map((file) => ({ name: file.name, blob: file }));
}

/** Shows the system's file dialog; an empty list when it was closed. */
export function pickFiles(): Promise<FileInput[]> {
  return new Promise((resolve) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.multiple = true;
    input.addEventListener('change', () => resolve(filesOf(input.files)));
    input.addEventListener('cancel', () => resolve([]));
    input.click();
  });
}
