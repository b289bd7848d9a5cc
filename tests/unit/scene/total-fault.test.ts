import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

/** The fixture with a shielding whose lowest principal value is not positive. */
function withLowest(lowest: number): typeof fixtureDossier {
  const sites = fixtureDossier.sites.map((site) =>
    site.shielding && site.index === 0
      ? {
          ...site,
          shielding: {
            ...site.shielding,
            components: [lowest, 520, 560] as const,
            isotropic: (lowest + 1080) / 3,
          },
        }
      : site,
  );
  return { ...fixtureDossier, sites };
}

describe('ellipsoids of total values', () => {
  const options = { quantity: 'shielding', tensorElements: null } as const;

  it.each(['auto', 'total', 'deviation'] as const)(
    'are told impossible where a value is not positive, whatever is asked for (%s)',
    (ellipsoid) => {
      for (const lowest of [-40, 0]) {
        const { scale } = buildScene(withLowest(lowest), { ...options, ellipsoid });
        expect(scale?.kind).toBe('deviation');
        expect(scale?.totalFault).toContain('not positive');
      }
    },
  );

  it('are possible where all are positive, and where the others are not drawn', () => {
    expect(
      buildScene(withLowest(1), { ...options, ellipsoid: 'deviation' }).scale?.totalFault,
    ).toBeUndefined();
    const oxygen = buildScene(withLowest(-40), { ...options, tensorElements: ['O'], ellipsoid: 'total' });
    expect(oxygen.scale).toMatchObject({ kind: 'total' });
    expect(oxygen.scale?.totalFault).toBeUndefined();
  });
});
