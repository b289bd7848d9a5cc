import { lettersOfAxes } from '#src/scene/axes-letters.ts';
import { printed } from '#src/scene/printed.ts';
import type { Camera } from '#src/scene/camera.ts';
import { projectAxes } from '#src/scene/project.ts';
import type { Legend, PictureKey, Scene } from '#src/scene/scene.ts';
import type { Rgb } from '#src/scene/theme.ts';
import type { Block } from './block.ts';
import { inLines, stacked } from './block.ts';
import type { FigureTheme } from './figure-theme.ts';
import { thinnestLinePt } from './figure-theme.ts';
import type { TextRun } from './font/set-text.ts';
import { baselineOf, breakLines, lineHeight, runsOf, setText } from './font/set-text.ts';
import type { LineItem, SheetItem, TextItem } from './sheet.ts';

/** What all blocks of a figure share. */
export interface BlockStyle {
  readonly textPt: number;
  readonly theme: FigureTheme;
}

export function textItem(
  runs: readonly TextRun[],
  xPt: number,
  yPt: number,
  sizePt: number,
  colour: Rgb,
): TextItem {
  return { kind: 'text', runs, xPt, yPt, sizePt, colour, halo: null };
}

function strokePt(textPt: number, share: number): number {
  return Math.max(thinnestLinePt, share * textPt);
}

/** Lines of text, one below the other. */
export function textBlock(lines: readonly (readonly TextRun[])[], sizePt: number, colour: Rgb): Block {
  const widthPt = Math.max(0, ...lines.map((runs) => setText(runs, sizePt).widthPt));
  return {
    widthPt,
    heightPt: lines.length * lineHeight(sizePt),
    itemsAt: (xPt, yPt) =>
      lines.map((runs, k) =>
        textItem(runs, xPt, yPt + k * lineHeight(sizePt) + baselineOf(sizePt), sizePt, colour),
      ),
  };
}

/** Colour bar: quantity and unit above, limits below, zero in the middle where it diverges. */
export function legendBlock(legend: Legend, maxWidthPt: number, { textPt, theme }: BlockStyle): Block {
  const title = textBlock(
    breakLines(legend.unit === '' ? legend.title : `${legend.title}/${legend.unit}`, textPt, maxWidthPt),
    textPt,
    theme.ink,
  );
  const widthPt = Math.min(maxWidthPt, Math.max(title.widthPt, 11 * textPt));
  const barPt = 0.8 * textPt;
  const numbersTop = title.heightPt + 0.2 * textPt + barPt + 0.12 * textPt;
  return {
    widthPt,
    heightPt: numbersTop + lineHeight(textPt),
    itemsAt: (xPt, yPt) => [
      ...title.itemsAt(xPt, yPt),
      {
        kind: 'rectangle',
        xPt,
        yPt: yPt + title.heightPt + 0.2 * textPt,
        widthPt,
        heightPt: barPt,
        stops: legend.stops,
      },
      ...limitTexts(legend, xPt, yPt + numbersTop + baselineOf(textPt), widthPt, { textPt, theme }),
    ],
  };
}

function limitTexts(
  { low, high, digits, diverging }: Legend,
  xPt: number,
  yPt: number,
  widthPt: number,
  { textPt, theme }: BlockStyle,
): TextItem[] {
  const marks: readonly (readonly [share: number, text: string])[] = [
    [0, low.toFixed(digits)],
    ...(diverging ? [[0.5, '0'] as const] : []),
    [1, high.toFixed(digits)],
  ];
  return marks.map(([share, text]) => {
    const runs: TextRun[] = [{ text: text.replace('-', '−') }];
    const own = setText(runs, textPt).widthPt;
    return textItem(runs, xPt + share * (widthPt - own), yPt, textPt, theme.ink);
  });
}

/** What the glyphs are, in the place of a colour bar or above one of another quantity. */
export function subjectBlock(scene: Scene, maxWidthPt: number, { textPt, theme }: BlockStyle): Block | null {
  const subject = scene.key?.subject ?? null;
  return subject === null ? null : textBlock(breakLines(subject, textPt, maxWidthPt), textPt, theme.ink);
}

/** Lengths a ruler may have, Å. */
const rulerLengths = [100, 50, 20, 10, 5, 2, 1, 0.5, 0.2, 0.1];

/**
 * What lengths mean: a ruler with the tensor unit it stands for ("2 Å = 500 ppm"), without one in perspective, where no length
 * holds for the whole picture; then how tensors became lengths, unless that is said elsewhere.
 */
export function scaleBlock(
  scene: Scene,
  pointsPerAngstrom: number | null,
  maxWidthPt: number,
  style: BlockStyle,
  hasNote = true,
): Block | null {
  const { textPt, theme } = style;
  const words = hasNote ? (scene.key?.lengths ?? null) : null;
  const note = words === null ? [] : [textBlock(breakLines(words, textPt, maxWidthPt), textPt, theme.soft)];
  if (pointsPerAngstrom === null) {
    if (scene.scaleStatement === null) return null;
    return stacked([textBlock([runsOf(scene.scaleStatement)], textPt, theme.ink), ...note], 0);
  }
  const room = 6.5 * textPt;
  const length = rulerLengths.find((each) => each * pointsPerAngstrom <= room) ?? 0.1;
  const worth = scene.scale
    ? ` = ${printed(length * scene.scale.unitsPerAngstrom, 6)} ${scene.scale.quantity === 'efg' ? 'a.u.' : 'ppm'}`
    : '';
  const statement = textBlock([runsOf(`${printed(length)} Å${worth}`)], textPt, theme.ink);
  return stacked([rulerBlock(length * pointsPerAngstrom, style), statement, ...note], 0);
}

function rulerBlock(lengthPt: number, { textPt, theme }: BlockStyle): Block {
  const widthPt = strokePt(textPt, 0.1);
  const heightPt = 0.75 * textPt;
  return {
    widthPt: lengthPt,
    heightPt,
    itemsAt: (xPt, yPt) => {
      const line = (x1: number, y1: number, x2: number, y2: number): LineItem => ({
        kind: 'line',
        x1Pt: xPt + x1,
        y1Pt: yPt + y1,
        x2Pt: xPt + x2,
        y2Pt: yPt + y2,
        widthPt,
        colour: theme.ink,
        ends: 'flat',
      });
      const half = widthPt / 2;
      const middle = heightPt / 2;
      return [
        line(0, middle, lengthPt, middle),
        line(half, middle - 0.28 * textPt, half, middle + 0.28 * textPt),
        line(lengthPt - half, middle - 0.28 * textPt, lengthPt - half, middle + 0.28 * textPt),
      ];
    },
  };
}

/** Signs of polar surfaces. */
export function signsBlock(scene: Scene, maxWidthPt: number, style: BlockStyle): Block | null {
  return keyRows(signEntries(scene.key?.lobes ?? null), maxWidthPt, style);
}

/** What the plain colours and marks mean: sites, elements, then marks in words; side by side where the width holds them. */
export function keyBlock(scene: Scene, maxWidthPt: number, style: BlockStyle): Block | null {
  const { elements, key } = scene;
  const sites = (key?.sites ?? []).map(({ label, colour }) => ({ text: label, colour, isStriped: false }));
  const names = elements.map(({ element, colour }) => ({ text: element, colour, isStriped: false }));
  const more = key && key.moreSites > 0 ? [`and ${key.moreSites} more`] : [];
  const words = (texts: readonly string[]): Block[] =>
    texts.map((text) =>
      textBlock(breakLines(text, style.textPt, maxWidthPt), style.textPt, style.theme.soft),
    );
  const rows = [
    keyRows(sites, maxWidthPt, style),
    ...words(more),
    ...words(names.length > 0 && key?.elementsWords ? [`${key.elementsWords}:`] : []),
    keyRows(names, maxWidthPt, style),
    ...words(key?.marks ?? []),
  ].filter((row) => row !== null);
  return rows.length === 0 ? null : inLines(rows, maxWidthPt, style.textPt);
}

function signEntries(lobes: PictureKey['lobes']): KeyEntry[] {
  if (!lobes) return [];
  const { positive, negative, negativeWords } = lobes;
  const striped: KeyEntry = { text: negativeWords, colour: negative, isStriped: true };
  return positive ? [{ text: 'positive', colour: positive, isStriped: false }, striped] : [striped];
}

interface KeyEntry {
  readonly text: string;
  readonly colour: Rgb;
  readonly isStriped: boolean;
}

function keyRows(
  texts: readonly KeyEntry[],
  maxWidthPt: number,
  { textPt, theme }: BlockStyle,
): Block | null {
  const entries = texts.map(({ text, colour, isStriped }) => {
    const runs: TextRun[] = [{ text }];
    return { runs, colour, isStriped, widthPt: 1.15 * textPt + setText(runs, textPt).widthPt };
  });
  if (entries.length === 0) return null;
  const gap = 0.9 * textPt;
  const places: { x: number; row: number }[] = [];
  let [x, row, widthPt] = [0, 0, 0];
  for (const entry of entries) {
    if (x > 0 && x + entry.widthPt > maxWidthPt) [x, row] = [0, row + 1];
    places.push({ x, row });
    widthPt = Math.max(widthPt, x + entry.widthPt);
    x += entry.widthPt + gap;
  }
  return {
    widthPt,
    heightPt: (row + 1) * lineHeight(textPt),
    itemsAt: (xPt, yPt) =>
      entries.flatMap(({ runs, colour, isStriped }, k): SheetItem[] => {
        const left = xPt + places[k]!.x;
        const base = yPt + places[k]!.row * lineHeight(textPt) + baselineOf(textPt);
        const radiusPt = 0.4 * textPt;
        return [
          ...ball(left + radiusPt, base - 0.355 * textPt, radiusPt, colour, isStriped),
          textItem(runs, left + 1.15 * textPt, base, textPt, theme.ink),
        ];
      }),
  };
}

/** A disc of a colour, with stripes where negative lobes have them. */
function ball(xPt: number, yPt: number, radiusPt: number, colour: Rgb, isStriped: boolean): SheetItem[] {
  const disc: SheetItem = { kind: 'disc', xPt, yPt, radiusPt, colour };
  if (!isStriped) return [disc];
  const dark: Rgb = [0.7 * colour[0], 0.7 * colour[1], 0.7 * colour[2]];
  const stripes = [-0.5, 0, 0.5].map((share): SheetItem => {
    const half = radiusPt * Math.sqrt(1 - share * share);
    const y = yPt + share * radiusPt;
    const ends = { x1Pt: xPt - half, y1Pt: y, x2Pt: xPt + half, y2Pt: y };
    return { kind: 'line', ...ends, widthPt: 0.2 * radiusPt, colour: dark, ends: 'flat' };
  });
  return [disc, ...stripes];
}

/** The cell axes as seen, drawn from one origin; an axis towards the viewer keeps its letter beside the others. */
export function axesBlock(scene: Scene, camera: Camera, { textPt, theme }: BlockStyle): Block | null {
  const lengthPt = 2.6 * textPt;
  const axes = projectAxes(scene, camera, lengthPt).sort((one, other) => one.depthPx - other.depthPx);
  if (axes.length === 0) return null;
  const letters = lettersOfAxes(axes, textPt);
  const half = { x: 0.36 * textPt, y: 0.5 * textPt };
  const xs = [
    0,
    ...axes.map(({ xPx }) => xPx),
    ...letters.flatMap(({ xPx }) => [xPx - half.x, xPx + half.x]),
  ];
  const ys = [
    0,
    ...axes.map(({ yPx }) => yPx),
    ...letters.flatMap(({ yPx }) => [yPx - half.y, yPx + half.y]),
  ];
  const [left, top] = [Math.min(...xs), Math.min(...ys)];
  const widthPt = strokePt(textPt, 0.12);
  return {
    widthPt: Math.max(...xs) - left,
    heightPt: Math.max(...ys) - top,
    itemsAt: (xPt, yPt) => [
      ...axes.map(({ xPx, yPx }): SheetItem => ({
        kind: 'line',
        x1Pt: xPt - left,
        y1Pt: yPt - top,
        x2Pt: xPt - left + xPx,
        y2Pt: yPt - top + yPx,
        widthPt,
        colour: theme.ink,
        ends: 'round',
      })),
      ...letters.map(({ letter, xPx: x, yPx: y }): SheetItem => {
        const runs: TextRun[] = [{ text: letter, style: 'italic' }];
        const own = setText(runs, textPt).widthPt;
        return textItem(runs, xPt - left + x - own / 2, yPt - top + y + 0.27 * textPt, textPt, theme.ink);
      }),
    ],
  };
}
