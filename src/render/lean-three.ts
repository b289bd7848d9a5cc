import type { Plugin } from 'vite';

/**
 * three.js without the parts that this page never reaches. Its renderer names them all, so that no bundler can leave them
 * out: the library of shader texts, lights, shadows, environment maps, headsets, morphing and so on serve its own materials,
 * and `src/render` uses `RawShaderMaterial` alone, with its own shaders, no lights and one camera. The modules below are
 * replaced by what the renderer asks of them in a scene that has nothing for them to do, functions nobody calls by a throw,
 * and questions for kinds of things that are never there by `false`. Everything else is three.js as published, taken module
 * by module from its `src`.
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
  'math/FrustumArray.js': 'export class FrustumArray {}',
  'math/Ray.js': 'export class Ray {}',
  'math/Triangle.js': 'export class Triangle {}',
  'geometries/BoxGeometry.js': 'export class BoxGeometry {}',
  'geometries/PlaneGeometry.js': 'export class PlaneGeometry {}',
};

/** Functions and methods that nothing here calls, by module: they throw where somebody does. */
export const leftOut: Readonly<Record<string, string>> = {
  'core/BufferAttribute.js': 'toJSON copy applyMatrix3',
  'core/BufferGeometry.js':
    'computeTangents computeVertexNormals toJSON toNonIndexed copy computeBoundingBox setFromPoints applyMatrix4',
  'core/Object3D.js': 'toJSON copy attach lookAt applyMatrix4',
  'core/RenderTarget.js': 'copy',
  'extras/ImageUtils.js': 'sRGBToLinear getDataURL',
  'extras/TextureUtils.js': 'getByteLength contain cover',
  'materials/Material.js': 'toJSON fromJSON copy',
  'materials/ShaderMaterial.js': 'toJSON fromJSON copy',
  'math/Box3.js': 'expandByObject intersectsTriangle intersectsPlane applyMatrix4 satForAxes',
  'math/Color.js': 'setStyle getStyle setColorName getHSL setHSL',
  'math/Frustum.js': 'intersectsObject intersectsSprite',
  'math/Matrix4.js': 'makePerspective makeOrthographic lookAt extractRotation makeRotationAxis',
  'math/Quaternion.js': 'slerpFlat slerp setFromUnitVectors multiplyQuaternionsFlat random',
  'math/Vector4.js': 'setAxisAngleFromRotationMatrix setAxisAngleFromQuaternion',
  'objects/Mesh.js':
    '_computeIntersections raycast checkGeometryIntersection checkIntersection getVertexPosition copy',
  'renderers/WebGLRenderer.js':
    'copyTextureToTexture copyFramebufferToTexture renderTransmissionPass readRenderTargetPixels readRenderTargetPixelsAsync compile compileAsync setRenderTargetTextures setEffects getReadableState initTexture',
  'renderers/shaders/UniformsUtils.js': 'cloneUniforms',
  'renderers/webgl/WebGLClipping.js': 'setState projectPlanes',
  'renderers/webgl/WebGLGeometries.js': 'updateWireframeAttribute getWireframeAttribute',
  'renderers/webgl/WebGLPrograms.js': 'getProgramCacheKeyBooleans getProgramCacheKeyParameters',
  'renderers/webgl/WebGLState.js': 'reset updateUBOMapping uniformBlockBinding',
  'renderers/webgl/WebGLTextures.js':
    'uploadTexture uploadCubeTexture updateTexture setupDepthTexture initTexture resizeImage verifyColorSpace getDimensions getTextureCacheKey getMipLevels setTexture2DArray setTexture3D setTextureCube',
  'scenes/Scene.js': 'toJSON copy',
  'textures/Texture.js': 'toJSON copy transformUv',
  'textures/TextureSource.js': 'toJSON serializeImage',
};

/** Kinds of things that are in no scene of ours; `thing.isSprite` and the like are false. */
export const absentKinds =
  'ArrayCamera BatchedMesh Fog FogExp2 InstancedMesh Light LightProbeGrid Line LineLoop LineSegments LOD Points SkinnedMesh Sprite ' +
  'MeshBasicMaterial MeshLambertMaterial MeshPhongMaterial MeshStandardMaterial MeshToonMaterial NodeMaterial ' +
  'CompressedArrayTexture CompressedTexture CubeTexture Data3DTexture DataArrayTexture DataTexture ExternalTexture ' +
  'FramebufferTexture HTMLTexture VideoTexture WebGL3DRenderTarget WebGLArrayRenderTarget WebGLCubeRenderTarget';

const absent = new RegExp(
  `\\b(?!this\\b)\\w+\\.is(?:${absentKinds.replaceAll(' ', '|')})\\b(?!\\s*=[^=])`,
  'g',
);

interface SyntaxNode {
  readonly type: string;
  readonly start: number;
  readonly end: number;
  readonly [field: string]: unknown;
}

const isNode = (value: unknown): value is SyntaxNode =>
  typeof value === 'object' && value !== null && 'type' in value && 'start' in value;

/** Name of what a node defines: a declared function, a method, or a function that is assigned to a property. */
function definedName(node: SyntaxNode): unknown {
  const assigned = isNode(node.left) ? node.left.property : undefined;
  const holder = { FunctionDeclaration: node.id, MethodDefinition: node.key, AssignmentExpression: assigned }[
    node.type
  ];
  return isNode(holder) ? holder.name : undefined;
}

/** Bodies of the named functions, none inside another. */
function bodiesOf(names: ReadonlySet<unknown>, node: SyntaxNode, found: SyntaxNode[] = []): SyntaxNode[] {
  if (names.has(definedName(node))) {
    const whole = [node, node.value, node.right].find((part) => isNode(part) && isNode(part.body));
    if (isNode(whole) && isNode(whole.body)) return [...found, whole.body];
  }
  const children = Object.values(node).flat().filter(isNode);
  return children.reduce((sum, child) => bodiesOf(names, child, sum), found);
}

/** The module with the bodies of these functions replaced by a throw. */
function withoutBodies(code: string, tree: SyntaxNode, names: readonly string[]): string {
  const bodies = bodiesOf(new Set(names), tree).sort((a, b) => b.start - a.start);
  return bodies.reduce(
    (text, { start, end }) => `${text.slice(0, start)}{ throw new Error('left out') }${text.slice(end)}`,
    code,
  );
}

const sources = /[\\/]three[\\/]src[\\/](.+)$/;
const moduleOf = (id: string): string | undefined => sources.exec(id)?.[1]?.replaceAll('\\', '/');

export function leanThree(): Plugin {
  return {
    name: 'lean-three',
    enforce: 'pre',
    resolveId(source, importer) {
      return source === 'three' ? this.resolve('three/src/Three.js', importer, { skipSelf: true }) : null;
    },
    load: (id) => standIns[moduleOf(id) ?? ''] ?? null,
    transform(code, id) {
      const module = moduleOf(id);
      if (module === undefined || module in standIns) return null;
      const names = leftOut[module]?.split(' ') ?? [];
      const shorter =
        names.length > 0 ? withoutBodies(code, this.parse(code) as unknown as SyntaxNode, names) : code;
      const plain = module.startsWith('renderers/')
        ? shorter.replace(absent, 'false').replace(/\b(parameters|material)\.isRawShaderMaterial\b/g, 'true')
        : shorter;
      return { code: plain, map: null };
    },
  };
}
