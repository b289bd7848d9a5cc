import { describe, expect, it } from 'vitest';
import { inParts, joined } from '#src/store/dossier-parts.ts';
import { fixtureCase, manySites } from '#tests/support/dossier-fixture.ts';

describe('a large dossier on its way to the page', () => {
  it('comes in parts of a few thousand sites and is whole again', () => {
    const whole = fixtureCase(manySites(9001));
    const { parts, rest } = inParts(whole);
    expect(parts.map(({ sites }) => sites.length)).toEqual([4000, 4000, 1001]);
    expect(rest.dossier?.sites).toEqual([]);
    expect(joined(parts, rest)).toEqual(whole);
  });

  it('stays in one piece where it is small', () => {
    const whole = fixtureCase();
    expect(inParts(whole)).toEqual({ parts: [], rest: whole });
  });
});
