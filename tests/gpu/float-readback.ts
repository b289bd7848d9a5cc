import { expandIncludes } from '#shaders/registry.ts';

/** Runs pieces of GLSL on the graphics pipeline and reads the numbers back. */
export interface FloatReadback {
  /**
   * Evaluates `body` (statements that set `vec4 result` from `vec4 inputs[n]`) once for each case and gives the results.
   * `includes` are chunk names of the registry.
   */
  run(
    includes: readonly string[],
    body: string,
    cases: readonly (readonly number[])[],
    uniforms?: Readonly<Record<string, readonly number[]>>,
  ): number[][];
  end(): void;
}

const vertex = `#version 300 es
void main() {
  vec2 corner = vec2((gl_VertexID & 1) == 0 ? -1.0 : 3.0, (gl_VertexID & 2) == 0 ? -1.0 : 3.0);
  gl_Position = vec4(corner, 0.0, 1.0);
}`;

/** One pixel of a float target a case; inputs come from a float texture of one row a case. */
export function floatReadback(): FloatReadback {
  const gl = document.createElement('canvas').getContext('webgl2');
  if (!gl?.getExtension('EXT_color_buffer_float'))
    throw new Error('no WebGL 2 with float targets in this browser');
  return {
    run(includes, body, cases, uniforms = {}) {
      const perCase = Math.ceil(cases[0]!.length / 4);
      const program = link(gl, vertex, fragmentFor(includes, body, perCase));
      gl.useProgram(program);
      setUniforms(gl, program, uniforms);
      const inputs = new Float32Array(4 * perCase * cases.length);
      cases.forEach((values, i) => inputs.set(values, 4 * perCase * i));
      bindTexture(gl, perCase, cases.length, inputs);
      const target = bindTarget(gl, cases.length);
      gl.viewport(0, 0, cases.length, 1);
      gl.drawArrays(gl.TRIANGLES, 0, 3);
      const out = new Float32Array(4 * cases.length);
      gl.readPixels(0, 0, cases.length, 1, gl.RGBA, gl.FLOAT, out);
      gl.deleteFramebuffer(target);
      return cases.map((_values, i) => [...out.subarray(4 * i, 4 * i + 4)]);
    },
    end() {
      gl.getExtension('WEBGL_lose_context')?.loseContext();
    },
  };
}

function fragmentFor(includes: readonly string[], body: string, perCase: number): string {
  return `#version 300 es
precision highp float;
precision highp int;
precision highp sampler2D;
${expandIncludes(includes.map((name) => `#include <${name}>`).join('\n'))}
uniform sampler2D uInputs;
out vec4 result;
void main() {
  vec4 inputs[${perCase}];
  for (int k = 0; k < ${perCase}; k++) inputs[k] = texelFetch(uInputs, ivec2(k, int(gl_FragCoord.x)), 0);
  ${body}
}`;
}

/** Compiles and links, or throws with the compiler's words. */
export function link(gl: WebGL2RenderingContext, vertexSource: string, fragmentSource: string): WebGLProgram {
  const program = gl.createProgram();
  for (const [type, source] of [
    [gl.VERTEX_SHADER, vertexSource],
    [gl.FRAGMENT_SHADER, fragmentSource],
  ] as const) {
    const shader = gl.createShader(type)!;
    gl.shaderSource(shader, source);
    gl.compileShader(shader);
    if (!gl.getShaderParameter(shader, gl.COMPILE_STATUS))
      throw new Error(gl.getShaderInfoLog(shader) ?? 'compile');
    gl.attachShader(program, shader);
  }
  gl.linkProgram(program);
  if (!gl.getProgramParameter(program, gl.LINK_STATUS))
    throw new Error(gl.getProgramInfoLog(program) ?? 'link');
  return program;
}

function setUniforms(
  gl: WebGL2RenderingContext,
  program: WebGLProgram,
  uniforms: Readonly<Record<string, readonly number[]>>,
): void {
  for (const [name, values] of Object.entries(uniforms)) {
    const at = gl.getUniformLocation(program, name);
    if (values.length === 1) gl.uniform1fv(at, [...values]);
    else if (values.length === 2) gl.uniform2fv(at, [...values]);
    else if (values.length === 3) gl.uniform3fv(at, [...values]);
    else gl.uniform4fv(at, [...values]);
  }
}

function bindTexture(gl: WebGL2RenderingContext, width: number, height: number, values: Float32Array): void {
  gl.activeTexture(gl.TEXTURE0);
  gl.bindTexture(gl.TEXTURE_2D, gl.createTexture());
  gl.texImage2D(gl.TEXTURE_2D, 0, gl.RGBA32F, width, height, 0, gl.RGBA, gl.FLOAT, values);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_MIN_FILTER, gl.NEAREST);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_MAG_FILTER, gl.NEAREST);
}

function bindTarget(gl: WebGL2RenderingContext, width: number): WebGLFramebuffer {
  const framebuffer = gl.createFramebuffer();
  const texture = gl.createTexture();
  gl.activeTexture(gl.TEXTURE1);
  gl.bindTexture(gl.TEXTURE_2D, texture);
  gl.texStorage2D(gl.TEXTURE_2D, 1, gl.RGBA32F, width, 1);
  gl.bindFramebuffer(gl.FRAMEBUFFER, framebuffer);
  gl.framebufferTexture2D(gl.FRAMEBUFFER, gl.COLOR_ATTACHMENT0, gl.TEXTURE_2D, texture, 0);
  return framebuffer;
}
