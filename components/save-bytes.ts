/** Hands bytes to the browser to be saved under a name. */
export function saveBytes(bytes: Uint8Array<ArrayBuffer>, name: string, type: string): void {
  saveBlob(new Blob([bytes], { type }), name);
}

/** The same for bytes that need not be in memory. */
export function saveBlob(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The browser needs the address until it has begun to save.
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

/** A title as the name of a file: letters, digits, dots and dashes. */
export function fileNameOf(title: string, ending: string): string {
  const plain = title.replace(/\.(cif|xyz|extxyz|gz|json|png)$/gi, '').replaceAll(/[^\p{L}\p{N}._-]+/gu, '-');
  return `${plain.replace(/^[-.]+|[-.]+$/g, '') || 'crystal'}.${ending}`;
}
