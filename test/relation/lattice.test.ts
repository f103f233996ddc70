import { describe, expect, it } from 'vitest';
import { type LatticeInput, type LatticeResult, startLattice } from '../../src/relation/lattice/index.ts';
import { type Random, randomFrom } from '../support/random.ts';

function finish(input: LatticeInput): LatticeResult & { refreshes: number; rollbacks: number } {
  const run = startLattice(input);
  for (;;) {
    const result = run.step();
    if (result !== undefined) {
      const { refreshes, rollbacks } = run.progress;
      return { ...result, basis: () => result.basis(), refreshes, rollbacks };
    }
  }
}

interface Planted {
  readonly integers: bigint[][];
  readonly relation: bigint[];
}

/** Uniform numbers of `bits` bits per column, and a vector with entries below 10^digits that vanishes on them within its last entry. */
function planted(random: Random, n: number, m: number, digits: number, bits: number): Planted {
  const limit = 10n ** BigInt(digits);
  for (;;) {
    const relation = Array.from({ length: n }, () => random.below(2n * limit - 1n) - limit + 1n);
    const last = relation[n - 1] as bigint;
    if (last === 0n) continue;
    const integers = Array.from({ length: n }, () => Array.from({ length: m }, () => random.bits(bits)));
    for (let j = 0; j < m; j++) {
      let sum = 0n;
      for (let i = 0; i < n - 1; i++) sum += (relation[i] as bigint) * ((integers[i] as bigint[])[j] as bigint);
      (integers[n - 1] as bigint[])[j] = -sum / last;
    }
    return { integers, relation };
  }
}

function normLog10(vector: readonly bigint[]): number {
  return Math.log10(Number(vector.reduce((sum, c) => sum + c * c, 0n))) / 2;
}

function same(found: readonly bigint[] | null, planted: readonly bigint[]): boolean {
  if (found === null) return false;
  let content = 0n;
  for (const c of planted)
    for (let [a, b] = [content, c < 0n ? -c : c]; ; [a, b] = [b, a % b]) {
      content = a;
      if (b === 0n) break;
    }
  return [1n, -1n].some((sign) => planted.every((c, i) => c / content === sign * (found[i] as bigint)));
}

/** Determinant modulo a prime, by elimination. */
function determinant(matrix: readonly (readonly bigint[])[], prime: bigint): bigint {
  const rows = matrix.map((row) => row.map((x) => ((x % prime) + prime) % prime));
  let result = 1n;
  for (let k = 0; k < rows.length; k++) {
    const pivot = rows.findIndex((row, i) => i >= k && row[k] !== 0n);
    if (pivot < 0) return 0n;
    if (pivot !== k) {
      [rows[k], rows[pivot]] = [rows[pivot] as bigint[], rows[k] as bigint[]];
      result = prime - result;
    }
    const head = rows[k] as bigint[];
    result = (result * (head[k] as bigint)) % prime;
    const inverse = power(head[k] as bigint, prime - 2n, prime);
    for (let i = k + 1; i < rows.length; i++) {
      const row = rows[i] as bigint[];
      const factor = ((row[k] as bigint) * inverse) % prime;
      if (factor !== 0n)
        for (let j = k; j < row.length; j++)
          row[j] = ((row[j] as bigint) + (prime - factor) * (head[j] as bigint)) % prime;
    }
  }
  return result;
}

function power(base: bigint, exponent: bigint, prime: bigint): bigint {
  let result = 1n;
  for (let [b, e] = [base, exponent]; e > 0n; e >>= 1n, b = (b * b) % prime) if (e & 1n) result = (result * b) % prime;
  return result;
}

/** 2^127 − 1, a prime (Lucas 1876). */
const PRIME = (1n << 127n) - 1n;

function expectUnimodular(basis: bigint[][], n: number): void {
  expect(basis.length).toBe(n);
  const det = determinant(basis, PRIME);
  expect(det === 1n || det === PRIME - 1n).toBe(true);
}

function residualsOf(basis: bigint[][], integers: readonly (readonly bigint[])[], j: number): bigint[] {
  return basis.map((b) => b.reduce((sum, c, i) => sum + c * ((integers[i] as bigint[])[j] as bigint), 0n));
}

const bitsOf = (digits: number): number => Math.ceil(digits * Math.log2(10));

describe('planted relations', () => {
  const random = randomFrom('lattice planted');
  const cases = [2, 3, 4, 5, 7, 10, 14, 20, 27, 28, 29, 30, 40, 55, 59, 60, 75, 76, 90, 120];
  it.each(cases)('of %i numbers are found, with an exact unimodular basis', (n) => {
    const digits = 3 + (n % 5);
    const bits = bitsOf(Math.ceil(n * digits * 1.15) + 8 + Math.ceil(n * n * Math.log10(1.022)));
    const { integers, relation } = planted(random, n, 1, digits, bits);
    const result = finish({ integers });
    expect(result.kind).toBe('candidate');
    expect(same(result.candidate, relation)).toBe(true);
    const basis = result.basis();
    expectUnimodular(basis, n);
    expect(basis.some((row) => same(result.candidate, row))).toBe(true);
    const residuals = residualsOf(basis, integers, 0).map((y) => (y < 0n ? -y : y));
    const smallest = residuals.sort((a, b) => (a < b ? -1 : 1))[0] as bigint;
    expect(Math.abs(Math.log2(Number(smallest)) - result.residualLog2) < 1e-6 || smallest === 0n).toBe(true);
    // The norm of the relation is an upper bound for any norm bound.
    const norm = Math.log10(Number(relation.reduce((sum, c) => sum + c * c, 0n))) / 2;
    expect(result.floatNormBoundLog10).toBeLessThan(norm + 1e-6);
  });

  it.each([2, 3])('of %i columns at once', (m) => {
    for (const n of [4, 6, 12, 31, 45]) {
      const { integers, relation } = planted(
        random,
        n,
        m,
        6,
        bitsOf(Math.ceil((n * 7) / m) + 12 + Math.ceil((n * n) / 60)),
      );
      const result = finish({ integers });
      expect(same(result.candidate, relation), `n = ${n}, m = ${m}`).toBe(true);
      expectUnimodular(result.basis(), n);
    }
  });

  it('with columns of very different size', () => {
    const { integers, relation } = planted(random, 8, 2, 5, 300);
    const scaled = integers.map((row) => [row[0] as bigint, (row[1] as bigint) >> 180n]);
    expect(same(finish({ integers: scaled, errors: scaled.map(() => [1n, 2n]) }).candidate, relation)).toBe(true);
  });
});

describe('few digits', () => {
  it('relations are found from 1.03 times the information limit on', () => {
    const random = randomFrom('lattice few digits');
    for (const [n, height] of [
      [12, 6],
      [30, 4],
      [60, 3],
      [100, 2],
      [100, 5],
    ] as const) {
      const bits = bitsOf(n * (height + 1.2));
      const { integers, relation } = planted(random, n, 1, height, bits);
      const norm = normLog10(relation);
      const offered = 1.03 * n * norm;
      expect(bits).toBeGreaterThan(bitsOf(offered));
      const scaled = integers.map((row) => row.map((x) => x >> BigInt(bits - bitsOf(offered))));
      const result = finish({ integers: scaled, accept: (c) => n * normLog10(c) < offered });
      const found =
        same(result.candidate, relation) || (result.candidate !== null && normLog10(result.candidate) <= norm);
      expect(found, `n = ${n}, ${height} digits`).toBe(true);
      expectUnimodular(result.basis(), n);
    }
  });

  it('the bound at the end is within 1.017^n of what any basis could give', () => {
    const random = randomFrom('lattice strong');
    const n = 90;
    const bits = 900;
    const integers = Array.from({ length: n }, () => [random.bits(bits)]);
    const result = finish({ integers, accept: () => false });
    expect(result.kind).toBe('exhausted');
    expectUnimodular(result.basis(), n);
    // Errors of n units cost the bound a factor √(1 + n/4^weightBits).
    const best = (result.fedBits * Math.log10(2)) / n;
    expect(result.floatNormBoundLog10).toBeGreaterThan(best - n * Math.log10(1.017));
    expect(result.floatNormBoundLog10).toBeLessThan(best + 0.1);
  });
});

describe('random numbers', () => {
  it('have no relation below the information limit, and the bound says so', () => {
    const random = randomFrom('lattice random');
    for (const [n, digits] of [
      [3, 60],
      [8, 100],
      [20, 150],
      [30, 200],
      [50, 300],
      [80, 400],
    ] as const) {
      const bits = bitsOf(digits);
      const integers = Array.from({ length: n }, () => [random.bits(bits)]);
      const result = finish({ integers });
      const limit = digits / n;
      if (result.candidate !== null) {
        const norm = Math.log10(Number(result.candidate.reduce((sum, c) => sum + c * c, 0n))) / 2;
        expect(norm, `n = ${n}`).toBeGreaterThan(limit * 0.9);
      }
      expect(result.fedBits).toBe(bits - result.weightBits);
      // A reduced basis has its least diagonal entry within 1.03^n of the root of the determinant.
      expect(result.floatNormBoundLog10).toBeGreaterThan(
        ((bits - result.weightBits) * Math.log10(2)) / n - 0.5 - n * Math.log10(1.03),
      );
      expect(result.floatNormBoundLog10).toBeLessThan(limit + 1);
      expectUnimodular(result.basis(), n);
    }
  });

  it('stop at the norm asked for', () => {
    const random = randomFrom('lattice bounded');
    const integers = Array.from({ length: 25 }, () => [random.bits(2000)]);
    const result = finish({ integers, maxNormLog10: 5 });
    expect(result.kind).toBe('bounded');
    expect(result.floatNormBoundLog10).toBeGreaterThan(5);
    expect(result.fedBits).toBeLessThan(700);
    expectUnimodular(result.basis(), 25);
    // With few digits the bound is only reached by the block reduction at the end, or not at all.
    const few = Array.from({ length: 60 }, () => [random.bits(700)]);
    const best = (690 * Math.log10(2)) / 60;
    const kinds = [best - 0.75, best - 0.4, best + 0.2].map(
      (maxNormLog10) => finish({ integers: few, maxNormLog10, accept: () => false }).kind,
    );
    expect(kinds).toEqual(['bounded', 'bounded', 'exhausted']);
  });
});

describe('numbers of very different size', () => {
  const random = randomFrom('lattice sizes');
  it.each([60, 200])('10^±%i: planted relations are found', (decades) => {
    const shift = BigInt(bitsOf(decades));
    for (const n of [3, 5, 9, 16]) {
      // The small numbers carry a relation among themselves; the large one takes no part.
      const { integers, relation } = planted(random, n, 1, 4, bitsOf(5 * n + 15));
      const large = [random.bits(bitsOf(5 * n + 15)) << shift];
      const result = finish({ integers: [large, ...integers] });
      expect(same(result.candidate, [0n, ...relation]), `n = ${n}`).toBe(true);
      expectUnimodular(result.basis(), n + 1);
      // The large ones carry it, and a small one takes no part.
      const scaled = integers.map((row) => [(row[0] as bigint) << shift]);
      const result2 = finish({
        integers: [...scaled, [random.bits(60)]],
        errors: [...scaled.map(() => [1n << shift]), [1n]],
      });
      expect(same(result2.candidate, [...relation, 0n]), `n = ${n}, large`).toBe(true);
    }
  });

  it('a relation across the gap is found when its coefficients are large enough', () => {
    for (const decades of [20, 45, 80]) {
      const bits = bitsOf(4 * decades + 60);
      const relation = [
        1n,
        random.below(10n ** BigInt(decades)),
        random.below(10n ** BigInt(decades)),
        10n ** BigInt(decades) + 7n,
      ];
      const small = [0, 1, 2].map(() => random.bits(bits));
      const large = -small.reduce((sum, x, i) => sum + x * (relation[i + 1] as bigint), 0n);
      const result = finish({ integers: [[large], ...small.map((x) => [x])] });
      expect(same(result.candidate, relation), `10^${decades}`).toBe(true);
      expectUnimodular(result.basis(), 4);
    }
  });

  it('every number on its own scale, and none in relation: ends, with a unimodular basis', () => {
    const integers = Array.from({ length: 12 }, (_, i) => [random.bits(40 + 60 * i)]);
    const result = finish({ integers });
    expectUnimodular(result.basis(), 12);
  });

  it('two huge groups apart', () => {
    const a = planted(random, 6, 1, 5, 400);
    const integers = [
      ...a.integers.map((row) => [(row[0] as bigint) << 500n]),
      ...Array.from({ length: 6 }, () => [random.bits(300)]),
    ];
    const errors = integers.map((_, i) => [i < 6 ? 1n << 500n : 1n]);
    const result = finish({ integers, errors });
    expect(same(result.candidate, [...a.relation, ...new Array<bigint>(6).fill(0n)])).toBe(true);
  });
});

describe('a relation that only holds on the leading digits', () => {
  it('does not stop the search, and the rest of the digits strengthens the bound', () => {
    const random = randomFrom('lattice tail');
    for (const [n, right, digits] of [
      [2, 50, 1000],
      [3, 60, 1000],
      [4, 50, 3000],
      [12, 120, 900],
    ] as const) {
      const bits = bitsOf(digits);
      const { integers } = planted(random, n, 1, 3, bits);
      const last = integers[n - 1] as bigint[];
      last[0] = (last[0] as bigint) + random.bits(bits - bitsOf(right));
      const result = finish({ integers, accept: () => false });
      expect(result.kind, `n = ${n}`).toBe('exhausted');
      expectUnimodular(result.basis(), n);
      expect(result.floatNormBoundLog10).toBeGreaterThan(digits / n - 2 - n * Math.log10(1.03));
    }
  });
});

describe('several relations on leading digits, of numbers on several scales', () => {
  it('never fails, and the basis stays a basis', () => {
    const random = randomFrom('lattice hostile');
    for (let round = 0; round < 40; round++) {
      const n = random.integer(4, 18);
      const bits = random.integer(100, 1200);
      const scales = [0, random.integer(0, bits - 30), random.integer(0, bits - 30)];
      const integers = Array.from({ length: n }, () => [
        random.bits(bits) >> BigInt(scales[random.integer(0, 2)] as number),
      ]);
      const dependent = random.integer(0, 3);
      for (let k = 1; k <= dependent && k < n - 1; k++) {
        let sum = random.bits(random.integer(8, bits));
        for (let i = 0; i < n - dependent; i++)
          sum += (random.below(200n) - 100n) * ((integers[i] as bigint[])[0] as bigint);
        integers[n - k] = [sum];
      }
      const result = finish({ integers, accept: () => round % 2 === 0 });
      expect(result.kind, `round ${round}`).not.toBe('unstable');
      expectUnimodular(result.basis(), n);
    }
  });
});

describe('degenerate input ends at once', () => {
  it('zero, equal and opposite numbers', () => {
    const random = randomFrom('lattice degenerate');
    const x = random.bits(400);
    const y = random.bits(400);
    expect(finish({ integers: [[x], [0n], [y]] }).candidate).toEqual([0n, 1n, 0n]);
    expect(same(finish({ integers: [[x], [y], [x]] }).candidate, [1n, 0n, -1n])).toBe(true);
    expect(same(finish({ integers: [[x], [y], [-y]] }).candidate, [0n, 1n, 1n])).toBe(true);
    expect(same(finish({ integers: [[x], [y], [3n * y]] }).candidate, [0n, 3n, -1n])).toBe(true);
    expect(finish({ integers: [[0n], [0n]] }).kind).toBe('candidate');
    expect(finish({ integers: [[x]] }).kind).toBe('exhausted');
    expect(finish({ integers: [[x, y]] }).kind).toBe('exhausted');
  });

  it('a refused candidate does not end the search', () => {
    const random = randomFrom('lattice refused');
    const x = random.bits(400);
    const y = random.bits(400);
    const result = finish({ integers: [[x], [y], [3n * y]], accept: () => false });
    expect(result.kind).toBe('exhausted');
    expectUnimodular(result.basis(), 3);
  });

  it('ragged or empty rows are refused', () => {
    expect(() => startLattice({ integers: [] })).toThrow(RangeError);
    expect(() => startLattice({ integers: [[1n], [1n, 2n]] })).toThrow(RangeError);
  });
});
