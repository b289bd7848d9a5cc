import type { RasterKernel } from './kernel.ts';
import { javaScriptKernel } from './kernel.ts';
import { kernelText } from './kernel-text.generated.ts';

const pageBytes = 65_536;
/** The letter that stands for byte 0 in the text of the kernel. */
const firstLetter = 0x100;

interface KernelExports {
  readonly prepare: () => void;
  readonly strip: (first: number, count: number) => void;
}

function kernelBytes(): Uint8Array<ArrayBuffer> {
  return Uint8Array.from(kernelText, (letter) => letter.charCodeAt(0) - firstLetter);
}

/** The kernel in WebAssembly with SIMD; null where the engine has no such thing or its policy forbids it. */
export function webAssemblyKernel(): RasterKernel | null {
  if (typeof WebAssembly === 'undefined') return null;
  const bytes = kernelBytes();
  if (!WebAssembly.validate(bytes)) return null;
  const memory = new WebAssembly.Memory({ initial: 1 });
  let instance: WebAssembly.Instance;
  try {
    instance = new WebAssembly.Instance(new WebAssembly.Module(bytes), { env: { memory } });
  } catch {
    return null;
  }
  const { prepare, strip } = instance.exports as unknown as KernelExports;
  return {
    name: 'WebAssembly',
    reserve(size) {
      const missing = size - memory.buffer.byteLength;
      if (missing > 0) memory.grow(Math.ceil(missing / pageBytes));
      return memory.buffer;
    },
    prepare,
    strip,
  };
}

/** The fastest kernel that works here. */
export function bestKernel(): RasterKernel {
  return webAssemblyKernel() ?? javaScriptKernel();
}
