import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { packPicks, unpackPicks } from '#src/scene/packed-picks.ts';
import type { PickEntry } from '#src/scene/scene.ts';
import { projectRoot } from '#tests/guard/project-files.ts';
import { dossierOfText } from '#tests/support/derive.ts';

const range = [
  [-1, 0, 0],
  [1, 1, 2],
] as const;

describe('packed picks', () => {
  it('come back as they were, in their order, over a border too', () => {
    const picks: PickEntry[] = [
      { kind: 'atom', atomId: '419999.0', siteIndex: 419_999, cellShift: [0, 0, 0], context: false },
      { kind: 'bond', bond: 'bond', fromAtomId: '3.11', toAtomId: '0.2', lengthAngstrom: 1.6093 },
      { kind: 'atom', atomId: '7.191', siteIndex: 7, cellShift: [-1, 0, 300], context: true },
      { kind: 'bond', bond: 'hydrogen', fromAtomId: '12.0', toAtomId: '12.1', lengthAngstrom: 1 / 3 },
    ];
    expect(unpackPicks(structuredClone(packPicks(picks)))).toEqual(picks);
    expect(unpackPicks(packPicks([]))).toEqual([]);
  });

  it.each([
    ['drum-1-quartz.cif', { extent: 'shell' }],
    ['drum-2-diopside.cif', {}],
    ['drum-3-malate.cif', { extent: 'molecules', hydrogenBonds: true }],
    ['drum-3-malate.cif', { extent: 'range', range }],
  ] as const)('hold all of a picture of %s', (file, options) => {
    const text = readFileSync(join(projectRoot, 'samples', file), 'utf8');
    const { picks } = buildScene(dossierOfText(file, text), options);
    expect(picks.length).toBeGreaterThan(10);
    expect(unpackPicks(packPicks(picks)).map(withoutSignedZeros)).toEqual(picks.map(withoutSignedZeros));
  });
});

function withoutSignedZeros(pick: PickEntry): PickEntry {
  if (pick.kind !== 'atom') return pick;
  const [a, b, c] = pick.cellShift;
  return { ...pick, cellShift: [a + 0, b + 0, c + 0] };
}
