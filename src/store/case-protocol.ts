import type { FileInput } from './file-input.ts';
import type { KeptCase } from './case-exchange.ts';
import type { Decisions, Views } from './state.ts';

/** To the Worker of case files: blobs cross without their bytes. */
export type CaseRequest =
  | { readonly kind: 'write'; readonly decisions: Decisions; readonly views: Views }
  | { readonly kind: 'read'; readonly file: FileInput };

export type CaseReply =
  | { readonly kind: 'written'; readonly blob: Blob }
  | { readonly kind: 'read'; readonly kept: KeptCase }
  | { readonly kind: 'failed'; readonly message: string };
