/** The outside world of the command line, so that tests can stand in for it. */
export interface CommandIo {
  /** Bytes of a file; rejects with a sentence when it cannot be read. */
  readonly readFile: (path: string) => Promise<Uint8Array>;
  readonly readStandardInput: () => Promise<Uint8Array>;
  readonly writeOut: (text: string) => void;
  /** Bytes to standard output. */
  readonly writeOutBytes: (bytes: Uint8Array) => void;
  /** Writes a file; rejects with a sentence when it cannot be written. */
  readonly writeFile: (path: string, bytes: Uint8Array) => Promise<void>;
  readonly writeError: (text: string) => void;
  /** Bytes of the symmetry module. */
  readonly symmetryModule: () => Uint8Array;
}

/** Exit statuses of contract and manual. */
export const exitStatus = { clean: 0, contentErrors: 1, wrongUsage: 2, ourFault: 3 } as const;

/** Raised for wrong usage; the message is the sentence shown to the user. */
export class UsageError extends Error {}
