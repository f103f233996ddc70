import { describe, expect, it } from 'vitest';
import { startLattice } from '../../src/relation/lattice/index.ts';
import type { Kernels } from '../../src/relation/lattice/kernels/contract.ts';
import { newKernels } from '../../src/relation/lattice/kernels/load.ts';
import { leading, readLimbs, writeLimbs } from '../../src/relation/lattice/limbs.ts';
import { type Random, randomFrom } from '../support/random.ts';

/** The same memory contents under both kernels, then the same call on both: the first `compared` doubles must come out identical. */
function compare(
  length: number,
  compared: number,
  fill: (f: Float64Array, at: number) => void,
  call: (k: Kernels, at: number) => unknown,
): void {
  const results = (['auto', 'typescript'] as const).map((choice) => {
    const kernels = newKernels(choice);
    const at = kernels.allocate(length);
    return { kernels, at };
  });
  const values = new Float64Array(length);
  fill(values, 0);
  const outputs = results.map(({ kernels, at }) => {
    kernels.view().set(values, at);
    const returned = call(kernels, at);
    return { returned, memory: Array.from(kernels.view().slice(at, at + compared)) };
  });
  expect(results[0]?.kernels.kind).toBe('webassembly');
  expect(outputs[0]?.returned).toEqual(outputs[1]?.returned);
  const [a, b] = outputs.map((output) => output.memory) as [number[], number[]];
  expect(a.findIndex((x, i) => x !== b[i])).toBe(-1);
  expect(a.every(Number.isFinite)).toBe(true);
}

const lower = (random: Random, f: Float64Array, at: number, stride: number, n: number, spread: number): void => {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) f[at + i * stride + j] = (random.unit() - 0.5) * 2 ** (spread * random.unit());
    f[at + i * stride + i] = 0.5 + random.unit() * 2 ** (spread * 0.4 * random.unit());
  }
};

describe('WebAssembly and TypeScript kernels agree bit for bit', () => {
  const random = randomFrom('kernels');
  const sizes = [1, 2, 3, 4, 5, 7, 8, 13, 20, 27, 28, 33];

  it('multiply', () => {
    for (const n of sizes) {
      for (const band of [1, 5, n]) {
        const cols = random.integer(1, 40);
        const stride = Math.max(n, cols) + 3;
        const block = stride * n + 8;
        for (const accumulate of [0, 1]) {
          compare(
            3 * block,
            3 * block,
            (f) => {
              for (let i = 0; i < f.length; i++) f[i] = random.unit() - 0.5;
              // A is zero beyond its band, as the contract says.
              for (let i = 0; i < n; i++) for (let j = i + band; j < n; j++) f[i * stride + j] = 0;
            },
            (k, at) => k.multiply(at + block, stride, at, stride, at + 2 * block, stride, n, n, cols, band, accumulate),
          );
        }
      }
    }
  });

  it('multiplyLeft and multiplyRight touch their block only', () => {
    for (const w of sizes) {
      for (const cols of [1, 2, 3, 4, 5, 6, 7, 30]) {
        const stride = Math.max(w, cols) + 5;
        const block = stride * Math.max(w, cols) + 8;
        const fill = (f: Float64Array): void => {
          for (let i = 0; i < f.length; i++) f[i] = random.unit() - 0.5;
        };
        compare(2 * block, 2 * block, fill, (k, at) => k.multiplyLeft(at, stride, at + block, stride, w, cols));
        compare(2 * block, 2 * block, fill, (k, at) => k.multiplyRight(at, stride, at + block, stride, cols, w));
      }
    }
  });

  it('update', () => {
    for (const n of sizes) {
      const stride = n + (n & 1) + 2;
      compare(
        n * stride + stride,
        n * stride,
        (f) => {
          lower(random, f, 0, stride, n, 10);
          for (let i = 0; i < n; i++) f[n * stride + i] = i % 5 === 4 ? 0 : (random.unit() - 0.5) * 1e9;
        },
        (k, at) => k.update(at, stride, at + n * stride, n),
      );
    }
  });

  it('reduce, and sizeReduce', () => {
    for (const n of sizes) {
      const stride = n + (n & 1) + 2;
      const block = n * stride + 4;
      const small = 34 * 34;
      const fill = (f: Float64Array): void => {
        lower(random, f, 0, stride, n, 20);
        for (let i = 0; i < n; i++) f[block + i * stride + i] = 1;
      };
      const length = 2 * block + 2 * small;
      for (const start of [0, n >> 2]) {
        compare(length, length, fill, (k, at) =>
          k.reduce(at, stride, start, n - start, at + 2 * block, at + 2 * block + small, 34, 0.99),
        );
      }
      compare(length, length, fill, (k, at) => k.sizeReduce(at, stride, at + block, stride, 1, n, n, n));
    }
  });

  it('carry', () => {
    for (const rows of [1, 3, 4, 9]) {
      for (const length of [1, 2, 7, 30]) {
        const stride = 3 * (length + 2) + 1;
        compare(
          rows * stride,
          rows * stride,
          (f) => {
            for (let i = 0; i < f.length; i++) f[i] = Math.round((random.unit() - 0.5) * 2 ** 52);
          },
          (k, at) => k.carry(at, stride, rows, 3, length + 2, length),
        );
      }
    }
  });

  it('whole searches give the same answer', () => {
    for (const [n, bits] of [
      [6, 200],
      [30, 900],
      [62, 1200],
      [78, 1500],
    ] as const) {
      const integers = Array.from({ length: n }, () => [random.bits(bits)]);
      const results = (['auto', 'typescript'] as const).map((kernels) => {
        const run = startLattice({ integers, kernels });
        for (;;) {
          const result = run.step();
          if (result !== undefined) return { ...result, basis: result.basis(), ...run.progress };
        }
      });
      expect(results[0]).toEqual(results[1]);
    }
  }, 120_000);
});

describe('kernels compute what they are asked for', () => {
  const random = randomFrom('kernels exact');

  it('reduce leaves an LLL-reduced block, and U·L·Q is that block', () => {
    const n = 24;
    const stride = n + 2;
    const kernels = newKernels('auto');
    const l = kernels.allocate(n * stride);
    const u = kernels.allocate(34 * 34);
    const q = kernels.allocate(34 * 34);
    const v = kernels.allocate(n);
    const f = kernels.view();
    for (let i = 0; i < n; i++) {
      f[l + i * stride + i] = 1;
      f[v + i] = (random.unit() - 0.5) * 2 ** 20;
    }
    kernels.update(l, stride, v, n);
    const before = Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) => f[l + i * stride + j] as number),
    );
    expect(kernels.reduce(l, stride, 0, n, u, q, 34, 0.99)).toBeGreaterThan(0);
    const at = (base: number, step: number, i: number, j: number): number => f[base + i * step + j] as number;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        let sum = 0;
        for (let a = 0; a < n; a++) {
          let inner = 0;
          for (let b = 0; b < n; b++) inner += (before[a]?.[b] as number) * at(q, 34, b, j);
          sum += at(u, 34, i, a) * inner;
        }
        expect(Math.abs(sum - (j <= i ? at(l, stride, i, j) : 0))).toBeLessThan(1e-6);
      }
      if (i > 0) {
        const d = at(l, stride, i - 1, i - 1);
        const mu = at(l, stride, i, i - 1);
        expect(mu * mu + at(l, stride, i, i) ** 2).toBeGreaterThan(0.99 * d * d * (1 - 1e-9));
      }
      for (let j = 0; j < i; j++) expect(Math.abs(at(l, stride, i, j))).toBeLessThan(0.5000001 * at(l, stride, j, j));
    }
  });

  it('limbs round-trip, and their leading part is right', () => {
    const f = new Float64Array(100);
    const out: [number, number] = [0, 0];
    for (let k = 0; k < 400; k++) {
      const size = random.integer(0, 2000);
      const value = (random.bits(1) ? 1n : -1n) * random.bits(size);
      writeLimbs(value, f, 2, 95);
      expect(readLimbs(f, 2, 95)).toBe(value);
      for (let i = 2; i < 97; i++) expect(Math.abs(f[i] as number)).toBeLessThanOrEqual(2 ** 21);
      leading(f, 2, 95, out);
      const back = out[1] > 200 ? Number(value >> BigInt(out[1] - 200)) * 2 ** -200 : Number(value) * 2 ** -out[1];
      if (value !== 0n) expect(Math.abs(out[0] / back - 1)).toBeLessThan(1e-14);
    }
    expect(() => writeLimbs(1n << 500n, f, 0, 10)).toThrow(RangeError);
  });
});
