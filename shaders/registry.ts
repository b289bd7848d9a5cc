import colour from './chunks/_colour.glsl?raw';
import cylinderChunk from './chunks/_cylinder.glsl?raw';
import depthCue from './chunks/_depth-cue.glsl?raw';
import light from './chunks/_light.glsl?raw';
import pattern from './chunks/_pattern.glsl?raw';
import pixel from './chunks/_pixel.glsl?raw';
import polarChunk from './chunks/_polar.glsl?raw';
import quadricChunk from './chunks/_quadric.glsl?raw';
import quadricFace from './chunks/_quadric-face.glsl?raw';
import quadricImage from './chunks/_quadric-image.glsl?raw';
import view from './chunks/_view.glsl?raw';
import cylinderFragment from './cylinder.frag.glsl?raw';
import cylinderVertex from './cylinder.vert.glsl?raw';
import facetFragment from './facet.frag.glsl?raw';
import facetVertex from './facet.vert.glsl?raw';
import lineFragment from './line.frag.glsl?raw';
import lineVertex from './line.vert.glsl?raw';
import polarFragment from './polar.frag.glsl?raw';
import polarVertex from './polar.vert.glsl?raw';
import quadricFragment from './quadric.frag.glsl?raw';
import quadricVertex from './quadric.vert.glsl?raw';
import markedFragment from './quadric-marked.frag.glsl?raw';
import markedVertex from './quadric-marked.vert.glsl?raw';
import resolveFragment from './resolve.frag.glsl?raw';
import resolveVertex from './resolve.vert.glsl?raw';
import ringFragment from './ring.frag.glsl?raw';
import ringVertex from './ring.vert.glsl?raw';

/** Shared parts by the name they are included with; each lives in chunks/NAME.glsl. */
export const chunks = {
  _colour: colour,
  _cylinder: cylinderChunk,
  '_depth-cue': depthCue,
  _light: light,
  _pattern: pattern,
  _pixel: pixel,
  _polar: polarChunk,
  _quadric: quadricChunk,
  '_quadric-face': quadricFace,
  '_quadric-image': quadricImage,
  _view: view,
} as const;

/** Vertex and fragment shader of each program, as written; NAME.vert.glsl and NAME.frag.glsl. */
export const programs = {
  cylinder: { vertex: cylinderVertex, fragment: cylinderFragment },
  facet: { vertex: facetVertex, fragment: facetFragment },
  line: { vertex: lineVertex, fragment: lineFragment },
  polar: { vertex: polarVertex, fragment: polarFragment },
  quadric: { vertex: quadricVertex, fragment: quadricFragment },
  'quadric-marked': { vertex: markedVertex, fragment: markedFragment },
  resolve: { vertex: resolveVertex, fragment: resolveFragment },
  ring: { vertex: ringVertex, fragment: ringFragment },
} as const;

export type ProgramName = keyof typeof programs;

/** Replaces each line `#include <_name>` by the chunk of that name; chunks do not include one another. */
export function expandIncludes(source: string): string {
  return source.replace(/^[ \t]*#include <([\w-]+)>[ \t]*$/gm, (_line, name: string) => {
    if (!(name in chunks))
      throw new Error(`no shader chunk ${name}; there are ${Object.keys(chunks).join(', ')}`);
    return chunks[name as keyof typeof chunks];
  });
}

/** Complete GLSL ES 3.00 sources of a program, without the version line. */
export function shaderSource(name: ProgramName): { readonly vertex: string; readonly fragment: string } {
  const { vertex, fragment } = programs[name];
  return { vertex: expandIncludes(vertex), fragment: expandIncludes(fragment) };
}
