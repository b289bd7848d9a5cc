/** A value of a CIF file, with where it starts. Offsets are UTF-16 units into the source text. */
export type CifValue = CifText | CifSpecial | CifList | CifTable;

export interface CifText {
  readonly kind: 'text';
  /** Content after removing delimiters, unfolding lines and removing text prefixes. */
  readonly text: string;
  /** True for anything delimited: a quoted `?` or `.` is then ordinary text. */
  readonly delimited: boolean;
  readonly offset: number;
}

/** Bare `?` (unknown) and bare `.` (inapplicable), kept distinct. */
export interface CifSpecial {
  readonly kind: 'unknown' | 'inapplicable';
  readonly offset: number;
}

export interface CifList {
  readonly kind: 'list';
  readonly items: readonly CifValue[];
  readonly offset: number;
}

export interface CifTable {
  readonly kind: 'table';
  readonly entries: ReadonlyMap<string, CifValue>;
  readonly offset: number;
}

/** A loop: names lower-cased, values row after row. The last row is complete: a broken end was cut and reported. */
export interface CifLoop {
  readonly names: readonly string[];
  /** Row-major, length = rows × names. */
  readonly values: readonly CifValue[];
  /** Whole rows that were read and not kept, because nobody asked for any of the names; `values` is then empty. */
  readonly rowsPassedOver?: number;
  readonly offset: number;
}

/** A data block or save frame. Names are lower-cased (CIF names compare case-insensitively) and kept with `_`. */
export interface CifBlock {
  /** As written, without `data_` or `save_`. */
  readonly name: string;
  readonly offset: number;
  /** Single items: name → value. A repeated name keeps its first known value; the rest is reported. */
  readonly items: ReadonlyMap<string, CifValue>;
  readonly loops: readonly CifLoop[];
  /** Which loop a looped name stands in. */
  readonly loopOf: ReadonlyMap<string, CifLoop>;
  readonly frames: readonly CifBlock[];
}

export interface CifDocument {
  /** 1.1 where no magic code stands; 2.0 by `#\#CIF_2.0`. */
  readonly version: '1.1' | '2.0';
  readonly blocks: readonly CifBlock[];
}
