/** A file to be hashed: the blob crosses to the worker without its bytes. */
export interface HashRequest {
  readonly id: number;
  readonly blob: Blob;
}

export type HashReply =
  { readonly id: number; readonly hash: string } | { readonly id: number; readonly fault: string };
