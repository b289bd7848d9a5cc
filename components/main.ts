import { createEngineClient } from '#src/store/engine-client.ts';
import { createStore } from '#src/store/store.ts';
import { openSample, sampleCases } from './sample-cases.ts';
import { keptTheme } from './theme.ts';
import { Workbench } from './workbench.ts';

/** Starts the page: one engine, one store, one workbench, and a sample case on screen. */
const store = createStore(createEngineClient(), { theme: keptTheme() });
const workbench = new Workbench();
workbench.store = store;
document.body.append(workbench);

const [first] = sampleCases();
if (first) void openSample(store, first);
