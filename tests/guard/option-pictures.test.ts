import { describe, expect, it } from 'vitest';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import type { PictureChoice } from '#tests/support/option-forms.ts';
import { pictureChoices } from '#tests/support/option-forms.ts';
import type { PictureCase } from '#tests/support/picture-case.ts';
import { caseFiles, pictureCases } from '#tests/support/picture-case.ts';
import { failures } from '#tests/support/picture-checks.ts';
import { drawnByRaster, preparePicture } from '#tests/support/picture-scene.ts';

const pictures = pictureCases.map(([, picture]) => picture);
const rasterizer = createRasterizer(bestKernel());

function holds(picture: PictureCase): boolean {
  const prepared = preparePicture(picture);
  return failures(picture, prepared, drawnByRaster(rasterizer, picture, prepared)).length === 0;
}

/** Values that some case or nobody asks for. */
function otherValues({ saidBy, usual }: PictureChoice, value: unknown): unknown[] {
  const texts = new Set(
    [usual, ...pictures.map(saidBy).filter((said) => said !== undefined)].map((v) => JSON.stringify(v)),
  );
  texts.delete(JSON.stringify(value));
  return [...texts].map((text) => JSON.parse(text) as unknown);
}

/** Whether some case that says so fails once something else is drawn. */
function isNoticed(choice: PictureChoice, form: string): boolean {
  return pictures.some((picture) => {
    const value = choice.saidBy(picture);
    if (value === undefined || choice.formOf(value) !== form) return false;
    return otherValues(choice, value).some((other) => !holds(choice.instead(picture, other)));
  });
}

const everyForm = pictureChoices.flatMap((choice) =>
  choice.forms.map((form) => ({ name: `${choice.group}.${choice.key}: ${form}`, choice, form })),
);

describe('every choice of a picture', () => {
  it('has a case that asks for it', () => {
    const missing = everyForm.filter(
      ({ choice, form }) =>
        !pictures.some((picture) => {
          const value = choice.saidBy(picture);
          return value !== undefined && choice.formOf(value) === form;
        }),
    );
    expect(missing.map(({ name }) => name)).toEqual([]);
  });

  it.each(everyForm)('$name is noticed when it is not obeyed', ({ choice, form }) => {
    expect(isNoticed(choice, form)).toBe(true);
  });
});

describe('case folders', () => {
  it('say what they prove, and where each number comes from', () => {
    const silent = pictureCases.filter(
      ([, { about, expect: statements }]) =>
        about === '' || statements.length === 0 || statements.some(({ from }) => !from),
    );
    expect(silent.map(([name]) => name)).toEqual([]);
  });

  it('know only choices that exist', () => {
    const known = new Set(pictureChoices.map(({ group, key }) => `${group}.${key}`));
    const unknown = pictureCases.flatMap(([name, { options, look = {} }]) =>
      [
        ...Object.keys(options).map((key) => `options.${key}`),
        ...Object.keys(look).map((key) => `look.${key}`),
      ]
        .filter((key) => !known.has(key))
        .map((key) => `${name}: ${key}`),
    );
    expect(unknown).toEqual([]);
  });

  it('hold crystals that say they are invented, and all are used', () => {
    const used = new Set(pictures.flatMap(({ structure, secondSet }) => [structure, secondSet]));
    expect(caseFiles.filter(([, text]) => !text.includes('INVENTED')).map(([file]) => file)).toEqual([]);
    expect(caseFiles.map(([file]) => file).filter((file) => !used.has(file))).toEqual([]);
  });
});
