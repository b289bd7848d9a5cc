import type { Vec3 } from '#src/base/matrix3.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { FigureThemeName } from '#src/figure/figure-request.ts';
import type { Look } from '#src/scene/look.ts';
import type { Legend } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';

type Rgb = readonly [number, number, number];

/** What a picture of tests/pictures/cases is drawn with, and what must be true of it. */
export interface PictureCase {
  /** What the picture proves. */
  readonly about: string;
  /** Below tests/pictures/cases. */
  readonly structure: string;
  /** A file whose tensors are the second set. */
  readonly secondSet?: string;
  readonly settings?: Partial<DossierSettings>;
  readonly options: Partial<SceneOptions>;
  readonly look?: Partial<Look>;
  readonly paper?: FigureThemeName;
  readonly transparent?: boolean;
  readonly view: {
    /** Points at the viewer, and upwards; at right angles. */
    readonly towards: Vec3;
    readonly up: Vec3;
    /** Å; in the middle of the picture. */
    readonly target: Vec3;
    readonly pixelsPerAngstrom: number;
  };
  readonly size: readonly [widthPx: number, heightPx: number];
  /** 1 (default) for crisp rims. */
  readonly samplesAcross?: number;
  /** Also drawn by WebGL. */
  readonly webgl?: boolean;
  readonly expect: readonly Expectation[];
}

/** A statement about the pixels or the words of a picture; `from` says where its numbers come from. Places are in Å. */
export type Expectation = { readonly from: string } & Statement;

export type Statement =
  /** Box round what is drawn, in all the picture or within a square of `aroundAngstrom` to each side. */
  | {
      readonly check: 'outline';
      readonly at: Vec3;
      readonly halfAngstrom: readonly [across: number, upwards: number];
      readonly aroundAngstrom?: number;
      readonly withinPx?: number;
    }
  /** Middle of all drawn pixels within a square. */
  | {
      readonly check: 'centroid';
      readonly at: Vec3;
      readonly aroundAngstrom: number;
      readonly withinPx?: number;
    }
  /** Å² that are drawn, by share of it. */
  | {
      readonly check: 'area';
      readonly at: Vec3;
      readonly aroundAngstrom: number;
      readonly squareAngstrom: number;
      readonly withinShare: number;
    }
  | { readonly check: 'colour'; readonly at: Vec3; readonly rgb: Rgb; readonly within: number }
  | { readonly check: 'hue'; readonly at: Vec3; readonly is: 'warm' | 'cool' }
  | { readonly check: 'drawn'; readonly at: readonly Vec3[] }
  | { readonly check: 'paper'; readonly at: readonly Vec3[] }
  /** Separate pieces of what is drawn. */
  | { readonly check: 'pieces'; readonly count: number }
  /** Drawn stretches along a line; `atLeast` and `atMost` count them. */
  | {
      readonly check: 'stretches';
      readonly line: readonly [Vec3, Vec3];
      readonly atLeast: number;
      readonly atMost: number;
    }
  /** Turns between light and dark along a line. */
  | {
      readonly check: 'bands';
      readonly line: readonly [Vec3, Vec3];
      readonly atLeast: number;
      readonly atMost: number;
    }
  /** Share of the drawn pixels within a square whose hue is nearer to the first colour than to the others. */
  | {
      readonly check: 'share';
      readonly at: Vec3;
      readonly aroundAngstrom: number;
      readonly among: readonly Rgb[];
      readonly share: number;
      readonly within: number;
    }
  /** Luminance of the darkest drawn pixel within a square, as a share of that at its middle. */
  | {
      readonly check: 'darkest';
      readonly at: Vec3;
      readonly aroundAngstrom: number;
      readonly least: number;
      readonly most: number;
    }
  /** Contrast with the paper by WCAG 2.2. */
  | { readonly check: 'contrast'; readonly at: Vec3; readonly least: number }
  | { readonly check: 'luminance'; readonly at: Vec3; readonly least: number; readonly most: number }
  | { readonly check: 'opacity'; readonly at: Vec3; readonly alpha: number }
  /** Labels placed in the picture: just these texts, apart from each other and within it. */
  | { readonly check: 'labels'; readonly texts: readonly string[] }
  | { readonly check: 'caption'; readonly has?: readonly string[]; readonly lacks?: readonly string[] }
  | { readonly check: 'legend'; readonly is: Partial<Legend> | null }
  | { readonly check: 'scale'; readonly statement: string | null };

/** All cases by the name of their folder. */
export const pictureCases: readonly (readonly [name: string, picture: PictureCase])[] = Object.entries(
  import.meta.glob<PictureCase>('../pictures/cases/*/picture.json', { eager: true, import: 'default' }),
).map(([path, picture]) => [path.split('/').at(-2)!, picture]);

/** Structure files by their path below tests/pictures/cases. */
export const caseFiles: readonly (readonly [file: string, text: string])[] = Object.entries(
  import.meta.glob<string>('../pictures/cases/**/*.{cif,xyz}', {
    eager: true,
    query: '?raw',
    import: 'default',
  }),
).map(([path, text]) => [path.replace('../pictures/cases/', ''), text]);

const texts = new Map(caseFiles);

/** Text of a structure file of the cases. */
export function caseText(file: string): string {
  const text = texts.get(file);
  if (text === undefined) throw new Error(`tests/pictures/cases/${file} is missing`);
  return text;
}
