import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pixelsPerAngstrom, turnAbout } from '#src/scene/camera.ts';
import { firstCamera, fit, lookAlong } from '#src/scene/framing.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { Block } from './block.ts';
import { column, flowed, stacked } from './block.ts';
import type { BlockStyle } from './blocks.ts';
import {
  axesBlock,
  keyBlock,
  legendBlock,
  scaleBlock,
  signsBlock,
  subjectBlock,
  textBlock,
} from './blocks.ts';
import type { FigureRequest } from './figure-request.ts';
import { figureThemes, thinnestLinePt } from './figure-theme.ts';
import type { TextRun } from './font/set-text.ts';
import { baselineOf, breakLines, lineHeight, runsOf, setText } from './font/set-text.ts';
import type { CrystalPlace, Sheet, SheetItem } from './sheet.ts';

/** A rectangle of the sheet, points. */
interface Place {
  readonly xPt: number;
  readonly yPt: number;
  readonly widthPt: number;
  readonly heightPt: number;
}

/** Share of the crystal's place left free on each side; more where labels stand round the atoms. */
const crystalMargin = { plain: 0.02, labelled: 0.055 } as const;

/** Margin of the sheet, of the text size. */
const marginEm = 0.9;
/** Widths that notes beside a colour bar below the crystal may have: the first that makes the strip lowest. Widest column beside it. */
const noteEms = [9.2, 12, 15.5] as const;
const columnEm = 15.5;
/** A caption is set smaller than the letters in the picture, but not below what print takes. */
const captionSize = { share: 0.85, leastPt: 6 } as const;

/** A crystal lower than this is a smear. Our own choice. */
const leastCrystalEm = 3;

/** Height over width that a figure takes by itself. */
const heightShare = { least: 0.35, most: 1.25 } as const;

/** A crystal that would be larger by this factor, lying on its side, is turned. Our own choice. */
const turningGain = 1.35;
/** A column beside a crystal on a sheet of free height may cost it this share of its size, for it saves the strip below. */
const columnCost = 0.02;

/**
 * Lays out a figure: the crystal as large as it can be, what belongs to it in a strip below or in a column beside it, whichever
 * leaves the crystal larger. A long crystal that stands across a sheet of fixed size is laid on its side, unless it is to stay
 * upright. Pure: the same scene and request give the same sheet.
 */
export function layoutFigure(scene: Scene, request: FigureRequest): Sheet {
  const upright = laidOut(scene, request);
  const turned = turnedRequest(scene, request);
  if (!turned) return upright;
  const lying = { ...laidOut(scene, turned), isTurned: true };
  const leastHeightPt = Math.min(upright.leastHeightPt, lying.leastHeightPt);
  const [isWholeUpright, isWholeLying] = [upright, lying].map(
    (sheet) => sheet.leastHeightPt <= sheet.heightPt,
  );
  const isBetter = scaleOf(lying) > turningGain * scaleOf(upright);
  const chosen = (isWholeLying === isWholeUpright ? isBetter : isWholeLying) ? lying : upright;
  return { ...chosen, leastHeightPt };
}

/** The same view turned by a quarter, so that what was up is at the right; null where size or view leave no choice. */
function turnedRequest(scene: Scene, request: FigureRequest): FigureRequest | null {
  const { view, heightPt } = request;
  if (heightPt === null || view.kind !== 'direction' || view.isUpright) return null;
  const viewport: Viewport = { widthPx: 400, heightPx: 400 };
  const camera = turnAbout(cameraFor(scene, request, viewport), [0, 0, 1], -Math.PI / 2);
  return { ...request, view: { kind: 'camera', camera, viewport, wholeCrystal: true, words: view.words } };
}

function laidOut(scene: Scene, request: FigureRequest): Sheet {
  const { heightPt, chosen } =
    request.heightPt === null ? ofFreeHeight(scene, request) : ofHeight(scene, request, request.heightPt);
  const labels = labelItems(scene, request, chosen.crystal);
  return {
    widthPt: request.widthPt,
    heightPt,
    crystal: chosen.crystal,
    leastHeightPt: chosen.leastHeightPt,
    items: [...labels.items, ...chosen.items],
    labelsLeftOut: labels.leftOut,
    isTurned: false,
  };
}

interface Choice {
  readonly heightPt: number;
  readonly chosen: Arrangement;
}

function ofHeight(scene: Scene, request: FigureRequest, heightPt: number): Choice {
  const below = arranged(scene, request, heightPt, 'below');
  const beside = arranged(scene, request, heightPt, 'beside');
  const leastHeightPt = Math.min(below.leastHeightPt, beside.leastHeightPt);
  return { heightPt, chosen: { ...betterOf(beside, below, heightPt), leastHeightPt } };
}

/** With a strip below; or lower, with a column, where a narrow crystal leaves the room for it at its side. */
function ofFreeHeight(scene: Scene, request: FigureRequest): Choice {
  const camera = cameraFor(scene, request, { widthPx: 400, heightPx: 400 });
  const { heightPt, stripPt } = naturalHeight(scene, request, camera);
  const below = arranged(scene, request, heightPt, 'below');
  const lowPt = heightPt - stripPt;
  const beside = arranged(scene, request, lowPt, 'beside');
  const isAsLarge = scaleOf(beside) >= (1 - columnCost) * scaleOf(below);
  return stripPt > 0 && isAsLarge && beside.leastHeightPt <= lowPt
    ? { heightPt: lowPt, chosen: beside }
    : { heightPt, chosen: below };
}

interface Arrangement {
  readonly crystal: CrystalPlace;
  /** Of a sheet that holds all of it. */
  readonly leastHeightPt: number;
  readonly items: readonly SheetItem[];
}

/** The one that holds everything; of two such the one with the larger crystal. */
function betterOf(beside: Arrangement, below: Arrangement, heightPt: number): Arrangement {
  const [hasBeside, hasBelow] = [beside, below].map(({ leastHeightPt }) => leastHeightPt <= heightPt);
  if (hasBeside !== hasBelow) return hasBeside ? beside : below;
  return scaleOf(beside) > scaleOf(below) ? beside : below;
}

/** Points for one Å. */
function scaleOf({ crystal }: Pick<Arrangement, 'crystal'>): number {
  return pixelsPerAngstrom(crystal.camera, crystal.viewport) * crystal.pointsPerCssPx;
}

/** The scene's CSS pixel is a twelfth of the letters' size: lines and letters keep their proportion at every size. */
function cssPixelPt(request: FigureRequest): number {
  return request.textPt / 12;
}

function arranged(
  scene: Scene,
  request: FigureRequest,
  heightPt: number,
  kind: 'below' | 'beside',
): Arrangement {
  const { widthPt, textPt } = request;
  const margin = marginEm * textPt;
  const head = headBlock(request);
  const foot = captionBlock(scene, request);
  const top = head ? margin + head.heightPt : 0;
  const bottom = heightPt - (foot ? foot.heightPt + margin : 0);
  const widths = noteWidths(scene, request, kind);
  const blocks = blocksFor(scene, request, widths, null);
  const strip = kind === 'below' ? flowed(blocks, widthPt - 2 * margin, textPt) : column(blocks, textPt, 0);
  const isEmpty = blocks.length === 0;
  const taken = isEmpty ? 0 : (kind === 'below' ? strip.heightPt : strip.widthPt) + margin;
  const place: Place = {
    xPt: 0,
    yPt: top,
    widthPt: Math.max(textPt, widthPt - (kind === 'beside' ? taken : 0)),
    heightPt: Math.max(textPt, bottom - top - (kind === 'below' ? taken : 0)),
  };
  const crystal = crystalIn(scene, request, kind === 'beside' ? centred(scene, request, place) : place);
  // The ruler's length is known only now; the room for it was reserved.
  const final = blocksFor(scene, request, widths, scaleOf({ crystal }));
  const items =
    kind === 'below'
      ? flowed(final, widthPt - 2 * margin, textPt).itemsAt(margin, crystal.yPt + crystal.heightPt)
      : beside(final, textPt, crystal, bottom);
  const rest = top + heightPt - bottom;
  return {
    crystal,
    leastHeightPt:
      kind === 'below'
        ? rest + taken + leastCrystalEm * textPt
        : rest + Math.max(leastCrystalEm * textPt, strip.heightPt + 2 * margin),
    items: [...(head?.itemsAt(margin, margin) ?? []), ...items, ...(foot?.itemsAt(margin, bottom) ?? [])],
  };
}

function beside(blocks: readonly Block[], textPt: number, place: Place, bottom: number): SheetItem[] {
  const stack = column(blocks, textPt, bottom - place.yPt - 2 * marginEm * textPt);
  const yPt = Math.max(place.yPt, bottom - stack.heightPt - 1.2 * marginEm * textPt);
  return stack.itemsAt(place.xPt + place.widthPt, yPt);
}

/** A narrow crystal keeps the column near: crystal and column stand in the middle of the sheet together. */
function centred(scene: Scene, request: FigureRequest, place: Place): Place {
  if (request.view.kind === 'camera' && !request.view.wholeCrystal) return place;
  const { camera, viewport, pointsPerCssPx } = crystalIn(scene, request, place);
  const perAngstrom = pixelsPerAngstrom(camera, viewport) * pointsPerCssPx;
  const needed = viewBox(scene, camera).widthAngstrom * perAngstrom + 8 * request.textPt;
  const spare = Math.max(0, place.widthPt - needed);
  return { ...place, xPt: place.xPt + spare / 2, widthPt: place.widthPt - spare };
}

/** Box of the crystal as it is turned, without perspective. */
function viewBox(scene: Scene, { orientation }: Camera): { widthAngstrom: number; heightAngstrom: number } {
  const zoomIn = (widthPx: number, heightPx: number): number =>
    fit(scene, orientation, { widthPx, heightPx }, 0).zoom;
  return { widthAngstrom: 1 / zoomIn(1, 1000), heightAngstrom: 1 / zoomIn(1000, 1) };
}

function headBlock({ title, widthPt, textPt, theme }: FigureRequest): Block | null {
  if (title === '') return null;
  const sizePt = 1.25 * textPt;
  const lines = breakLines(title, sizePt, widthPt - 2 * marginEm * textPt);
  return textBlock(lines, sizePt, figureThemes[theme].ink);
}

function captionBlock(scene: Scene, { contents, widthPt, textPt, theme }: FigureRequest): Block | null {
  if (!contents.caption) return null;
  const sizePt = Math.max(Math.min(captionSize.leastPt, textPt), captionSize.share * textPt);
  const lines = breakLines(scene.caption, sizePt, widthPt - 2 * marginEm * textPt);
  return textBlock(lines, sizePt, figureThemes[theme].soft);
}

/** Greatest widths of what stands beside the crystal, points. */
interface NoteWidths {
  readonly bar: number;
  readonly scale: number;
  readonly key: number;
}

/** In a column all of it; in a strip those that leave the strip lowest, then those with the fewest lines, then the narrowest. */
function noteWidths(scene: Scene, request: FigureRequest, kind: 'below' | 'beside'): NoteWidths {
  const { widthPt, textPt } = request;
  const column = columnEm * textPt;
  if (kind === 'beside') return { bar: column, scale: column, key: column };
  const bar = widthPt - 2 * marginEm * textPt;
  const notes = noteEms.map((em) => Math.min(bar, em * textPt));
  const choices = [...notes, bar].flatMap((key) => notes.map((scale) => ({ bar, scale, key })));
  const costs = choices.map((choice) => {
    const blocks = blocksFor(scene, request, choice, null);
    const lines = blocks.reduce((sum, { heightPt }) => sum + heightPt, 0);
    return flowed(blocks, bar, textPt).heightPt + 0.01 * lines;
  });
  // heights that differ by rounding are the same
  const low = Math.min(...costs) + 0.001 * textPt;
  return choices[costs.findIndex((cost) => cost <= low)]!;
}

/** What stands beside the crystal, in order. Before the scale is known, the ruler takes as much room as it may. */
function blocksFor(
  scene: Scene,
  request: FigureRequest,
  widths: NoteWidths,
  pointsPerAngstrom: number | null,
): Block[] {
  const { contents, textPt, theme } = request;
  const style: BlockStyle = { textPt, theme: figureThemes[theme] };
  const orientation = cameraFor(scene, request, { widthPx: 400, heightPx: 400 });
  const axes = contents.axes ? axesBlock(scene, orientation, style) : null;
  const legend = contents.legend ? meaningBlock(scene, widths.bar, style) : null;
  const isFlat = request.look.perspectiveDegrees === 0 && !(orientation.perspectiveDegrees ?? 0);
  const scale = contents.scale
    ? scaleBlock(
        scene,
        isFlat ? (pointsPerAngstrom ?? (6.4 * textPt) / 10) : null,
        widths.scale,
        style,
        !contents.caption,
      )
    : null;
  const key = contents.elementKey ? keyBlock(scene, widths.key, style) : null;
  const words = contents.viewDirection ? request.view.words : null;
  const view =
    words === null ? null : textBlock(viewLines(words, textPt, widths.scale), textPt, style.theme.soft);
  const orientated = [axes, view].filter((block) => block !== null);
  const first = orientated.length > 0 ? stacked(orientated, 0.4 * textPt) : null;
  return [first, legend, scale, key].filter((block) => block !== null);
}

/** What the glyphs are and what their colours say. */
function meaningBlock(scene: Scene, maxWidthPt: number, style: BlockStyle): Block | null {
  const bar = scene.legend && legendBlock(scene.legend, maxWidthPt, style);
  const most = Math.min(maxWidthPt, columnEm * style.textPt);
  const parts = [subjectBlock(scene, maxWidthPt, style), signsBlock(scene, most, style), bar].filter(
    (block) => block !== null,
  );
  return parts.length === 0 ? null : stacked(parts, 0.3 * style.textPt);
}

/** Letters of axes are italic. */
function viewLines(words: string, textPt: number, widthPt: number): (readonly TextRun[])[] {
  const match = /^(viewed along −?)([abcxyz])(\*?)$/.exec(words);
  if (!match) return breakLines(words, textPt, widthPt);
  return [[{ text: match[1]! }, { text: match[2]!, style: 'italic' }, { text: match[3]! }]];
}

/** The crystal in its place: all of it, or what the screen showed. */
function crystalIn(scene: Scene, request: FigureRequest, place: Place): CrystalPlace {
  const pointsPerCssPx = cssPixelPt(request);
  const viewport: Viewport = {
    widthPx: place.widthPt / pointsPerCssPx,
    heightPx: place.heightPt / pointsPerCssPx,
  };
  return { ...place, viewport, pointsPerCssPx, camera: cameraFor(scene, request, viewport) };
}

function cameraFor(scene: Scene, { view, look }: FigureRequest, viewport: Viewport): Camera {
  const margin = scene.labels.length > 0 ? crystalMargin.labelled : crystalMargin.plain;
  if (view.kind === 'direction') {
    const first = firstCamera(scene, viewport);
    const turned = view.towards === null ? first : lookAlong(first, scene, view.towards);
    return fit(scene, turned.orientation, viewport, margin, look.perspectiveDegrees);
  }
  if (view.wholeCrystal) {
    return fit(scene, view.camera.orientation, viewport, margin, view.camera.perspectiveDegrees ?? 0);
  }
  // Everything the screen showed along both sides stays in.
  const shown = pixelsPerAngstrom(view.camera, view.viewport);
  const perAngstrom = Math.min(
    (shown * viewport.widthPx) / view.viewport.widthPx,
    (shown * viewport.heightPx) / view.viewport.heightPx,
  );
  return { ...view.camera, zoom: perAngstrom / Math.max(1, Math.min(viewport.widthPx, viewport.heightPx)) };
}

/** The height at which the crystal fills the width, within bounds; with room for what stands below, which takes `stripPt` of it. */
function naturalHeight(
  scene: Scene,
  request: FigureRequest,
  camera: Camera,
): { readonly heightPt: number; readonly stripPt: number } {
  const { widthPt, textPt } = request;
  const box = viewBox(scene, camera);
  const wanted = box.heightAngstrom / box.widthAngstrom;
  const share = Math.min(heightShare.most, Math.max(heightShare.least, wanted));
  const margin = marginEm * textPt;
  const widths = noteWidths(scene, request, 'below');
  const strip = flowed(blocksFor(scene, request, widths, null), widthPt - 2 * margin, textPt);
  const head = headBlock(request);
  const foot = captionBlock(scene, request);
  const stripPt = strip.heightPt > 0 ? strip.heightPt + margin : 0;
  const others = (head ? head.heightPt + margin : 0) + (foot ? foot.heightPt + margin : 0);
  return { heightPt: share * widthPt + stripPt + others, stripPt };
}

/** Labels beside their atoms, by the same placement as on screen, measured in the letters they are drawn with. */
function labelItems(
  scene: Scene,
  request: FigureRequest,
  crystal: CrystalPlace,
): { readonly items: SheetItem[]; readonly leftOut: number } {
  const { textPt, theme } = request;
  const { ink, render } = figureThemes[theme];
  const { pointsPerCssPx } = crystal;
  const measure = (text: string): { widthPx: number; heightPx: number } => ({
    widthPx: setText(runsOf(text), textPt).widthPt / pointsPerCssPx,
    heightPx: lineHeight(textPt) / pointsPerCssPx,
  });
  const placed = placeLabels(scene, crystal.camera, crystal.viewport, measure);
  const onSheet = (xPx: number, yPx: number): { xPt: number; yPt: number } => ({
    xPt: crystal.xPt + xPx * pointsPerCssPx,
    yPt: crystal.yPt + yPx * pointsPerCssPx,
  });
  const leaders = placed.flatMap(({ leader }): SheetItem[] => {
    if (!leader) return [];
    const [from, to] = [onSheet(leader[0], leader[1]), onSheet(leader[2], leader[3])];
    const widthPt = Math.max(thinnestLinePt, 0.06 * textPt);
    const ends = { x1Pt: from.xPt, y1Pt: from.yPt, x2Pt: to.xPt, y2Pt: to.yPt };
    const dot = { kind: 'disc', xPt: from.xPt, yPt: from.yPt } as const;
    return [
      { kind: 'line', ...ends, widthPt, colour: ink, ends: 'flat' },
      // on a rim of paper the dot shows over every colour
      { ...dot, radiusPt: 2.6 * widthPt, colour: render.paper },
      { ...dot, radiusPt: 1.8 * widthPt, colour: ink },
    ];
  });
  const texts = placed.map(({ text, leftPx, topPx }): SheetItem => {
    const { xPt, yPt } = onSheet(leftPx, topPx);
    const base = yPt + baselineOf(textPt);
    return {
      kind: 'text',
      runs: runsOf(text),
      xPt,
      yPt: base,
      sizePt: textPt,
      colour: ink,
      halo: render.paper,
    };
  });
  return { items: [...leaders, ...texts], leftOut: scene.labels.length - placed.length };
}
