import { caseTextOf, keptCase } from './case-exchange.ts';
import type { CaseReply, CaseRequest } from './case-protocol.ts';

/** Writes and reads case files away from the page's thread; one file, then its client ends it. */
async function answer(request: CaseRequest): Promise<CaseReply> {
  if (request.kind === 'read') return { kind: 'read', kept: await keptCase(request.file) };
  const text = await caseTextOf(request.decisions, request.views);
  return { kind: 'written', blob: new Blob([text], { type: 'application/json' }) };
}

self.onmessage = async ({ data: request }: MessageEvent<CaseRequest>): Promise<void> => {
  const reply = (message: CaseReply): void => self.postMessage(message);
  try {
    reply(await answer(request));
  } catch (error) {
    reply({ kind: 'failed', message: error instanceof Error ? error.message : String(error) });
  }
};
