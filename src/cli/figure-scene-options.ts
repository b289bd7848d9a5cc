import type { Vec3 } from '#src/base/matrix3.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import type { ColourMeaning, SceneOptions } from '#src/scene/scene-options.ts';
import type { OwnOptions, OwnValues } from './arguments.ts';
import { numberWithin, oneOf, textOf } from './figure-options.ts';
import { UsageError } from './io.ts';

/** Options of `figure` that say what is drawn. */
export const sceneOptionWords = {
  quantity: { type: 'string' },
  glyph: { type: 'string' },
  part: { type: 'string' },
  size: { type: 'string' },
  scale: { type: 'string' },
  'colour-by': { type: 'string' },
  map: { type: 'string' },
  limits: { type: 'string' },
  extent: { type: 'string' },
  range: { type: 'string' },
  shell: { type: 'string' },
  radius: { type: 'string' },
  elements: { type: 'string' },
  sites: { type: 'string' },
  copies: { type: 'string' },
  labels: { type: 'boolean' },
  'label-with': { type: 'string' },
  polyhedra: { type: 'string' },
  displacement: { type: 'string' },
  probability: { type: 'string' },
  'no-tensors': { type: 'boolean' },
  'no-bonds': { type: 'boolean' },
  'no-neighbours': { type: 'boolean' },
  'no-hydrogen-bonds': { type: 'boolean' },
  'no-cell': { type: 'boolean' },
} as const satisfies OwnOptions;

const meanings: readonly ColourMeaning[] = [
  ...(['isotropic', 'span', 'anisotropy', 'asymmetry', 'vzz', 'coupling', 'residual'] as const),
  ...(['difference', 'element', 'site'] as const),
];

/** What the options say about the picture; what they leave open stays as it was. */
export function sceneOptionsOf(
  values: OwnValues,
  before: SceneOptions,
  dossier: CrystalDossier,
): SceneOptions {
  const text = (option: string): string | undefined => textOf(values, option);
  const said = {
    quantity: oneOf(text('quantity'), 'quantity', ['shielding', 'shift', 'efg']),
    glyph: oneOf(text('glyph'), 'glyph', ['ellipsoid', 'polar', 'axes']),
    part: oneOf(text('part'), 'part', ['symmetric', 'antisymmetric']),
    ellipsoid: oneOf(text('size'), 'size', ['total', 'deviation']),
    unitsPerAngstrom: numberWithin(text('scale'), 'scale', 1e-6, 1e6) ?? undefined,
    colourBy: oneOf(text('colour-by'), 'colour-by', meanings),
    colourMap: oneOf(text('map'), 'map', ['batlow', 'vik']),
    colourLimits: limitsOf(text('limits')),
    extent: extentOf(values),
    range: rangeOf(text('range')),
    shell: shellOf(values, dossier),
    tensorElements: elementsOf(text('elements'), 'elements', dossier),
    tensorSites: sitesOf(text('sites'), 'sites', dossier)?.map(({ index }) => index),
    tensorCopies: oneOf(text('copies'), 'copies', ['all', 'first', 'orientations']),
    labels: values['labels'] === true || text('label-with') !== undefined || undefined,
    labelContent: oneOf(text('label-with'), 'label-with', ['site', 'element', 'value']),
    polyhedra: elementsOf(text('polyhedra'), 'polyhedra', dossier),
    displacement: oneOf(text('displacement'), 'displacement', ['none', 'beside', 'instead']),
    displacementProbability: numberWithin(text('probability'), 'probability', 0.01, 0.99) ?? undefined,
    showTensors: values['no-tensors'] === true ? false : undefined,
    bonds: values['no-bonds'] === true ? false : undefined,
    bondedNeighbours: values['no-neighbours'] === true ? false : undefined,
    hydrogenBonds: values['no-hydrogen-bonds'] === true ? false : undefined,
    cellEdges: values['no-cell'] === true ? false : undefined,
  };
  const given = Object.fromEntries(Object.entries(said).filter(([, value]) => value !== undefined));
  return { ...before, ...given };
}

function limitsOf(text: string | undefined): readonly [number, number] | undefined {
  if (text === undefined) return undefined;
  const [low, high, more] = text
    .split(',')
    .map((word) => (word.trim() === '' ? NaN : Number(word.replace('−', '-'))));
  const isGood = more === undefined && Number.isFinite(low) && Number.isFinite(high) && low! < high!;
  if (!isGood) throw new UsageError(`--limits ${text}: write the lower and the upper end, such as 20,180.`);
  return [low!, high!];
}

function extentOf(values: OwnValues): SceneOptions['extent'] | undefined {
  const extent = oneOf(textOf(values, 'extent'), 'extent', [
    ...(['cell', 'molecules', 'asymmetric', 'range', 'shell'] as const),
  ]);
  const implied =
    textOf(values, 'range') !== undefined
      ? 'range'
      : textOf(values, 'shell') !== undefined
        ? 'shell'
        : undefined;
  if (textOf(values, 'range') !== undefined && textOf(values, 'shell') !== undefined)
    throw new UsageError('--range and --shell exclude each other: give one of them.');
  if (extent !== undefined && implied !== undefined && extent !== implied)
    throw new UsageError(`--extent ${extent} leaves no room for --${implied}: give one of them.`);
  if (extent === 'range' && implied !== 'range')
    throw new UsageError('--extent range needs --range, such as --range 0:2,0:1,0:1.5.');
  if (extent === 'shell' && implied !== 'shell')
    throw new UsageError('--extent shell needs --shell, such as --shell Si1.');
  return extent ?? implied;
}

function rangeOf(text: string | undefined): readonly [Vec3, Vec3] | undefined {
  if (text === undefined) return undefined;
  const pairs = text
    .split(',')
    .map((part) =>
      part.split(':').map((word) => (word.trim() === '' ? NaN : Number(word.replace('−', '-')))),
    );
  const isGood =
    pairs.length === 3 &&
    pairs.every(
      ([from, to, more]) =>
        more === undefined && from! < to! && Math.abs(from!) <= 100 && Math.abs(to!) <= 100,
    );
  if (!isGood)
    throw new UsageError(
      `--range ${text}: write three ranges of cells along a, b, c, such as 0:2,0:1,-0.5:1.5.`,
    );
  const corner = (k: 0 | 1): Vec3 => [pairs[0]![k]!, pairs[1]![k]!, pairs[2]![k]!];
  return [corner(0), corner(1)];
}

function shellOf(values: OwnValues, dossier: CrystalDossier): SceneOptions['shell'] | undefined {
  const middle = sitesOf(textOf(values, 'shell'), 'shell', dossier);
  const radius = numberWithin(textOf(values, 'radius'), 'radius', 0.5, 50);
  if (!middle) {
    if (radius !== null) throw new UsageError('--radius needs --shell SITE.');
    return undefined;
  }
  return { siteIndices: middle.map(({ index }) => index), radiusAngstrom: radius ?? 3 };
}

function elementsOf(
  text: string | undefined,
  option: string,
  { sites }: CrystalDossier,
): string[] | undefined {
  if (text === undefined) return undefined;
  const known = [...new Set(sites.map(({ element }) => element))];
  return text.split(',').map((word) => {
    const found = known.find((element) => element.toLowerCase() === word.trim().toLowerCase());
    if (found === undefined) throw new UsageError(`--${option} ${text}: allowed are ${known.join(', ')}.`);
    return found;
  });
}

function sitesOf(
  text: string | undefined,
  option: string,
  { sites }: CrystalDossier,
): SiteDossier[] | undefined {
  if (text === undefined) return undefined;
  return text.split(',').map((word) => {
    const found = sites.find(({ label }) => label === word.trim());
    if (found) return found;
    const some = sites
      .slice(0, 20)
      .map(({ label }) => label)
      .join(', ');
    throw new UsageError(
      `--${option} ${word}: no such site; there are ${some}${sites.length > 20 ? ' …' : ''}.${option === 'shell' ? ' The distance is an option of its own: --shell SITE --radius 3.' : ''}`,
    );
  });
}
