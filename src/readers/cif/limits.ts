/** Limits against hostile input. Each is named with its value in the problem that reports it. */
export const cifLimits = {
  /** Levels of lists and tables inside one another. */
  nestingDepth: 64,
  /** Save frames inside one another. */
  frameDepth: 16,
  /** Data blocks and save frames of one file. */
  blocks: 100_000,
  /** Values of one file that are kept, those inside lists and tables included. Loops that nobody reads do not count. */
  values: 10_000_000,
  /** Names in the header of one loop. */
  loopNames: 10_000,
  /** Characters of a name or block code that CIF 1.1 allows; longer ones are read and noted. */
  nameLength: 75,
  /** Characters of a line that both versions allow; longer ones are read and noted. */
  lineLength: 2048,
} as const;
