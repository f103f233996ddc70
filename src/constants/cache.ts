import type { Value } from '../number/complex.ts';
import { roundTo } from './accurate.ts';

export interface CachedConstant {
  readonly text: string;
  /** The value's radius is at most 2^−bits. */
  readonly bits: number;
  readonly value: Value;
}

/** Values of constants by canonical text, each at the highest precision computed so far. A request for fewer bits is served from the longer value. */
export class ConstantCache {
  private readonly known = new Map<string, CachedConstant>();
  private readonly onExtend: ((entry: CachedConstant) => void) | undefined;

  /** `onExtend` hears of every new or longer value, for example to store it. */
  constructor(onExtend?: (entry: CachedConstant) => void) {
    this.onExtend = onExtend;
  }

  /** The value with a radius of at most 2^−bits, or undefined when none is known that well. */
  get(text: string, bits: number): Value | undefined {
    const entry = this.known.get(text);
    if (entry === undefined || entry.bits < bits) return undefined;
    return entry.bits >= bits + 2 ? roundTo(entry.value, bits + 2) : entry.value;
  }

  /** Keeps the value if it is longer than what is known. */
  put(text: string, bits: number, value: Value): void {
    if (this.load({ text, bits, value })) this.onExtend?.({ text, bits, value });
  }

  /** As `put`, for values that come from storage; tells nobody. Whether the entry was kept. */
  load(entry: CachedConstant): boolean {
    const before = this.known.get(entry.text);
    if (before !== undefined && before.bits >= entry.bits) return false;
    this.known.set(entry.text, entry);
    return true;
  }

  entries(): readonly CachedConstant[] {
    return [...this.known.values()];
  }
}
