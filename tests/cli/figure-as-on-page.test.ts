import { describe, expect, it } from 'vitest';
import { figureRequest, figureSize, firstChoices } from '#components/figure-choices.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import { defaultCaseViews, newCase } from '#src/case/new-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { figurePng } from '#src/figure/figure-png.ts';
import { keptView } from '#src/figure/figure-view.ts';
import { layoutFigure } from '#src/figure/layout.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { firstCamera, lookAlong } from '#src/scene/framing.ts';
import { readCaseFile } from '#src/store/case-exchange.ts';
import { createEngine } from '#src/store/engine.ts';
import { runCommand } from '#tests/support/command-io.ts';
import { decodePng } from '#tests/support/decode-png.ts';
import { symmetryTables } from '#tests/support/derive.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

/** Cell and positions of α-quartz: Levien, Prewitt & Weidner, Am. Mineral. 65, 920 (1980); no tensors. */
const quartz = `data_quartz
_cell_length_a 4.916
_cell_length_b 4.916
_cell_length_c 5.4054
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 120
_space_group_name_H-M_alt 'P 32 2 1'
loop_
_atom_site_label
_atom_site_type_symbol
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Si1 Si 0.4697 0 0.6666667
O1 O 0.4135 0.2669 0.7858
`;

const made = buildScene(madeQuartz());
const first = firstCamera(made, { widthPx: 400, heightPx: 300 });
const cameras: readonly (readonly [string, Camera | null])[] = [
  ['the first view', null],
  ['a view along c', lookAlong(first, made, 'c')],
  ['any other view', lookAlong(first, made, [0.3, 0.2, 0.7] as Vec3)],
];

describe('the picture of a case', () => {
  it.each(cameras)('is the same from the page and from the command line: %s', async (_name, camera) => {
    const sources = [{ name: 'quartz.cif', text: quartz }];
    const views = { ...defaultCaseViews, camera };
    const text = serialiseCase(await newCase({ title: 'quartz', sources, views }));
    const command = await runCommand(['figure', 'q.json', '-o', 'q.png', '--no-case'], { 'q.json': text });
    expect(command.status).toBe(0);
    const fromCommand = decodePng(command.written['q.png']!);

    const scene = await sceneOf(text);
    const request = figureRequest(firstChoices, keptView(camera, scene), views.look);
    const { pxPerPt, dpi } = figureSize(firstChoices);
    const fromPage = await figurePng(
      { scene, request, sheet: layoutFigure(scene, request), pxPerPt },
      { dpi, title: 'quartz', caseText: null },
      createRasterizer(bestKernel()),
    );
    expect(Buffer.compare(Buffer.from(fromPage), Buffer.from(command.written['q.png']!))).toBe(0);
    expect(fromCommand.width).toBe(980);
  });
});

/** The scene of a case as the page's engine makes it. */
async function sceneOf(text: string): Promise<ReturnType<typeof buildScene>> {
  const { opened } = await readCaseFile({ name: 'q.json', blob: new Blob([text]) });
  const decisions = opened!.decisions((files) => files.map((file, i) => ({ ...file, id: `source-${i}` })));
  const engine = createEngine(() => Promise.resolve(symmetryTables));
  await engine.derive(1, decisions, () => undefined);
  return (await engine.answer(1, decisions, { kind: 'scene', ask: opened!.views.picture })) as ReturnType<
    typeof buildScene
  >;
}
