import { findWork, keepWork } from './keep-work.ts';
import { workLeftAside } from '#src/store/case-problems.ts';
import { createEngineClient } from '#src/store/engine-client.ts';
import { createStore } from '#src/store/store.ts';
import { openSample, sampleCases } from './sample-cases.ts';
import { keptTheme } from './theme.ts';
import { Workbench } from './workbench.ts';

/** Starts the page: one engine, one store, one workbench, and the work of last time or a sample case on screen. */
const store = createStore(createEngineClient(), { theme: keptTheme() });
const workbench = new Workbench();
workbench.store = store;
document.body.append(workbench);

void begin();

/** Brings back the work of this tab, or shows a sample, unless the user was quicker; from then on work is kept. */
async function begin(): Promise<void> {
  const keeper = await findWork(store);
  workbench.keeper = keeper;
  const isFree = (): boolean => store.state.decisions === null && store.state.progress === null;
  const isBack = keeper?.found && isFree() ? await store.restore(keeper.found) : false;
  const [first] = sampleCases();
  if (first && !isBack && isFree()) await openSample(store, first);
  if (keeper?.isLeftAside) store.refuse('bring back the last work', [], [workLeftAside()]);
  if (keeper) keepWork(keeper, store, isBack);
}
