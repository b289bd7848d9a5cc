import { problem } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import { defaultCaseViews, newCase } from '#src/case/new-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { figurePng } from '#src/figure/figure-png.ts';
import type { FigureRequest, FigureView } from '#src/figure/figure-request.ts';
import type { FigureSize } from '#src/figure/figure-size.ts';
import { missingHeight, pixelSize, pointsPerMm, settleSize, sizeFault } from '#src/figure/figure-size.ts';
import { keptView } from '#src/figure/figure-view.ts';
import { layoutFigure } from '#src/figure/layout.ts';
import type { Sheet } from '#src/figure/sheet.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { OwnValues } from '../arguments.ts';
import { parseArguments } from '../arguments.ts';
import {
  contentsOf,
  directionAsked,
  figureOptions,
  lookOf,
  outputOf,
  sizeOf,
  textOf,
  themeOf,
  withSignedValues,
} from '../figure-options.ts';
import { sceneOptionsOf, sceneOptionWords } from '../figure-scene-options.ts';
import type { CommandIo } from '../io.ts';
import { UsageError } from '../io.ts';
import type { LoadedCase } from '../load-case.ts';
import { loadCase } from '../load-case.ts';
import { problemLine, statusOf } from '../print-problems.ts';

/** What `--json` tells of a figure that was written. */
interface FigureFacts {
  readonly file: string;
  readonly widthPx: number;
  readonly heightPx: number;
  readonly dpi: number | null;
  readonly caption: string;
  readonly scale: string | null;
  readonly labelsLeftOut: number;
  readonly holdsCase: boolean;
}

/** `ellipsite figure FILE… -o picture.png [options]`: a picture to take away, drawn without a browser. */
export async function figureCommand(argv: readonly string[], io: CommandIo): Promise<number> {
  const { common, own } = parseArguments(withSignedValues(argv), { ...figureOptions, ...sceneOptionWords });
  const output = outputOf(own);
  if (output === '-' && common.json)
    throw new UsageError('-o - and --json both write to standard output; give one of them.');
  const size = settleSize(sizeOf(own));
  const theme = themeOf(own);
  const loaded = await loadCase(common, io);
  const { dossier } = loaded;
  if (!dossier) return report(loaded.problems, null, common.json, io);
  const views = loaded.views ?? defaultCaseViews;
  const options = sceneOptionsOf(own, views.picture, dossier);
  const scene = buildScene(dossier, options);
  const look = lookOf(own, views.look);
  const request: FigureRequest = {
    ...size,
    theme,
    transparent: own['transparent'] === true,
    view: viewOf(own, scene, loaded),
    contents: contentsOf(own),
    look,
    title: textOf(own, 'title') ?? '',
  };
  const sheet = layoutFigure(scene, request);
  const pixels = sizeWithin(sheet, size);
  if (size.heightPt !== null) demandHeight(sheet, size, textOf(own, 'height-mm') !== undefined);
  const caseText = own['no-case'] === true ? null : await caseTextOf(loaded, options, request, sheet);
  const png = await figurePng(
    { scene, request, sheet, pxPerPt: size.pxPerPt },
    { dpi: size.dpi, title: request.title || dossier.name, caseText },
    createRasterizer(bestKernel()),
  );
  if (output === '-') io.writeOutBytes(png);
  else await keep(output, png, io);
  const facts: FigureFacts = {
    file: output,
    ...pixels,
    dpi: size.dpi,
    caption: scene.caption,
    scale: scene.scaleStatement,
    labelsLeftOut: sheet.labelsLeftOut,
    holdsCase: caseText !== null,
  };
  return report([...loaded.problems, ...figureProblems(scene, sheet)], facts, common.json, io);
}

async function keep(path: string, bytes: Uint8Array, io: CommandIo): Promise<void> {
  try {
    await io.writeFile(path, bytes);
  } catch (error) {
    throw new UsageError(`${path}: ${error instanceof Error ? error.message : String(error)}`);
  }
}

function sizeWithin(sheet: Sheet, { pxPerPt }: FigureSize): { widthPx: number; heightPx: number } {
  const pixels = pixelSize(sheet, pxPerPt);
  const fault = sizeFault(pixels.widthPx, pixels.heightPx);
  if (fault !== null) throw new UsageError(fault);
  return pixels;
}

/** A picture that would cut its legend off is not written. */
function demandHeight(sheet: Sheet, { pxPerPt }: FigureSize, isMm: boolean): void {
  const leastPt = missingHeight(sheet, pxPerPt);
  if (leastPt === null) return;
  const least = isMm
    ? `--height-mm ${Math.ceil(leastPt / pointsPerMm)}`
    : `--height-px ${Math.ceil(leastPt * pxPerPt)}`;
  throw new UsageError(
    `The picture is too low for what stands beside the crystal; the least is ${least}, less with a smaller --text-pt or without parts (--no-legend, --no-scale, --no-key, --no-axes).`,
  );
}

/** The direction asked for; else the camera of the case file, all of the crystal; else the first view. */
function viewOf(own: OwnValues, scene: Scene, { views, dossier }: LoadedCase): FigureView {
  const asked = textOf(own, 'view');
  const isUpright = own['upright'] === true;
  if (asked === undefined) {
    const kept = keptView(views?.camera ?? null, scene);
    return kept.kind === 'direction' ? { ...kept, isUpright } : kept;
  }
  const found = directionAsked(asked, scene, dossier?.sites ?? []);
  return { kind: 'direction', towards: found.towards, words: `viewed along ${found.words}`, isUpright };
}

/** The case as it would be saved now: texts, decisions, and this picture as its view. */
async function caseTextOf(
  loaded: LoadedCase,
  picture: SceneOptions,
  { look }: FigureRequest,
  { crystal }: Sheet,
): Promise<string> {
  const { title, sources, decisions } = loaded;
  const views = { ...(loaded.views ?? defaultCaseViews), picture, look, camera: crystal.camera };
  return serialiseCase(await newCase({ title, sources, decisions, views }));
}

/** What the picture could not do as asked. */
function figureProblems(scene: Scene, { labelsLeftOut, isTurned }: Sheet): Problem[] {
  const found: Problem[] = [];
  if (isTurned) {
    const words =
      'The crystal lies on its side, a quarter turned in the picture, as it fills the sheet better so.';
    found.push(problem('note', 'figure-turned', words, { hint: '--upright keeps it upright.' }));
  }
  for (const sentence of scene.unfollowed ?? []) {
    found.push(problem('warning', 'figure-wish-unfollowed', sentence));
  }
  for (const sentence of scene.colourNotes ?? []) found.push(problem('note', 'figure-colours', sentence));
  for (const sentence of scene.sizeNotes ?? []) {
    const hint = 'Drawn alone, with --elements, they have a scale of their own.';
    found.push(problem('note', 'figure-tensors-hidden', sentence, { hint }));
  }
  if (labelsLeftOut > 0) {
    const words =
      labelsLeftOut === 1
        ? '1 label found no room or belongs to a hidden atom.'
        : `${labelsLeftOut} labels found no room or belong to hidden atoms.`;
    found.push(
      problem('note', 'figure-labels-left-out', words, {
        hint: 'A larger picture, smaller --text-pt or another --view makes room.',
      }),
    );
  }
  return found;
}

function report(
  problems: readonly Problem[],
  facts: FigureFacts | null,
  json: boolean,
  io: CommandIo,
): number {
  if (json)
    io.writeOut(`${JSON.stringify({ schema: 'ellipsite/figure/1', figure: facts, problems }, null, 2)}\n`);
  else problems.forEach((found) => io.writeError(`${problemLine(found)}\n`));
  return statusOf(problems);
}
