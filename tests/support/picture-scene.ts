import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { renderThemeOf } from '#src/figure/figure-theme.ts';
import { readText } from '#src/readers/read.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { orientationFrom } from '#src/scene/camera.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import type { Rasterizer } from '#src/raster/rasterizer.ts';
import type { PictureCase } from './picture-case.ts';
import { caseText } from './picture-case.ts';
import type { PixelData } from './picture-pixels.ts';

/** A case ready for a renderer. */
export interface PreparedPicture {
  readonly scene: Scene;
  readonly camera: Camera;
  readonly theme: RenderTheme;
}

export function preparePicture(picture: PictureCase): PreparedPicture {
  const { view, size } = picture;
  const look = { ...defaultLook, ...picture.look };
  return {
    scene: buildScene(dossierOf(picture), picture.options),
    camera: {
      target: view.target,
      orientation: orientationFrom(view.towards, view.up),
      zoom: view.pixelsPerAngstrom / Math.min(...size),
      perspectiveDegrees: look.perspectiveDegrees,
    },
    // lines as on screen, however thin they would be in print
    theme: renderThemeOf(picture.paper ?? 'paper', look, picture.transparent ?? false, 1),
  };
}

const dossiers = new Map<string, CrystalDossier>();

function dossierOf({ structure, secondSet, settings }: PictureCase): CrystalDossier {
  const key = JSON.stringify([structure, secondSet, settings]);
  const known = dossiers.get(key) ?? derived(structure, secondSet, settings);
  dossiers.set(key, known);
  return known;
}

function derived(
  structure: string,
  secondSet: string | undefined,
  settings: PictureCase['settings'],
): CrystalDossier {
  const own = readText(sourceFromText(structure, caseText(structure)));
  const second = secondSet === undefined ? null : readText(sourceFromText(secondSet, caseText(secondSet)));
  const [crystal] = own.structures;
  const problems = [...own.problems, ...(second?.problems ?? [])];
  const bad = problems.filter(({ severity }) => severity !== 'note');
  if (!crystal || bad.length > 0) throw new Error(`${structure} isn't read cleanly: ${JSON.stringify(bad)}`);
  return deriveDossier({
    crystal,
    tensorSets: [...own.tensorSets, ...(second?.tensorSets ?? [])],
    tables: null,
    settings: { ...defaultSettings, symmetry: 'file', ...settings },
    problems,
  });
}

/** The pixels of a case by the CPU renderer. */
export function drawnByRaster(
  rasterizer: Rasterizer,
  { size, samplesAcross = 1 }: PictureCase,
  { scene, camera, theme }: PreparedPicture,
): PixelData {
  const [widthPx, heightPx] = size;
  rasterizer.setScene(scene);
  const view = { camera, viewport: { widthPx, heightPx }, theme, pixelRatio: 1, samplesAcross };
  return { widthPx, heightPx, data: rasterizer.draw(view).pixels };
}
