import { describe, expect, it } from 'vitest';
import { apply } from '#src/base/matrix3.ts';
import { defaultContents } from '#src/figure/figure-request.ts';
import type { FigureRequest } from '#src/figure/figure-request.ts';
import { breakLines, lineHeight, setText } from '#src/figure/font/set-text.ts';
import { layoutFigure } from '#src/figure/layout.ts';
import type { Sheet, SheetItem, TextItem } from '#src/figure/sheet.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { pixelsPerAngstrom, viewRotation } from '#src/scene/camera.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { Scene } from '#src/scene/scene.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const labelled = buildScene(madeQuartz(), { labels: true });
const plain = buildScene(madeQuartz());

const request: FigureRequest = {
  widthPt: 235,
  heightPt: null,
  textPt: 7,
  theme: 'light',
  transparent: false,
  view: { kind: 'direction', towards: [0, 0, 1], words: 'viewed along c' },
  contents: defaultContents,
  look: defaultLook,
  title: '',
};

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Rectangle of a text from its baseline to the height of its capitals. */
function boxOf({ runs, xPt, yPt, sizePt }: TextItem): Box {
  return { left: xPt, right: xPt + setText(runs, sizePt).widthPt, top: yPt - 0.71 * sizePt, bottom: yPt };
}

function meets(one: Box, other: Box): boolean {
  return (
    one.left < other.right - 0.01 &&
    other.left < one.right - 0.01 &&
    one.top < other.bottom - 0.01 &&
    other.top < one.bottom - 0.01
  );
}

const textsOf = ({ items }: Sheet): TextItem[] => items.filter((item: SheetItem) => item.kind === 'text');
const wordsOf = (sheet: Sheet): string[] =>
  textsOf(sheet).map(({ runs }) => runs.map(({ text }) => text).join(''));

const requests: [string, Scene, FigureRequest][] = [
  ['a column', plain, request],
  ['a column with labels', labelled, request],
  ['a slide', labelled, { ...request, widthPt: 960, heightPt: 540, textPt: 18 }],
  ['a low strip', plain, { ...request, widthPt: 500, heightPt: 160 }],
  [
    'title and caption',
    plain,
    { ...request, title: 'Quartz', contents: { ...defaultContents, caption: true } },
  ],
];

describe('a figure laid out', () => {
  it.each(requests)('keeps all texts of %s inside and apart', (_name, scene, asked) => {
    const sheet = layoutFigure(scene, asked);
    const boxes = textsOf(sheet).map(boxOf);
    expect(boxes.length).toBeGreaterThan(4);
    for (const box of boxes) {
      expect(box.left).toBeGreaterThanOrEqual(0);
      expect(box.top).toBeGreaterThanOrEqual(0);
      expect(box.right).toBeLessThanOrEqual(sheet.widthPt);
      expect(box.bottom).toBeLessThanOrEqual(sheet.heightPt);
    }
    boxes.forEach((one, k) => boxes.slice(k + 1).forEach((other) => expect(meets(one, other)).toBe(false)));
  });

  it.each(requests)('keeps what belongs to the crystal of %s off it', (_name, scene, asked) => {
    const sheet = layoutFigure(scene, asked);
    const { xPt, yPt, widthPt, heightPt } = sheet.crystal;
    const place = { left: xPt, right: xPt + widthPt, top: yPt, bottom: yPt + heightPt };
    const others = textsOf(sheet).filter(({ halo }) => halo === null);
    for (const text of others) expect(meets(boxOf(text), place)).toBe(false);
  });

  it('states quantity, unit, limits, scale, axes and view', () => {
    const words = wordsOf(layoutFigure(plain, request));
    const { legend, scale } = plain;
    expect(words.join(' ')).toContain('shielding');
    expect(words.join(' ')).toContain('/ppm');
    expect(words).toContain(legend!.low.toFixed(legend!.digits));
    expect(words).toContain(legend!.high.toFixed(legend!.digits));
    expect(words).toEqual(expect.arrayContaining(['a', 'b', 'c', 'viewed along c']));
    const statement = words.find((text) => / Å = /.test(text) && text.endsWith('ppm'))!;
    const [, length, worth] = /^([\d.]+) Å = ([\d.]+) ppm$/.exec(statement)!;
    expect(Number(worth) / Number(length)).toBeCloseTo(scale!.unitsPerAngstrom, 6);
  });

  it('draws the ruler as long as it says, at the scale of the crystal', () => {
    const sheet = layoutFigure(plain, request);
    const { camera, viewport, pointsPerCssPx } = sheet.crystal;
    const perAngstrom = pixelsPerAngstrom(camera, viewport) * pointsPerCssPx;
    const said = Number(/([\d.]+) Å = /.exec(wordsOf(sheet).find((text) => / Å = .*ppm/.test(text))!)![1]);
    const lengths = sheet.items.flatMap((item) =>
      item.kind === 'line' && item.ends === 'flat' && item.y1Pt === item.y2Pt ? [item.x2Pt - item.x1Pt] : [],
    );
    expect(lengths.some((length) => Math.abs(length - said * perAngstrom) < 1e-6)).toBe(true);
  });

  it('has no ruler in perspective, where no length holds everywhere', () => {
    const look = { ...defaultLook, perspectiveDegrees: 30 };
    const sheet = layoutFigure(plain, { ...request, look });
    expect(sheet.items.filter((item) => item.kind === 'line' && item.ends === 'flat')).toEqual([]);
    expect(wordsOf(sheet)).toContain(plain.scaleStatement);
  });

  it('leaves out what is not wanted, and gives the crystal its room', () => {
    const contents = {
      axes: false,
      legend: false,
      scale: false,
      elementKey: false,
      viewDirection: false,
      caption: false,
    };
    const bare = layoutFigure(plain, { ...request, heightPt: 200, contents });
    expect(bare.items).toEqual([]);
    expect(bare.crystal.heightPt).toBe(200);
    expect(bare.crystal.widthPt).toBe(235);
  });

  it('sets a caption smaller, at the foot, and leaves the crystal of a slide most of its size', () => {
    const slide = { ...request, widthPt: 960, heightPt: 540, textPt: 18 };
    const withCaption = { ...slide, contents: { ...defaultContents, caption: true } };
    for (const scene of [plain, buildScene(madeQuartz(), { quantity: 'efg' })]) {
      const [bare, told] = [layoutFigure(scene, slide), layoutFigure(scene, withCaption)];
      const perAngstrom = ({ crystal }: Sheet): number =>
        pixelsPerAngstrom(crystal.camera, crystal.viewport) * crystal.pointsPerCssPx;
      expect(perAngstrom(told)).toBeGreaterThan(0.7 * perAngstrom(bare));
      const caption = textsOf(told).filter(({ sizePt }) => sizePt < 18);
      expect(caption.map(({ runs }) => runs.map(({ text }) => text).join('')).join(' ')).toBe(
        breakLines(scene.caption, 18, Infinity)
          .map((runs) => runs.map(({ text }) => text).join(''))
          .join(' '),
      );
      // what the caption says isn't said twice
      expect(wordsOf(bare).join(' ')).toMatch(/semi-axes|radius/);
      const beside = textsOf(told).filter(({ sizePt }) => sizePt === 18);
      expect(beside.flatMap(({ runs }) => runs.map(({ text }) => text)).join(' ')).not.toMatch(
        /radius|semi-axes/,
      );
    }
  });

  it('has elements of a key on one line where the sheet has room, and signs with what they are signs of', () => {
    const lines = (sheet: Sheet, words: readonly string[]): number[] =>
      words.map((word) => textsOf(sheet).find(({ runs }) => runs[0]?.text === word)!.yPt);
    const names = ['Na', 'Ca', 'Al', 'Si', 'O'];
    const elements = names.map((element) => ({ element, colour: [90, 90, 90] as const }));
    const scene: Scene = { ...plain, elements, legend: null, scale: null, scaleStatement: null };
    expect(new Set(lines(layoutFigure(scene, request), names)).size).toBe(1);
    const efg = buildScene(madeQuartz(), { quantity: 'efg' });
    const [subject, positive, negative] = lines(layoutFigure(efg, request), [
      'electric field gradients (atomic units)',
      'positive',
      'negative (striped)',
    ]);
    expect(positive).toBe(negative);
    expect(positive! - subject!).toBeGreaterThan(0);
    expect(positive! - subject!).toBeLessThan(2 * lineHeight(7));
  });

  it('has letters of the size asked for and no line thinner than print bears', () => {
    const sheet = layoutFigure(labelled, { ...request, textPt: 5 });
    for (const { sizePt } of textsOf(sheet)) expect(sizePt).toBe(5);
    // 0.35 pt: least line weight of journals
    for (const item of sheet.items)
      if (item.kind === 'line') expect(item.widthPt).toBeGreaterThanOrEqual(0.35);
  });

  it('puts its texts beside a crystal on a wide sheet, below it on a high one', () => {
    const wide = layoutFigure(plain, { ...request, widthPt: 960, heightPt: 400, textPt: 12 });
    const high = layoutFigure(plain, { ...request, widthPt: 400, heightPt: 600, textPt: 12 });
    const { crystal } = wide;
    for (const { xPt } of textsOf(wide)) expect(xPt).toBeGreaterThan(crystal.xPt + crystal.widthPt - 0.01);
    for (const { yPt } of textsOf(high))
      expect(yPt).toBeGreaterThan(high.crystal.yPt + high.crystal.heightPt);
  });

  describe('of a crystal twelve times as long as wide', () => {
    const long = buildScene(
      madeDossier({
        rows: [3, 0, 0, 0, 3, 0, 0, 0, 36],
        sites: [{ label: 'P1', element: 'P', position: [0.5, 0.5, 0.5] }],
      }),
    );
    const slide: FigureRequest = { ...request, widthPt: 960, heightPt: 540, textPt: 18 };
    const along = (isUpright: boolean): FigureRequest => ({
      ...slide,
      view: { kind: 'direction', towards: 'a', words: 'viewed along a', isUpright },
    });
    const perAngstrom = ({ crystal }: Sheet) =>
      pixelsPerAngstrom(crystal.camera, crystal.viewport) * crystal.pointsPerCssPx;
    /** Of the cell edges, points. */
    const spanOf = ({ crystal }: Sheet): [number, number] => {
      const rotation = viewRotation(crystal.camera.orientation);
      const ends = [0, 1].map((k) => apply(rotation, [0, 0, 36 * k]));
      return [0, 1].map((k) => Math.abs(ends[1]![k]! - ends[0]![k]!) * perAngstrom({ crystal } as Sheet)) as [
        number,
        number,
      ];
    };

    it('lies on its side on a wide sheet, c to the right, and fills it', () => {
      const sheet = layoutFigure(long, along(false));
      expect(sheet.isTurned).toBe(true);
      const [across, up] = spanOf(sheet);
      expect(across).toBeGreaterThan(0.85 * slide.widthPt);
      expect(across).toBeLessThan(slide.widthPt);
      expect(up).toBeLessThan(1e-6 * across);
      const c = apply(viewRotation(sheet.crystal.camera.orientation), [0, 0, 1]);
      expect(c[0]).toBeCloseTo(1, 9);
    });

    it('stays upright where that is asked for, on a high sheet, and as a camera has it', () => {
      const upright = layoutFigure(long, along(true));
      expect(upright.isTurned).toBe(false);
      const [across, up] = spanOf(upright);
      expect(across).toBeLessThan(1e-6 * up);
      expect(up).toBeGreaterThan(0.85 * 540);
      expect(layoutFigure(long, { ...along(false), widthPt: 400, heightPt: 900 }).isTurned).toBe(false);
      const { camera, viewport } = upright.crystal;
      const view = { kind: 'camera', camera, viewport, wholeCrystal: true, words: null } as const;
      expect(layoutFigure(long, { ...slide, view }).isTurned).toBe(false);
    });

    it('has its texts at its side where the height is free, not below', () => {
      const sheet = layoutFigure(long, { ...along(false), widthPt: 235, heightPt: null, textPt: 7 });
      expect(sheet.isTurned).toBe(false);
      const { xPt, widthPt, yPt, heightPt } = sheet.crystal;
      for (const text of textsOf(sheet)) expect(text.xPt).toBeGreaterThan(xPt + widthPt - 0.01);
      expect(yPt + heightPt).toBeCloseTo(sheet.heightPt, 6);
    });
  });

  it('says the least height, at which all texts are inside, and puts them inside from there on', () => {
    const { leastHeightPt } = layoutFigure(plain, { ...request, heightPt: 57 });
    // 20 mm are 57 pt: bar, limits and scale would be cut off
    expect(leastHeightPt).toBeGreaterThan(57);
    const sheet = layoutFigure(plain, { ...request, heightPt: leastHeightPt });
    for (const { top, bottom } of textsOf(sheet).map(boxOf)) {
      expect(top).toBeGreaterThanOrEqual(0);
      expect(bottom).toBeLessThanOrEqual(leastHeightPt);
    }
    expect(sheet.leastHeightPt).toBeCloseTo(leastHeightPt, 9);
  });

  it('is the same each time', () => {
    expect(layoutFigure(labelled, request)).toEqual(layoutFigure(labelled, request));
  });

  it('shows all that the screen showed where it is asked to', () => {
    const camera = { ...layoutFigure(plain, request).crystal.camera, zoom: 0.2 };
    const viewport = { widthPx: 800, heightPx: 500 };
    const view = { kind: 'camera', camera, viewport, wholeCrystal: false, words: null } as const;
    const { crystal } = layoutFigure(plain, { ...request, heightPt: 260, view });
    const perAngstrom = pixelsPerAngstrom(crystal.camera, crystal.viewport);
    const onScreen = pixelsPerAngstrom(camera, viewport);
    const [across, down] = [crystal.viewport.widthPx / perAngstrom, crystal.viewport.heightPx / perAngstrom];
    expect(across).toBeGreaterThanOrEqual(800 / onScreen - 1e-9);
    expect(down).toBeGreaterThanOrEqual(500 / onScreen - 1e-9);
    expect(Math.min(across - 800 / onScreen, down - 500 / onScreen)).toBeCloseTo(0, 9);
  });
});
