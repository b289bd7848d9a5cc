/** What the browser can draw with, found out without loading the renderer. */
export interface WebGLProbe {
  /** WebGL2 works at all. */
  readonly available: boolean;
  /** It runs on the processor instead of a graphics chip. */
  readonly software: boolean;
  /** Unmasked renderer string; null where the browser hides it. */
  readonly renderer: string | null;
  /** A canvas can be painted on by the CPU renderer. */
  readonly canPaint: boolean;
  /** For people. */
  readonly sentence: string;
}

/** Words by which software renderers name themselves. `failIfMajorPerformanceCaveat` does not tell them reliably. */
const softwareNames = /swiftshader|llvmpipe|softpipe|basic render|software/i;

export function isSoftwareRenderer(renderer: string | null): boolean {
  return renderer !== null && softwareNames.test(renderer);
}

/** Unmasked renderer string of a context; null where the browser hides it. */
export function rendererName(gl: WebGL2RenderingContext): string | null {
  const info = gl.getExtension('WEBGL_debug_renderer_info');
  return info ? String(gl.getParameter(info.UNMASKED_RENDERER_WEBGL)) : null;
}

/** WebGL2 that runs on a graphics chip: the way to draw where it is there. */
export function hasHardware(probe: WebGLProbe): boolean {
  return probe.available && !probe.software;
}

/** Makes a WebGL2 context for a moment, asks what drives it, and lets it go. */
export function probeWebGL(makeCanvas: () => HTMLCanvasElement = newCanvas): WebGLProbe {
  const canPaint = paints(makeCanvas());
  const gl = contextOf(makeCanvas());
  if (!gl) {
    return {
      available: false,
      software: false,
      renderer: null,
      canPaint,
      sentence: canPaint
        ? 'This browser offers no WebGL 2, usually because it finds no graphics chip, so the crystal is drawn by the CPU.'
        : 'This browser offers neither WebGL 2 nor a canvas to paint on, so the crystal is not drawn; everything else works.',
    };
  }
  const renderer = rendererName(gl);
  gl.getExtension('WEBGL_lose_context')?.loseContext();
  const software = isSoftwareRenderer(renderer);
  const by = renderer ? ` (${renderer})` : '';
  return {
    available: true,
    software,
    renderer,
    canPaint,
    sentence: software
      ? `WebGL 2 runs on the processor here, without a graphics chip${by}, so the crystal is drawn by the CPU without it.`
      : `The crystal is drawn by WebGL 2${by}.`,
  };
}

function newCanvas(): HTMLCanvasElement {
  return document.createElement('canvas');
}

function contextOf(canvas: HTMLCanvasElement): WebGL2RenderingContext | null {
  try {
    return canvas.getContext('webgl2');
  } catch {
    return null;
  }
}

function paints(canvas: HTMLCanvasElement): boolean {
  try {
    return canvas.getContext('2d') !== null;
  } catch {
    return false;
  }
}
