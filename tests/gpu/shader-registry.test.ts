import { afterAll, describe, expect, it } from 'vitest';
import type { ProgramName } from '#shaders/registry.ts';
import { chunks, expandIncludes, programs, shaderSource } from '#shaders/registry.ts';
import { link } from './float-readback.ts';

const files = import.meta.glob<string>('../../shaders/**/*.glsl', {
  query: '?raw',
  import: 'default',
  eager: true,
});
const gl = document.createElement('canvas').getContext('webgl2')!;

afterAll(() => gl.getExtension('WEBGL_lose_context')?.loseContext());

/** `chunks/_view` or `quadric.vert`. */
const names = Object.keys(files).map((path) => path.replace(/^.*\/shaders\//, '').replace(/\.glsl$/, ''));

describe('shader registry', () => {
  it('holds every file below shaders/, each under its own name', () => {
    const registered = new Map<string, string>([
      ...Object.entries(chunks).map(([name, text]) => [`chunks/${name}`, text] as const),
      ...Object.entries(programs).flatMap(([name, { vertex, fragment }]) => [
        [`${name}.vert`, vertex] as const,
        [`${name}.frag`, fragment] as const,
      ]),
    ]);
    expect([...registered.keys()].sort()).toEqual([...names].sort());
    for (const [path, text] of Object.entries(files)) {
      expect(registered.get(path.replace(/^.*\/shaders\//, '').replace(/\.glsl$/, ''))).toBe(text);
    }
  });

  it.each(Object.keys(programs) as ProgramName[])('%s compiles and links', (name) => {
    const { vertex, fragment } = shaderSource(name);
    expect(gl.isProgram(link(gl, `#version 300 es\n${vertex}`, `#version 300 es\n${fragment}`))).toBe(true);
  });

  it.each(Object.keys(chunks))('chunk %s is used by a program and includes no other', (name) => {
    const line = `#include <${name}>`;
    const users = Object.values(programs).filter(({ vertex, fragment }) =>
      (vertex + fragment).includes(line),
    );
    expect(users.length).toBeGreaterThan(0);
    expect(chunks[name as keyof typeof chunks]).not.toContain('#include');
  });

  it('an unknown chunk is refused with the known ones', () => {
    expect(() => expandIncludes('#include <_nowhere>')).toThrow(
      /no shader chunk _nowhere; there are _colour/,
    );
  });

  it('each file starts with a comment that says what it does and stays below 200 lines', () => {
    for (const text of Object.values(files)) {
      expect(text).toMatch(/^\/\/ \S/);
      expect(text.split('\n').length).toBeLessThan(200);
    }
  });
});
