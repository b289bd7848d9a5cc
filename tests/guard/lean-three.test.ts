import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { kept, leftOut, standIns } from '#src/render/lean-three.ts';
import { projectRoot } from './project-files.ts';

const source = join(projectRoot, 'node_modules/three/src');
const exported = (text: string): string[] => {
  const names = [...text.matchAll(/export (?:const|class|function) (\w+)/g)].map((match) => match[1] ?? '');
  const lists = [...text.matchAll(/export \{([^}]*)\}/g)].flatMap((match) => (match[1] ?? '').split(','));
  return [...names, ...lists.map((name) => name.trim()).filter(Boolean)].sort();
};

describe('three.js without what is not used', () => {
  it.each(Object.keys(standIns))('%s is part of three.js, with the exports its stand-in has', (name) => {
    expect(existsSync(join(source, name))).toBe(true);
    expect(exported(standIns[name]!)).toEqual(exported(readFileSync(join(source, name), 'utf8')));
  });

  it.each([...Object.entries(leftOut), ...Object.entries(kept)])(
    '%s still has what the tables name',
    (name, names) => {
      const text = readFileSync(join(source, name), 'utf8');
      const missing = names.split(' ').filter((one) => !new RegExp(`\\b${one}(?: =|\\()`).test(text));
      expect(missing).toEqual([]);
    },
  );

  it('is replaced part by part only where src/render draws with raw shader materials', () => {
    const materials = readFileSync(join(projectRoot, 'src/render/materials.ts'), 'utf8');
    expect(materials).toContain('new RawShaderMaterial(');
    expect(materials).not.toMatch(/new (Mesh\w+|Line\w+|Points\w*|Shader)Material\(/);
  });
});
