import { samplesAcross, wantsIds } from '../slots.ts';
import { depthPass } from './depth.ts';
import { whole } from './memory.ts';
import { linePass, ringPass } from './overlay.ts';
import { prepareObjects } from './prepare.ts';
import { keepIds, resolve } from './resolve.ts';
import { shadePass } from './shade.ts';
import { facetPass } from './triangle.ts';

export function prepare(): void {
  prepareObjects();
}

export function strip(first: i32, count: i32): void {
  depthPass(first, count);
  shadePass(first, count);
  linePass(first, count);
  facetPass(first, count);
  ringPass(first, count);
  if (whole(samplesAcross) > 1) resolve(first, count);
  else if (whole(wantsIds) === 1) keepIds(first, count);
}
