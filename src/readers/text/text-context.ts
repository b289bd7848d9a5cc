import type { AtomMention } from './atom-mention.ts';
import type { DataRow } from './data-row.ts';
import { atomOfLine } from './shape-atom.ts';
import { meaningOfLine } from './shape-meaning.ts';
import type { LineMeaning } from './line-meaning.ts';
import { isTelling, lineMeaning } from './line-meaning.ts';
import type { NearLine } from './raw-tensor.ts';
import type { TextLine } from './text-line.ts';

/** Lines with words that are kept between two tensors. */
const keptNear = 14;
/** Telling lines kept from further up. */
const keptFar = 12;
/** Lines after which an atom that was named is no longer meant. */
const atomHolds = 60;

/** Lines between an element and its number, where each has a line of its own. */
const numberHolds = 2;

/** What stands above numbers when they come. */
export interface Surroundings {
  readonly atom: AtomMention | null;
  readonly near: readonly NearLine[];
  readonly far: readonly NearLine[];
}

function isSame(a: AtomMention, b: AtomMention): boolean {
  const elements = a.element === null || b.element === null || a.element === b.element;
  const numbers = a.index === null || b.index === null || a.index === b.index;
  return elements && numbers;
}

/**
 * Remembers the last lines with words and the atom that was named last. Rows of a list of atoms introduce nothing: two
 * neighbouring lines that name different atoms name none for what follows.
 */
export class TextContext {
  #near: NearLine[] = [];
  #far: NearLine[] = [];
  /** Their texts without numbers. */
  #farKeys: string[] = [];
  #atom: AtomMention | null = null;
  #atomLine = 0;
  /** True once a tensor came for the atom: a line that names only its element then begins another. */
  #atomHasTensor = false;
  #lastMention: AtomMention | null = null;
  #number: { index: number | null; line: number } = { index: null, line: -10 };
  #mentionLine = 0;
  #headingLine = -10;
  #section: { readonly element: string; readonly line: number } | null = null;
  #farShared: readonly NearLine[] = [];

  /** Meaning of the last line that was noted. */
  lastMeaning: LineMeaning | null = null;

  /** Takes note of a line that holds no part of a tensor. */
  note(line: TextLine, row: DataRow | null): void {
    this.lastMeaning = null;
    const shape = line.shaped?.shape;
    if ((shape?.count ?? line.tokens.length) === 0) return;
    this.#noteAtom(line);
    if (row !== null && row.values.length >= 3 && row.words <= 2) return;
    const hasWords = shape ? shape.words.length > 0 : line.tokens.some(({ kind }) => kind === 'word');
    if (!hasWords) return;
    const text = line.text.length > 300 ? line.text.slice(0, 300) : line.text;
    const meaning = meaningOfLine(line);
    this.lastMeaning = meaning;
    this.#near.push({ number: line.number, text: text.trim(), meaning });
    if (this.#near.length > keptNear) this.#toFar(this.#near.shift()!);
  }

  #noteAtom(line: TextLine): void {
    const mention = atomOfLine(line);
    if (mention === null) return;
    if (mention.element === null && mention.label === null && !mention.isSure) {
      this.#noteNumber(mention.index, line.number);
      return;
    }
    const named = this.#inSection(mention, line.number);
    if (named !== null) {
      this.#setAtom(named, line.number);
      return;
    }
    const neighbours = this.#mentionLine === line.number - 1;
    const isList = neighbours && this.#lastMention !== null && !isSame(mention, this.#lastMention);
    this.#lastMention = mention;
    this.#mentionLine = line.number;
    const goesOn = !this.#atomHasTensor || (mention.index !== null && mention.index === this.#atom?.index);
    if (
      !isList &&
      goesOn &&
      this.#atom !== null &&
      line.number - this.#atomLine <= atomHolds &&
      isSame(mention, this.#atom)
    ) {
      this.#atom = merged(this.#atom, mention);
    } else {
      const { index, line: at } = this.#number;
      const numbered = mention.index === null && mention.label === null && line.number - at <= numberHolds;
      this.#atom = isList ? null : numbered ? { ...mention, index } : mention;
      this.#atomHasTensor = false;
    }
    this.#atomLine = line.number;
  }

  /** `atom 2` under a line that named only an element is one of that element. */
  #inSection(mention: AtomMention, line: number): AtomMention | null {
    if (mention.element !== null) {
      const isHeading = mention.index === null && mention.isSure;
      // Headings that follow each other are a list of the elements.
      const isListed = isHeading && line - this.#headingLine <= 1;
      if (isHeading) this.#headingLine = line;
      this.#section = isHeading && !isListed ? { element: mention.element, line } : null;
      return null;
    }
    const section = this.#section;
    if (section === null || mention.index === null || line - section.line > atomHolds) return null;
    // The first number under an element may be that of the atom the line above names.
    this.#section = { ...section, line };
    return { ...mention, element: section.element };
  }

  #setAtom(atom: AtomMention, line: number): void {
    const isOther = this.#lastMention === null || !isSame(atom, this.#lastMention);
    if (isOther) this.#atomHasTensor = false;
    this.#atom = isOther && this.#mentionLine === line - 1 && this.#lastMention?.index !== null ? null : atom;
    this.#lastMention = atom;
    this.#mentionLine = line;
    this.#atomLine = line;
  }

  /** A number on a line of its own is the atom's where the element stands beside it. */
  #noteNumber(index: number | null, line: number): void {
    if (this.#atom?.index === null && line - this.#atomLine <= numberHolds) {
      this.#atom = { ...this.#atom, index };
      this.#lastMention = this.#atom;
    } else this.#number = { index, line };
  }

  #toFar(line: NearLine): void {
    if (!isTelling(line.meaning)) return;
    const key = line.text.replace(/[\d.+-]+/g, '#');
    const again = this.#farKeys.indexOf(key);
    // Lines that only name a part come with every atom; they must not push the heading out.
    const least = this.#far.findIndex(({ meaning }) => !isHeading(meaning));
    const out = again >= 0 ? again : this.#far.length < keptFar ? -1 : Math.max(least, 0);
    this.#far = [...this.#far.filter((_, at) => at !== out), line];
    this.#farKeys = [...this.#farKeys.filter((_, at) => at !== out), key];
    this.#farShared = this.#far;
  }

  /** The atom that numbers in this line would belong to. */
  atomAt(line: number): AtomMention | null {
    return line - this.#atomLine <= atomHolds ? this.#atom : null;
  }

  /** The atom that was named at most so many lines above. */
  atomWithin(line: number, lines: number): AtomMention | null {
    return line - this.#atomLine <= lines ? this.#atom : null;
  }

  /** A row of a tensor names its own atom: nothing further up is meant any more. */
  forgetAtom(): void {
    this.#atom = null;
  }

  surroundings(line: number): Surroundings {
    return {
      atom: this.atomAt(line),
      near: this.#near.length === 0 ? none : [...this.#near],
      far: this.#farShared,
    };
  }

  meaningOf(text: string): LineMeaning {
    return lineMeaning(text);
  }

  /** After a tensor: what stood above it is further up now. */
  passTensor(): void {
    this.#atomHasTensor = true;
    for (const line of this.#near) this.#toFar(line);
    this.#near = [];
  }

  /** Nearest line that names a quantity or a decoy. */
  nearestTopic(): NearLine | null {
    for (const list of [this.#near, this.#far]) {
      for (let at = list.length - 1; at >= 0; at--) {
        const { meaning } = list[at]!;
        if (meaning.quantity !== null || meaning.decoy !== null) return list[at]!;
      }
    }
    return null;
  }
}

const none: readonly NearLine[] = [];

function isHeading({ quantity, decoy, unit, order }: LineMeaning): boolean {
  return quantity !== null || decoy !== null || unit !== null || order !== null;
}

function merged(a: AtomMention, b: AtomMention): AtomMention {
  return {
    ...a,
    label: a.label ?? b.label,
    element: a.element ?? b.element,
    index: a.index ?? b.index,
    isGhost: a.isGhost || b.isGhost,
    isSure: a.isSure || b.isSure,
  };
}
