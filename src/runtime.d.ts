/** The few globals that a browser worker and Node share; src/ compiles against these alone, so that touching the DOM is a type error. */

interface AbortSignal {
  readonly aborted: boolean;
  readonly reason: unknown;
  throwIfAborted(): void;
  addEventListener(type: 'abort', listener: () => void, options?: { once?: boolean }): void;
  removeEventListener(type: 'abort', listener: () => void): void;
}
declare class AbortController {
  readonly signal: AbortSignal;
  abort(reason?: unknown): void;
}
declare const performance: { now(): number };
declare function setTimeout(callback: () => void, milliseconds?: number): unknown;
declare function clearTimeout(handle: unknown): void;
declare function structuredClone<T>(value: T): T;
declare class TextEncoder {
  encode(text: string): Uint8Array;
}
declare function atob(base64: string): string;

declare namespace WebAssembly {
  class Module {
    constructor(bytes: Uint8Array);
  }
  class Memory {
    constructor(limits: { initial: number; maximum?: number });
    readonly buffer: ArrayBuffer;
    grow(pages: number): number;
  }
  class Instance {
    constructor(module: Module, imports?: Record<string, Record<string, unknown>>);
    readonly exports: Record<string, unknown>;
  }
  function validate(bytes: Uint8Array): boolean;
}
