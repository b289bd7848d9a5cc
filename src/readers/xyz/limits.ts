/** What a hostile or mistaken file may ask for at most. */
export interface XyzLimits {
  /** Atom rows of all frames together. */
  readonly maxAtoms: number;
  readonly maxFrames: number;
  /** Characters of a comment line; the rest of the line is not read. */
  readonly maxCommentLength: number;
}

export const defaultXyzLimits: XyzLimits = {
  maxAtoms: 2_000_000,
  maxFrames: 100_000,
  maxCommentLength: 1_000_000,
};
