/** A file before it has an id. */
export interface FileInput {
  readonly name: string;
  readonly blob: Blob;
}
