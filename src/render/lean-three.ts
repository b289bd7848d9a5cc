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

/** Functions and methods that nothing here calls, by module: methods are gone, functions throw where somebody calls them. */
export const leftOut: Readonly<Record<string, string>> = {
  'core/BufferAttribute.js':
    'toJSON copy applyMatrix3 transformDirection applyNormalMatrix applyMatrix4 copyAt',
  'core/BufferGeometry.js':
    'computeTangents computeVertexNormals toJSON toNonIndexed copy computeBoundingBox setFromPoints applyMatrix4 normalizeNormals center lookAt scale translate rotateX rotateY rotateZ applyQuaternion',
  'core/Object3D.js':
    'toJSON copy attach lookAt applyMatrix4 clone traverseAncestors traverseVisible getWorldDirection getWorldScale getWorldQuaternion getWorldPosition getObjectsByProperty getObjectByProperty worldToLocal localToWorld translateOnAxis rotateOnAxis rotateOnWorldAxis setRotationFromMatrix setRotationFromAxisAngle',
  'core/RenderTarget.js': 'copy',
  'extras/ImageUtils.js': 'sRGBToLinear getDataURL',
  'extras/TextureUtils.js': 'getByteLength contain cover',
  'materials/Material.js': 'toJSON fromJSON copy',
  'materials/ShaderMaterial.js': 'toJSON fromJSON copy',
  'math/Box3.js': 'satForAxes',
  'objects/Mesh.js':
    '_computeIntersections raycast checkGeometryIntersection checkIntersection getVertexPosition copy',
  'renderers/WebGLRenderer.js':
    'copyTextureToTexture copyFramebufferToTexture renderTransmissionPass readRenderTargetPixels readRenderTargetPixelsAsync compile compileAsync setRenderTargetTextures setEffects getReadableState initTexture',
  'renderers/shaders/UniformsUtils.js': 'cloneUniforms',
  'renderers/webgl/WebGLClipping.js': 'setState projectPlanes',
  'renderers/webgl/WebGLGeometries.js': 'updateWireframeAttribute getWireframeAttribute',
  'renderers/webgl/WebGLPrograms.js': 'getProgramCacheKeyBooleans getProgramCacheKeyParameters',
  'renderers/webgl/WebGLState.js':
    'reset updateUBOMapping uniformBlockBinding texImage3D texStorage3D texSubImage3D compressedTexImage2D compressedTexImage3D compressedTexSubImage2D compressedTexSubImage3D',
  'renderers/webgl/WebGLTextures.js':
    'uploadTexture uploadCubeTexture updateTexture setupDepthTexture initTexture resizeImage verifyColorSpace getDimensions getTextureCacheKey getMipLevels setTexture2DArray setTexture3D setTextureCube',
  'renderers/webgl/WebGLUniforms.js':
    'setValueT6Array setValueT3DArray setValueT2DArrayArray setValueT6 setValueT3D1 setValueT2DArray1 setValueV1ui setValueV2ui setValueV3ui setValueV4ui setValueM2 setValueM2Array setValueM3Array setValueM4Array',
  'scenes/Scene.js': 'toJSON copy',
  'textures/Texture.js': 'toJSON copy transformUv',
  'textures/TextureSource.js': 'toJSON serializeImage',
};

/** All methods that are called of some classes of numbers, where these are few. */
export const kept: Readonly<Record<string, string>> = {
  'math/Box3.js': 'constructor expandByPoint getCenter isEmpty makeEmpty setFromBufferAttribute copy clone',
  'math/Color.js': 'constructor copy clone getRGB set setHex setRGB setScalar',
  'math/Euler.js':
    'constructor _onChange _onChangeCallback copy clone set setFromQuaternion setFromRotationMatrix',
  'math/Frustum.js': 'constructor setFromProjectionMatrix copy clone',
  'math/Matrix3.js':
    'constructor copy getNormalMatrix identity invert set setFromMatrix4 setUvTransform transpose',
  'math/Matrix4.js':
    'constructor compose copy decompose determinant determinantAffine fromArray identity invert makeRotationFromQuaternion multiply multiplyMatrices premultiply set setPosition toArray',
  'math/Plane.js': 'constructor copy clone normalize set setComponents',
  'math/Quaternion.js':
    'constructor _onChange _onChangeCallback copy clone identity set setFromEuler setFromRotationMatrix',
  'math/Sphere.js': 'constructor copy clone set applyMatrix4 isEmpty makeEmpty',
  'math/Vector2.js': 'constructor copy clone equals floor multiplyScalar set',
  'math/Vector3.js':
    'constructor addVectors applyMatrix4 clone copy crossVectors distanceToSquared dot fromArray fromBufferAttribute length lengthSq max min multiplyScalar set setFromMatrixPosition sub subVectors',
  'math/Vector4.js':
    'constructor applyMatrix4 clone copy equals floor fromArray multiplyScalar round set toArray',
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
  if (node.kind === 'get' || node.kind === 'set') return undefined;
  const assigned = isNode(node.left) ? node.left.property : undefined;
  const holder = { FunctionDeclaration: node.id, MethodDefinition: node.key, AssignmentExpression: assigned }[
    node.type
  ];
  return isNode(holder) ? holder.name : undefined;
}

/** Parts of a module to cut: whole methods, and the bodies of functions; none inside another. */
function partsToCut(isCut: (name: unknown, isMethod: boolean) => boolean, node: SyntaxNode): SyntaxNode[] {
  const isMethod = node.type === 'MethodDefinition';
  if (isCut(definedName(node), isMethod)) {
    const whole = [node, node.right].find((part) => isNode(part) && isNode(part.body));
    if (isMethod) return [node];
    if (isNode(whole) && isNode(whole.body)) return [whole.body];
  }
  const children = Object.values(node).flat().filter(isNode);
  return children.flatMap((child) => partsToCut(isCut, child));
}

/** The module without the methods and functions that the tables leave out. */
function shortened(code: string, tree: SyntaxNode, module: string): string {
  const cut = new Set<unknown>(leftOut[module]?.split(' '));
  const methods = module in kept ? new Set<unknown>(kept[module]?.split(' ')) : null;
  const isCut = (name: unknown, isMethod: boolean): boolean =>
    cut.has(name) || (isMethod && methods !== null && name !== undefined && !methods.has(name));
  const parts = partsToCut(isCut, tree).sort((a, b) => b.start - a.start);
  return parts.reduce((text, { type, start, end }) => {
    const instead = type === 'MethodDefinition' ? '' : "{ throw new Error('left out of three.js') }";
    return text.slice(0, start) + instead + text.slice(end);
  }, code);
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
      const isTabled = module in leftOut || module in kept;
      const shorter = isTabled ? shortened(code, this.parse(code) as unknown as SyntaxNode, module) : code;
      const plain = module.startsWith('renderers/')
        ? shorter.replace(absent, 'false').replace(/\b(parameters|material)\.isRawShaderMaterial\b/g, 'true')
        : shorter.replace('Color.NAMES = _colorKeywords;', '');
      return { code: plain, map: null };
    },
  };
}
