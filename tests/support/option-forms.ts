import type { FigureThemeName } from '#src/figure/figure-request.ts';
import type { Look } from '#src/scene/look.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import type { PictureCase } from './picture-case.ts';

/** Names of the forms a value can take: each member of a union of words, true and false, null, and open kinds by their kind. */
type Form<V> = V extends string
  ? V
  : V extends boolean
    ? `${V}`
    : V extends number
      ? 'number'
      : V extends null
        ? 'null'
        : V extends readonly [unknown, ...unknown[]]
          ? 'list'
          : V extends readonly unknown[]
            ? 'list' | 'empty'
            : 'object';

type Forms<O> = { readonly [K in keyof O]-?: Readonly<Record<Form<O[K]>, true>> };

/** Choices of a picture besides those of the scene. */
interface PaperChoices {
  readonly paper: FigureThemeName;
  readonly transparent: boolean;
}

const sceneForms: Forms<SceneOptions> = {
  quantity: { auto: true, shielding: true, shift: true, efg: true },
  showTensors: { true: true, false: true },
  tensorElements: { auto: true, null: true, list: true, empty: true },
  extent: { auto: true, cell: true, molecules: true, asymmetric: true, range: true, shell: true },
  range: { list: true },
  shell: { object: true, null: true },
  glyph: { auto: true, ellipsoid: true, polar: true, axes: true },
  part: { symmetric: true, antisymmetric: true },
  tensorSites: { list: true, empty: true, null: true },
  tensorCopies: { all: true, first: true, orientations: true },
  colourBy: {
    isotropic: true,
    span: true,
    anisotropy: true,
    asymmetry: true,
    vzz: true,
    coupling: true,
    residual: true,
    difference: true,
    element: true,
    site: true,
  },
  colourMap: { batlow: true, vik: true, null: true },
  ellipsoid: { auto: true, total: true, deviation: true },
  unitsPerAngstrom: { number: true, null: true },
  colourLimits: { list: true, null: true },
  bonds: { true: true, false: true },
  bondedNeighbours: { true: true, false: true },
  hydrogenBonds: { true: true, false: true },
  cellEdges: { true: true, false: true },
  labels: { true: true, false: true },
  labelContent: { site: true, element: true, value: true },
  polyhedra: { list: true, empty: true },
  displacement: { none: true, beside: true, instead: true },
  displacementProbability: { number: true },
  occupancy: { true: true, false: true },
  disorder: { patterns: true, alike: true, object: true },
};

const lookForms: Forms<Look> = {
  depthCue: { true: true, false: true },
  outlines: { true: true, false: true },
  circles: { true: true, false: true },
  perspectiveDegrees: { number: true },
};

const paperForms: Forms<PaperChoices> = {
  paper: { light: true, paper: true, dark: true },
  transparent: { true: true, false: true },
};

function formOf(value: unknown): string {
  if (Array.isArray(value)) return value.length > 0 ? 'list' : 'empty';
  if (value === null) return 'null';
  return typeof value === 'string' || typeof value === 'boolean' ? `${value}` : typeof value;
}

/** One choice of a picture: what a case says about it, and the same case with something else said. */
export interface PictureChoice {
  readonly group: 'options' | 'look' | 'picture';
  readonly key: string;
  readonly forms: readonly string[];
  readonly usual: unknown;
  /** Undefined where the case leaves it open. */
  readonly saidBy: (picture: PictureCase) => unknown;
  readonly formOf: (value: unknown) => string;
  readonly instead: (picture: PictureCase, value: unknown) => PictureCase;
}

function choices(
  group: PictureChoice['group'],
  table: Readonly<Record<string, Readonly<Record<string, true>>>>,
  usual: object,
): PictureChoice[] {
  return Object.entries(table).map(([key, forms]) => ({
    group,
    key,
    forms: Object.keys(forms),
    usual: usual[key as keyof typeof usual],
    saidBy: (picture) => {
      const said: object = (group === 'picture' ? picture : picture[group]) ?? {};
      return said[key as keyof typeof said];
    },
    formOf,
    instead: (picture, value) =>
      group === 'picture'
        ? { ...picture, [key]: value }
        : { ...picture, [group]: { ...picture[group], [key]: value } },
  }));
}

const usualPaper: PaperChoices = { paper: 'paper', transparent: false };

/** Every key a picture is chosen by with every form of its values; TypeScript refuses a table in which one is missing. */
export const pictureChoices: readonly PictureChoice[] = [
  ...choices('options', sceneForms, defaultSceneOptions),
  ...choices('look', lookForms, defaultLook),
  ...choices('picture', paperForms, usualPaper),
];
