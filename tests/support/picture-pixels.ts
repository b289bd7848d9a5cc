import type { Vec3 } from '#src/base/matrix3.ts';
import type { PictureCase } from './picture-case.ts';

type Rgb = readonly [number, number, number];

/** RGBA bytes, rows from the top. */
export interface PixelData {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly data: ArrayLike<number>;
}

/** A square of the picture, whole pixels; the last ones are not in it. */
export interface Square {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** A picture seen through the numbers of its case: places in Å, colours, what is drawn. Knows nothing of the renderers. */
export class PictureReader {
  readonly #pixels: PixelData;
  readonly #paper: Rgb;
  readonly #view: PictureCase['view'];

  constructor(pixels: PixelData, picture: PictureCase, paper: Rgb) {
    this.#pixels = pixels;
    this.#paper = paper;
    this.#view = picture.view;
  }

  get widthPx(): number {
    return this.#pixels.widthPx;
  }

  get heightPx(): number {
    return this.#pixels.heightPx;
  }

  get paper(): Rgb {
    return this.#paper;
  }

  get pixelsPerAngstrom(): number {
    return this.#view.pixelsPerAngstrom;
  }

  /** Where a place is seen without perspective, pixels from the upper left corner. */
  place(at: Vec3): readonly [x: number, y: number] {
    const { towards, up, target, pixelsPerAngstrom } = this.#view;
    const [u, t] = [up, towards];
    const right = [u[1] * t[2] - u[2] * t[1], u[2] * t[0] - u[0] * t[2], u[0] * t[1] - u[1] * t[0]];
    const along = (axis: readonly number[]): number =>
      axis.reduce((sum, part, k) => sum + part * (at[k]! - target[k]!), 0) / Math.hypot(...axis);
    return [
      this.widthPx / 2 + pixelsPerAngstrom * along(right),
      this.heightPx / 2 - pixelsPerAngstrom * along(up),
    ];
  }

  square(at: Vec3, aroundAngstrom: number | undefined): Square {
    if (aroundAngstrom === undefined) return { left: 0, top: 0, right: this.widthPx, bottom: this.heightPx };
    const [x, y] = this.place(at);
    const half = aroundAngstrom * this.pixelsPerAngstrom;
    return {
      left: Math.max(0, Math.round(x - half)),
      top: Math.max(0, Math.round(y - half)),
      right: Math.min(this.widthPx, Math.round(x + half)),
      bottom: Math.min(this.heightPx, Math.round(y + half)),
    };
  }

  colour(x: number, y: number): Rgb {
    const o = this.#offset(x, y);
    const { data } = this.#pixels;
    return [data[o]!, data[o + 1]!, data[o + 2]!];
  }

  /** Between the four pixels whose middles are nearest. */
  colourAt(at: Vec3): Rgb {
    const [x, y] = this.place(at).map((value) => value - 0.5) as [number, number];
    const [right, below] = [x - Math.floor(x), y - Math.floor(y)];
    const near = [
      [this.colour(x, y), (1 - right) * (1 - below)],
      [this.colour(x + 1, y), right * (1 - below)],
      [this.colour(x, y + 1), (1 - right) * below],
      [this.colour(x + 1, y + 1), right * below],
    ] as const;
    const channel = (k: 0 | 1 | 2): number => near.reduce((sum, [rgb, share]) => sum + share * rgb[k], 0);
    return [channel(0), channel(1), channel(2)];
  }

  alpha(x: number, y: number): number {
    return this.#pixels.data[this.#offset(x, y) + 3]!;
  }

  /** Something other than paper. */
  isDrawn(x: number, y: number): boolean {
    if (this.alpha(x, y) === 0) return false;
    return this.colour(x, y).some((byte, k) => Math.abs(byte - this.#paper[k]!) > 2);
  }

  isDrawnAt(at: Vec3): boolean {
    return this.isDrawn(...this.place(at));
  }

  /** Columns and rows of all drawn pixels of a square. */
  drawn({ left, top, right, bottom }: Square): (readonly [x: number, y: number])[] {
    const found: (readonly [number, number])[] = [];
    for (let y = top; y < bottom; y++) {
      for (let x = left; x < right; x++) if (this.isDrawn(x, y)) found.push([x, y]);
    }
    return found;
  }

  /** Pixels along a line, two a pixel. */
  line([from, to]: readonly [Vec3, Vec3]): (readonly [x: number, y: number])[] {
    const [[x1, y1], [x2, y2]] = [this.place(from), this.place(to)];
    const steps = Math.ceil(2 * Math.hypot(x2 - x1, y2 - y1));
    return Array.from({ length: steps + 1 }, (_none, k) => {
      const share = k / steps;
      return [x1 + share * (x2 - x1), y1 + share * (y2 - y1)] as const;
    });
  }

  #offset(x: number, y: number): number {
    const [column, row] = [Math.floor(x), Math.floor(y)];
    if (!(column >= 0 && row >= 0 && column < this.widthPx && row < this.heightPx)) {
      throw new Error(`There is no pixel at ${x}, ${y}.`);
    }
    return 4 * (row * this.widthPx + column);
  }
}

/** Relative luminance, 0 to 1 (WCAG 2.2 after IEC 61966-2-1). */
export function luminance(colour: Rgb): number {
  const [r, g, b] = colour.map((byte) => {
    const c = byte / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}
