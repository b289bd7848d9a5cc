import moyoUrl from '@spglib/moyo-wasm/moyo_wasm_bg.wasm?url';
import { loadSymmetryTables } from '#src/crystal/symmetry-tables.ts';
import { packPicks } from '#src/scene/packed-picks.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { EngineReply, EngineRequest } from './engine-protocol.ts';
import { transferablesOf } from './engine-queries.ts';
import { createEngine } from './engine.ts';

/** The page's engine: everything that takes time runs here. The symmetry tables are fetched at the first crystal. */
const engine = createEngine(async () => {
  const response = await fetch(new URL(moyoUrl, import.meta.url));
  if (!response.ok) throw new Error(`the symmetry tables could not be loaded (status ${response.status})`);
  return loadSymmetryTables(await response.arrayBuffer());
});

const reply = (message: EngineReply, transfer: Transferable[] = []): void =>
  self.postMessage(message, { transfer });

function sendScene(id: number, scene: Scene): void {
  const sent = { ...scene, picks: packPicks(scene.picks) };
  reply({ id, kind: 'scene', scene: sent }, transferablesOf(sent));
}

self.onmessage = async ({ data: request }: MessageEvent<EngineRequest>): Promise<void> => {
  const { id } = request;
  try {
    if (request.kind === 'lines') {
      reply({ id, kind: 'lines', page: await engine.lines(request.source, request.first, request.count) });
      return;
    }
    if (request.kind === 'query') {
      const answer = await engine.answer(request.derivation, request.input, request.query);
      if (request.query.kind === 'scene') sendScene(id, answer as Scene);
      else reply({ id, kind: 'answer', answer }, transferablesOf(answer));
      return;
    }
    const report = (share: number, stage: string): void => reply({ id, kind: 'progress', share, stage });
    reply({ id, kind: 'derived', result: await engine.derive(id, request.input, report) });
  } catch (error) {
    reply({ id, kind: 'failed', message: error instanceof Error ? error.message : String(error) });
  }
};
