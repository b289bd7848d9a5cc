import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { questionsOf, withChoices } from '#src/readers/text/choose-groups.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import type { FoundText } from '#src/readers/text/found-text.ts';
import { readingOf } from '#src/readers/text/read-found-text.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import { noChoice } from '#src/tensor/text-choice.ts';

const find = (text: string, name = 'a.log'): FoundText => findInText(sourceFromText(name, text));

/** Blocks that nothing says the quantity of; the text and all numbers are invented. */
const blocks = (atoms: readonly string[]): string =>
  [
    'Invented run',
    ...atoms.flatMap((atom, at) => [
      ` atom ${atom}`,
      `  ${520 + at}.0   2.0   0.0`,
      '   -4.0  530.0   0.0',
      '    0.0    7.0 549.0',
    ]),
  ].join('\n');

const sixes = `Invented run

 EFG tensors, six components each
  Al1     0.0700   0.0300  -0.1000   0.0200   0.0100   0.0400
  O1      0.2000  -0.0500  -0.1500   0.0600   0.0000   0.0200
`;

const choose = (found: FoundText, at: number, change: Partial<TextChoice>): FoundText =>
  withChoices(found, [{ ...noChoice, signature: found.groups[at]!.signature!, file: found.file, ...change }]);

const codes = ({ problems }: FoundText): string[] => problems.map(({ code }) => code);

describe('a choice about found tensors', () => {
  it('answers an open quantity, and the tensors are used', () => {
    const found = find(blocks(['Al1', 'O1']));
    expect(questionsOf(found.groups[0]!)).toEqual(['quantity']);
    expect(readingOf(found)).toMatchObject({ format: 'text', tensorSets: [] });
    const chosen = choose(found, 0, { quantity: 'shielding' });
    expect(questionsOf(chosen.groups[0]!)).toEqual([]);
    expect(chosen.groups[0]).toMatchObject({ unit: 'ppm', role: 'total', proposed: true });
    expect(codes(found)).toContain('find-quantity-open');
    expect(codes(chosen)).not.toContain('find-quantity-open');
    expect(chosen.groups[0]!.reason).toContain('chosen: shielding');
  });

  it('exchanges rows and columns and turns the sign', () => {
    const chosen = choose(find(blocks(['Al1'])), 0, {
      quantity: 'shift',
      order: 'exchanged',
      sign: -1,
    });
    expect(chosen.groups[0]!.entries[0]!.tensor).toEqual([-520, 4, 0, -2, -530, -7, 0, 0, -549]);
  });

  it('puts six components where another order has them', () => {
    const found = find(sixes);
    expect(questionsOf(found.groups[0]!)).toEqual(['unit', 'order']);
    const chosen = choose(found, 0, { unit: 'V/A2', order: 'xx xy xz yy yz zz' });
    expect(chosen.groups[0]!.entries[0]!.tensor).toEqual([
      0.07, 0.03, -0.1, 0.03, 0.02, 0.01, -0.1, 0.01, 0.04,
    ]);
    expect(codes(chosen)).toEqual([]);
    expect(readingOf(found, [chosen.groups[0]!.choice!])?.tensorSets[0]?.unitGiven).toBe('V Å⁻²');
  });

  it('that they are none of these ends the question', () => {
    const chosen = choose(find(blocks(['Al1'])), 0, { taken: false });
    expect(questionsOf(chosen.groups[0]!)).toEqual([]);
    expect(chosen.groups[0]!.proposed).toBe(false);
    expect(codes(chosen)).not.toContain('find-quantity-open');
  });

  it('to take something else of a tensor’s shape asks what it is', () => {
    const found = find(`Stress tensors (GPa)\n${blocks(['Al1']).replace('Invented run', '')}`);
    expect(found.groups[0]).toMatchObject({ role: 'decoy', proposed: false });
    expect(questionsOf(found.groups[0]!)).toEqual([]);
    expect(questionsOf(choose(found, 0, { taken: true }).groups[0]!)).toEqual(['quantity']);
    const named = choose(found, 0, { taken: true, quantity: 'shift' });
    expect(questionsOf(named.groups[0]!)).toEqual([]);
    expect(readingOf(found, [named.groups[0]!.choice!])?.tensorSets[0]?.quantity).toBe('shift');
  });

  it('takes no unit of another quantity along', () => {
    const chosen = choose(find(blocks(['Al1'])), 0, { quantity: 'efg', unit: 'ppm' });
    expect(chosen.groups[0]!.unit).toBe('unknown');
    expect(codes(chosen)).toContain('find-unit-open');
  });

  it('to take an earlier group sets the one aside that holds the same atoms', () => {
    const tensors = (value: number): string =>
      ['Al1', 'O1'].map((atom) => ` ${atom} ${value} 0 1.5 0 ${value + 2} 0 1.5 0 ${value}`).join('\n');
    const text = `Cycle 1\nShielding tensors (ppm)\n${tensors(201.25)}\n\nCycle 2\nShielding tensors (ppm)\n${tensors(203.75)}\n`;
    const found = find(text);
    // a group for each element, alike in shape: one choice holds for both
    expect(found.groups.map(({ proposed }) => proposed)).toEqual([false, false, true, true]);
    const chosen = choose(found, 0, { taken: true });
    expect(chosen.groups.map(({ proposed }) => proposed)).toEqual([true, true, false, false]);
    expect(chosen.groups[2]!.reason).toContain('line 3 was taken in its place');
  });
});

describe('the shape of a group', () => {
  it('is the same for other elements, counts and lines, so that a choice is used again and says so', () => {
    const first = find(blocks(['Al1', 'O1']));
    const choice = choose(first, 0, { quantity: 'shielding' }).groups[0]!.choice!;
    const next = withChoices(find(`\n\n\n${blocks(['Si1', 'Si2', 'N1'])}`, 'b.log'), [choice]);
    expect(next.groups[0]).toMatchObject({ quantity: 'shielding', proposed: true });
    expect(next.problems.find(({ code }) => code === 'find-choice-used')).toMatchObject({
      severity: 'note',
      message: 'The choice made in a.log was used for 3 tensors: shielding.',
      line: next.groups[0]!.line,
    });
    expect(codes(choose(first, 0, { quantity: 'shielding' }))).not.toContain('find-choice-used');
  });

  it('differs with pattern and words, and from cycle to cycle counted from the last', () => {
    const found = find(sixes);
    expect(found.groups[0]!.signature).not.toBe(find(blocks(['Al1'])).groups[0]!.signature);
    const twice = find(`${blocks(['Al1', 'O1'])}\n${blocks(['Al1', 'O1'])}`);
    const once = find(blocks(['Al1', 'O1']));
    expect(twice.groups.map(({ signature }) => signature)).toEqual([
      `${once.groups[0]!.signature} | 1 before the last`,
      once.groups[0]!.signature,
    ]);
  });
});
