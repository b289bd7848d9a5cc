/** Hashes for the page, which knows the store, not what comes before it. */
export { sha256OfBytes } from '#src/case/sha256.ts';
