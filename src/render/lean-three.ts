import type { Plugin } from 'vite';

/**
 * three.js without the parts that this page never reaches. Its renderer names them all, so that no bundler can leave them
 * out: the library of shader texts, lights, shadows, environment maps, headsets, morphing and so on serve its own materials,
 * and `src/render` uses `RawShaderMaterial` alone, with its own shaders, no lights and one camera. The modules below are
 * replaced by what the renderer asks of them in a scene that has nothing for them to do. Everything else is three.js as
 * published, taken module by module from its `src`.
 *
 * tests/pictures and tests/gpu draw with exactly this three.js; tests/guard/lean-three.test.ts checks that every module is
 * still there under its name, with the exports the stand-in has.
 */
export const standIns: Readonly<Record<string, string>> = {
  'renderers/shaders/ShaderChunk.js': 'export const ShaderChunk = {};',
  'renderers/shaders/ShaderLib.js': 'export const ShaderLib = {};',
  'renderers/shaders/UniformsLib.js': 'export const UniformsLib = {};',
  'renderers/shaders/DFGLUTData.js': 'export function getDFGLUT() { return null; }',
  'renderers/webgl/WebGLLights.js': `
    const none = [];
    export function WebGLLights() {
      return {
        setup() {},
        setupView() {},
        state: {
          version: 0, ambient: none, probe: none, rectArea: none, rectAreaLTC1: null, rectAreaLTC2: null, hemi: none,
          sun: none, sunShadow: none, sunShadowMap: none, sunShadowMatrix: none, sunShadowCascade: none,
          directional: none, directionalShadow: none, directionalShadowMap: none, directionalShadowMatrix: none,
          spot: none, spotLightMap: none, spotShadow: none, spotShadowMap: none, spotLightMatrix: none,
          point: none, pointShadow: none, pointShadowMap: none, pointShadowMatrix: none,
          numSpotLightShadowsWithMaps: 0, numLightProbes: 0,
        },
      };
    }`,
  'renderers/webgl/WebGLEnvironments.js': `
    export function WebGLEnvironments() {
      return { get: () => null, dispose() {} };
    }`,
  'renderers/webgl/WebGLShadowMap.js': `
    export function WebGLShadowMap() {
      return { enabled: false, autoUpdate: true, needsUpdate: false, type: 0, render() {} };
    }`,
  'renderers/webgl/WebGLMorphtargets.js': `
    export function WebGLMorphtargets() {
      return { update() {} };
    }`,
  'renderers/webgl/WebGLUniformsGroups.js': `
    export function WebGLUniformsGroups() {
      return { bind() {}, update() {}, dispose() {} };
    }`,
  'renderers/webgl/WebGLMaterials.js': `
    export function WebGLMaterials() {
      return {
        refreshFogUniforms() {},
        refreshMaterialUniforms(_uniforms, material) { material.uniformsNeedUpdate = false; },
      };
    }`,
  'renderers/webgl/WebGLOutput.js': 'export class WebGLOutput {}',
  'renderers/webxr/WebXRManager.js': `
    export class WebXRManager {
      enabled = false;
      isPresenting = false;
      getEnvironmentBlendMode() {}
      setAnimationLoop() {}
      addEventListener() {}
      removeEventListener() {}
      dispose() {}
    }`,
  'geometries/BoxGeometry.js': 'export class BoxGeometry {}',
  'geometries/PlaneGeometry.js': 'export class PlaneGeometry {}',
};

const sources = /[\\/]three[\\/]src[\\/](.+)$/;

export function leanThree(): Plugin {
  return {
    name: 'lean-three',
    enforce: 'pre',
    resolveId(source, importer) {
      return source === 'three' ? this.resolve('three/src/Three.js', importer, { skipSelf: true }) : null;
    },
    load(id) {
      const module = sources.exec(id)?.[1]?.replaceAll('\\', '/');
      return module === undefined ? null : (standIns[module] ?? null);
    },
  };
}
