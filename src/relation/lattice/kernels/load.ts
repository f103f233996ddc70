/** Chooses the kernels: WebAssembly SIMD where it runs, TypeScript elsewhere. */
import type { Kernels } from './contract.ts';
import { KERNELS_BASE64 } from './generated/kernels.ts';
import { typescriptKernels } from './typescript.ts';

export type KernelChoice = 'auto' | 'typescript';

const PAGE = 65536;
const SCRATCH_DOUBLES = 8192;

type Loops = Omit<Kernels, 'kind' | 'allocate' | 'view'> & { setScratch(at: number): void };

/** Undefined until first wanted; null where WebAssembly SIMD is missing. Compiled code only, no state of a search. */
let compiled: WebAssembly.Module | null | undefined;

/** Kernels with a memory of their own. Works synchronously, in Node and in a worker. */
export function newKernels(choice: KernelChoice): Kernels {
  if (choice === 'typescript') return typescriptKernels();
  if (compiled === undefined) compiled = compile();
  return compiled === null ? typescriptKernels() : webAssemblyKernels(compiled);
}

function compile(): WebAssembly.Module | null {
  if (typeof WebAssembly === 'undefined') return null;
  const bytes = Uint8Array.from(atob(KERNELS_BASE64), (character) => character.charCodeAt(0));
  // `validate` is false where the engine knows no SIMD; compiling is refused under a content security policy without 'wasm-unsafe-eval'.
  if (!WebAssembly.validate(bytes)) return null;
  try {
    return new WebAssembly.Module(bytes);
  } catch {
    return null;
  }
}

function webAssemblyKernels(module: WebAssembly.Module): Kernels {
  const memory = new WebAssembly.Memory({ initial: 4 });
  const loops = new WebAssembly.Instance(module, { env: { memory } }).exports as unknown as Loops;
  // The first doubles stay free: index 0 is never handed out.
  let used = 128;
  const allocate = (length: number): number => {
    const at = used;
    used += length + (length & 1);
    const missing = Math.ceil((used * 8) / PAGE) - memory.buffer.byteLength / PAGE;
    if (missing > 0) memory.grow(missing);
    return at;
  };
  loops.setScratch(allocate(SCRATCH_DOUBLES));
  let view = new Float64Array(memory.buffer);
  return {
    ...loops,
    kind: 'webassembly',
    allocate,
    view() {
      if (view.length === 0) view = new Float64Array(memory.buffer); // growing detached it
      return view;
    },
  };
}
