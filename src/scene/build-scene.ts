import { siteColourBytes } from '#src/data/site-colour.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { atomQuadrics } from './atom-layer.ts';
import type { AtomsLook } from './atom-layer.ts';
import { atomColour, bondColour } from './atom-style.ts';
import { bondCylinders } from './bond-layer.ts';
import { caption, scaleStatement } from './caption.ts';
import type { CaptionParts, TensorCaption } from './caption.ts';
import { cellAxes, cellEdges, cellFrame } from './cell-layer.ts';
import type { Cylinder } from './cylinder-list.ts';
import { packedCylinders } from './cylinder-list.ts';
import { displacementShapes } from './displacement.ts';
import type { DisplacementShapes } from './displacement.ts';
import { drawTensors } from './draw-tensors.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { chooseAtoms, drawableSites } from './extent.ts';
import { atomLabels } from './label-text.ts';
import { occupancyLooks } from './occupancy.ts';
import { coordinationPolyhedra } from './polyhedra-layer.ts';
import { sceneBounds } from './scene-bounds.ts';
import type { ElementKey, PolarBatch, Scene } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import type { KeyParts } from './picture-key.ts';
import { pictureKey } from './picture-key.ts';
import { defaultSceneOptions } from './scene-options.ts';
import { sharedPositions } from './shared-positions.ts';
import { chooseTensors, elementsWithTensors, lobeColours, siteColours } from './tensor-choice.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import { axialArrows, axisRods, polarSurfaces } from './tensor-drawing.ts';
import type { TensorDrawing } from './tensor-drawing.ts';
import type { TensorSizes } from './tensor-sizes.ts';
import { sizeSentences, tensorSizes } from './tensor-sizes.ts';
import { unfollowedWishes } from './unfollowed.ts';
import { disorderPatterns, visibleSites } from './visible-sites.ts';
import type { VisibleSites } from './visible-sites.ts';

/**
 * The plain description of one picture: everything a renderer needs, in Å, in the Cartesian frame of the crystal's
 * lattice. Options not given are automatic; what was chosen stands in the caption. Linear in atoms and bonds.
 */
export function buildScene(whole: CrystalDossier, options: Partial<SceneOptions> = {}): Scene {
  const asked: SceneOptions = { ...defaultSceneOptions, ...options };
  const dossier = drawableSites(whole, asked.extent);
  const displacement = displacementOf(dossier, asked);
  const chosen = { ...asked, showTensors: asked.showTensors && displacement?.mode !== 'instead' };
  const visible = visibleSites(dossier, chosen.disorder);
  const drawn = chooseAtoms({ dossier, hidden: visible.hidden }, chosen);
  const { atoms } = drawn;
  const choice = chooseTensors(dossier, chosen);
  const tensors = choice && drawTensors(dossier, atoms, choice, chosen);
  const drawing = tensors?.drawing ?? null;
  const look = looksOf(dossier, visible, drawing, displacement, chosen);
  const glyphs = glyphsOf(atoms, drawing);
  const { quadrics, picks } = atomQuadrics(atoms, look);
  const shown = { ...chosen, neutral: look.isNeutral, thin: glyphs.rods.length > 0 };
  const bonds = bondCylinders(dossier, atoms, shown, picks.length);
  const polyhedra = polyhedraOf(dossier, atoms, drawing, look, chosen);
  const cylinders = packedCylinders([...bonds.cylinders, ...glyphs.rods, ...polyhedra.edges]);
  const lines = cellEdges(dossier, chosen.cellEdges, drawn.range);
  const scale = drawing?.scale ?? null;
  const sizes = drawing && sizesOf(dossier, drawing, chosen);
  const polars = glyphs.polars ? { polars: glyphs.polars } : {};
  return {
    quadrics,
    cylinders,
    lines,
    ...polars,
    ...(polyhedra.facets.count > 0 ? { facets: polyhedra.facets } : {}),
    labels: chosen.labels ? atomLabels(atoms, chosen.labelContent, choice?.coloured ?? null) : [],
    axes: cellAxes(dossier),
    bounds: sceneBounds({ quadrics, lines, cylinders, ...polars }),
    picks: [...picks, ...bonds.picks],
    legend: choice?.legend ?? null,
    elements: elementKeys(atoms, drawing, look),
    scale,
    scaleStatement: scale && scaleStatement(scale),
    caption: caption({
      tensors: drawing && sizes && tensorCaption(dossier, drawing, sizes, chosen, look),
      askedFor: chosen.quantity !== 'auto' && chosen.quantity !== choice?.quantity ? chosen.quantity : null,
      isSiteColoured: look.isSiteColoured,
      displacement: displacement && { ...displacement, probability: chosen.displacementProbability },
      chosen: drawn,
      hasCell: dossier.lattice !== null,
      atomsInCell: dossier.atomsInCell,
      isShared: visible.isShared,
      polyhedra: polyhedra.count > 0 ? chosen.polyhedra : [],
      ...marksOf(atoms, look),
      labels: chosen.labels && chosen.labelContent === 'value' && choice ? labelWords(choice) : null,
      notes: [
        ...visible.notes,
        ...(choice?.notes ?? []),
        ...(tensors?.notes ?? []),
        ...(drawing && dossier.orientation ? [dossier.orientation.sentence] : []),
        ...(asked.displacement !== 'none' && !displacement ? [noDisplacements] : []),
      ],
    }),
    extent: drawn.extent,
    siteColours: siteColours(whole, choice),
    ...(choice?.colourBy === 'sign' ? { lobeColours } : {}),
    key: pictureKey({
      ...keyParts(atoms, drawing, look, displacement && chosen.displacementProbability),
      ...(drawing && sizes ? sizeKey(dossier, atoms, drawing, sizes) : { tiny: [], elementsWords: null }),
    }),
    unfollowed: unfollowedWishes(asked, {
      choice,
      scale,
      hasDisplacement: displacement !== null,
      polyhedra: polyhedra.count,
      atoms: drawn,
      hasCell: dossier.lattice !== null,
    }),
    colourNotes: choice?.notes ?? [],
    sizeNotes: sizes && scale ? sizeSentences(sizes, scale.quantity) : [],
    drawnInstead: sharedPositions(dossier).drawnInstead,
    tensorElements: choice?.elements ?? null,
  };
}

const noDisplacements = 'The file gives no displacements, so none are drawn.';

interface ShownDisplacement extends DisplacementShapes {
  readonly mode: 'beside' | 'instead';
}

/** Displacement ellipsoids, where they are asked for and the file has any. */
function displacementOf(dossier: CrystalDossier, options: SceneOptions): ShownDisplacement | null {
  if (options.displacement === 'none') return null;
  const found = displacementShapes(dossier, options.displacementProbability);
  const isEmpty = found.shapes.size === 0 && found.impossible.length === 0;
  return isEmpty ? null : { ...found, mode: options.displacement };
}

function looksOf(
  dossier: CrystalDossier,
  visible: VisibleSites,
  tensors: TensorDrawing | null,
  displacement: ShownDisplacement | null,
  options: SceneOptions,
): AtomsLook {
  const disorder =
    options.disorder === 'patterns' ? disorderPatterns(dossier, visible.hidden) : new Map<number, number>();
  const hasAlternatives = [...disorder.values()].some((pattern) => pattern > 0);
  const isSiteColoured = options.colourBy === 'site';
  return {
    tensors,
    displacement: displacement && { shapes: displacement.shapes, circles: displacement.mode === 'instead' },
    occupancy: options.occupancy ? occupancyLooks(dossier) : new Map(),
    patterns: hasAlternatives ? disorder : negativeSites(tensors),
    hasDisorderPatterns: hasAlternatives,
    isSiteColoured,
    isNeutral: isSiteColoured || (tensors !== null && tensors.choice.colourBy !== 'element'),
    frame: cellFrame(dossier),
  };
}

/** As QuadricBatch.patterns. */
const dotted = 2;

/** Dotted (stripes would pass for principal circles): sites with a negative value where the colour bar runs through zero. Lobes have stripes. */
function negativeSites(tensors: TensorDrawing | null): Map<number, number> {
  const dots = new Map<number, number>();
  if (tensors?.choice.legend?.map !== 'vik' || isLobes(tensors)) return dots;
  for (const [index, value] of tensors.choice.values) if (value < 0) dots.set(index, dotted);
  return dots;
}

function isLobes({ scale }: TensorDrawing): boolean {
  return scale.glyph === 'polar' && scale.part !== 'antisymmetric';
}

interface Glyphs {
  readonly rods: readonly Cylinder[];
  readonly polars: PolarBatch | null;
}

/** What stands for tensors besides the quadrics of the atoms. */
function glyphsOf(atoms: readonly DrawnAtom[], tensors: TensorDrawing | null): Glyphs {
  if (tensors?.scale.part === 'antisymmetric') return { rods: axialArrows(atoms, tensors), polars: null };
  if (tensors?.scale.glyph === 'axes') return { rods: axisRods(atoms, tensors), polars: null };
  return { rods: [], polars: tensors && isLobes(tensors) ? polarSurfaces(atoms, tensors) : null };
}

/** Polyhedra have the colour of the value of the atom in them, or grey beside such colours, else the element's. */
function polyhedraOf(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  tensors: TensorDrawing | null,
  look: AtomsLook,
  options: SceneOptions,
): ReturnType<typeof coordinationPolyhedra> {
  const colourOf = (index: number): readonly [number, number, number] => {
    const { site } = atoms[index]!;
    if (look.isSiteColoured) return siteColourBytes(site.index);
    const valued = tensors?.choice.legend && tensors.carries[index];
    const own = valued ? tensors.choice.colours.get(site.index) : undefined;
    return own ?? (look.isNeutral ? bondColour(site.element, true) : atomColour(site.element));
  };
  return coordinationPolyhedra({ dossier, atoms, elements: options.polyhedra, colourOf });
}

/** What one scale hides: an axial vector has a scale of its own, and is as small as it is. */
function sizesOf(
  dossier: CrystalDossier,
  { choice, scale }: TensorDrawing,
  options: SceneOptions,
): TensorSizes {
  const { quantity, elements, isOwnChoice, forms } = choice;
  if (scale.part === 'antisymmetric') return { largest: null, tiny: [], leftOut: [] };
  const leftOut =
    isOwnChoice && options.tensorSites === null
      ? elementsWithTensors(dossier, quantity).filter((element) => !elements?.includes(element))
      : [];
  return tensorSizes(dossier, forms, scale, leftOut);
}

/** What the key says of sizes: elements too small to be seen, and why others have no tensor in the picture. */
function sizeKey(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  { choice }: TensorDrawing,
  { tiny, leftOut }: TensorSizes,
): Pick<KeyParts, 'tiny' | 'elementsWords'> {
  const names = (list: TensorSizes['tiny']): string[] => list.map(({ element }) => element);
  const own = new Set(atoms.filter(({ context }) => !context).map(({ site }) => site.element));
  const shown = new Set([...choice.forms.keys()].map((index) => dossier.sites[index]!.element));
  const plain = [...own].filter((element) => !shown.has(element));
  const having = new Set(elementsWithTensors(dossier, choice.quantity));
  const tooSmall = choice.quantity === 'efg' ? [] : names(leftOut);
  const isSmall = plain.length > 0 && plain.every((element) => tooSmall.includes(element));
  const isBare = plain.length > 0 && !plain.some((element) => having.has(element));
  const words = isSmall
    ? 'tensors too small to be seen at this scale'
    : isBare
      ? 'without a tensor'
      : plain.length > 0
        ? 'tensors not drawn'
        : 'atoms whose tensor is drawn elsewhere';
  return { tiny: names(tiny), elementsWords: choice.colourBy === 'element' ? null : words };
}

function tensorCaption(
  dossier: CrystalDossier,
  { choice, scale }: TensorDrawing,
  sizes: TensorSizes,
  options: SceneOptions,
  look: AtomsLook,
): TensorCaption {
  const { glyph, legend, colourBy, elements, forms } = choice;
  const isPart = options.tensorSites !== null;
  return {
    ...{ scale, glyph, legend, colourBy, elements },
    sites: isPart ? [...forms.keys()].map((index) => dossier.sites[index]!.label) : null,
    sizes,
    copies: options.tensorCopies,
    hasUndefinedAxes: [...forms.values()].some(({ axes }) => axes.includes(null)),
    isDotted: !look.hasDisorderPatterns && look.patterns.size > 0,
  };
}

function keyParts(
  atoms: readonly DrawnAtom[],
  drawing: TensorDrawing | null,
  look: AtomsLook,
  probability: number | null,
): Omit<KeyParts, 'tiny' | 'elementsWords'> {
  const { occupancy, hasDisorderPatterns } = marksOf(atoms, look);
  const own = look.isSiteColoured ? atoms.filter(({ context }) => !context) : [];
  return {
    drawing,
    colouredSites: [...new Set(own.map(({ site }) => site))],
    probability,
    ...occupancy,
    hasDisorderPatterns,
    isDotted: !look.hasDisorderPatterns && look.patterns.size > 0,
  };
}

/** What of the marks on spheres is really in the picture. */
function marksOf(
  atoms: readonly DrawnAtom[],
  look: AtomsLook,
): Pick<CaptionParts, 'occupancy' | 'hasDisorderPatterns'> {
  const kinds = new Set<string>();
  let hasDisorderPatterns = false;
  for (const { site, context } of atoms) {
    if (context) continue;
    kinds.add(look.occupancy.get(site.index)?.kind ?? '');
    hasDisorderPatterns ||= look.hasDisorderPatterns && (look.patterns.get(site.index) ?? 0) > 0;
  }
  return {
    occupancy: { hasPartial: kinds.has('partial'), hasMixed: kinds.has('mixed') },
    hasDisorderPatterns,
  };
}

function labelWords({ coloured }: ChosenTensors): string {
  return coloured.title + (coloured.unit ? ` in ${coloured.unit}` : '');
}

/** Elements of which some atom, or a share of one, is drawn in its element's colour. */
function elementKeys(
  atoms: readonly DrawnAtom[],
  tensors: TensorDrawing | null,
  look: AtomsLook,
): ElementKey[] {
  if (look.isSiteColoured) return [];
  const isOwnColour = ({ context }: DrawnAtom, i: number): boolean =>
    !context && !(tensors?.carries[i] && tensors.choice.colourBy !== 'element');
  const elements = new Set(atoms.filter(isOwnColour).map(({ site }) => site.element));
  for (const { site, context } of atoms) {
    const rest = context ? null : look.occupancy.get(site.index)?.restElement;
    if (rest) elements.add(rest);
  }
  return [...elements].map((element) => ({ element, colour: atomColour(element) }));
}
