import { describe, expect, it } from 'vitest';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { packPicks } from '#src/scene/packed-picks.ts';
import { Cancelled, createEngineClient } from '#src/store/engine-client.ts';
import type { WorkerLike } from '#src/store/engine-client.ts';
import type { CaseInput, EngineReply, EngineRequest } from '#src/store/engine-protocol.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import { fixtureCase } from '#tests/support/dossier-fixture.ts';

class FakeWorker implements WorkerLike {
  readonly received: EngineRequest[] = [];
  isTerminated = false;
  onmessage: ((event: { data: EngineReply }) => void) | null = null;
  onerror: ((event: { message?: string }) => void) | null = null;

  postMessage(message: EngineRequest): void {
    this.received.push(message);
  }

  terminate(): void {
    this.isTerminated = true;
  }
}

function clientWithWorkers() {
  const workers: FakeWorker[] = [];
  const client = createEngineClient(() => {
    const worker = new FakeWorker();
    workers.push(worker);
    return worker;
  });
  return { client, workers };
}

const input: CaseInput = { sources: [], structure: null, settings: defaultSettings };
const twoAtoms = '2\nLattice="4 0 0 0 4 0 0 0 4"\nNa 0 0 0\nCl 2 2 2\n';
const source = { id: 's', name: 'a.cif', blob: new Blob([]) };

describe('the engine client', () => {
  it('starts the worker at the first request and passes progress and result on', async () => {
    const { client, workers } = clientWithWorkers();
    expect(workers).toHaveLength(0);
    const seen: (readonly [number, string])[] = [];
    const derived = client.derive(input, (share, stage) => seen.push([share, stage]));
    const { id } = workers[0]!.received[0]!;
    workers[0]!.onmessage?.({ data: { id, kind: 'progress', share: 0.25, stage: 'reading' } });
    workers[0]!.onmessage?.({ data: { id, kind: 'derived', result: fixtureCase() } });
    expect((await derived).crystal?.name).toBe('invented aluminate');
    expect(seen).toEqual([[0.25, 'reading']]);
  });

  it('gives a picture out with its picks, which travel packed', async () => {
    const { client, workers } = clientWithWorkers();
    const deriving = client.derive(input, () => undefined);
    const answer = (data: EngineReply): void => workers[0]!.onmessage?.({ data });
    answer({ id: workers[0]!.received[0]!.id, kind: 'derived', result: fixtureCase() });
    const asked = client.ask(await deriving, 'scene', {});
    const scene = buildScene(dossierOfText('two.xyz', twoAtoms));
    const sent = { ...scene, picks: packPicks(scene.picks) };
    answer({ id: workers[0]!.received[1]!.id, kind: 'scene', scene: sent });
    expect(scene.picks.length).toBeGreaterThan(1);
    expect((await asked).picks).toEqual(scene.picks);
  });

  it('ends the worker on cancel and asks the next one for what else was wanted', async () => {
    const { client, workers } = clientWithWorkers();
    const derived = client.derive(input, () => undefined);
    const page = client.lines(source, 1, 2);
    client.cancel();
    await expect(derived).rejects.toBeInstanceOf(Cancelled);
    expect(workers[0]!.isTerminated).toBe(true);
    const again = workers[1]!.received[0]!;
    expect(again.kind).toBe('lines');
    workers[1]!.onmessage?.({
      data: { id: again.id, kind: 'lines', page: { first: 1, lines: ['x'], total: 1 } },
    });
    expect((await page).lines).toEqual(['x']);
  });

  it('leaves an idle worker alone when there is nothing to cancel', async () => {
    const { client, workers } = clientWithWorkers();
    const derived = client.derive(input, () => undefined);
    const { id } = workers[0]!.received[0]!;
    workers[0]!.onmessage?.({ data: { id, kind: 'derived', result: fixtureCase() } });
    await derived;
    client.cancel();
    expect(workers[0]!.isTerminated).toBe(false);
  });

  it('gives up a running derivation for a new one', async () => {
    const { client, workers } = clientWithWorkers();
    const first = client.derive(input, () => undefined);
    const second = client.derive(input, () => undefined);
    await expect(first).rejects.toBeInstanceOf(Cancelled);
    const { id } = workers[1]!.received[0]!;
    workers[1]!.onmessage?.({ data: { id, kind: 'derived', result: fixtureCase() } });
    expect((await second).chosen).toEqual({ sourceId: 'source-1', index: 0 });
  });

  it('rejects with the engine’s message, and after a crash starts afresh', async () => {
    const { client, workers } = clientWithWorkers();
    const failed = client.derive(input, () => undefined);
    const { id } = workers[0]!.received[0]!;
    workers[0]!.onmessage?.({ data: { id, kind: 'failed', message: 'tables missing' } });
    await expect(failed).rejects.toThrow('tables missing');
    const crashed = client.derive(input, () => undefined);
    workers[0]!.onerror?.({ message: 'script error' });
    await expect(crashed).rejects.toThrow('script error');
    void client.lines(source, 1, 1).catch(() => undefined);
    expect(workers).toHaveLength(2);
  });
});
