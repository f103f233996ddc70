/**
 * Double tails (see double-tails.ts) at 8th and 12th roots of unity, in exact coordinates of ℤ[ζ], ζ = e^{2πi/M}.
 *
 * The recursion is carried out on vectors of ℤ[ζ]⊗ℝ; under each embedding σ it is the recursion for the letters σ(a), which are
 * roots of unity too. Let the size of a vector be the largest modulus of its embeddings. A start from zero at N ≥ W/2 + k is
 * wrong by at most one unit in every embedding. A truncated division of four coordinates errs by at most 4 units in size; with
 * three quotients and the division by the denominator of αβ one step adds at most ρ = 16. The product with αβ enlarges by at
 * most A = max |σ(αβ)| (1.31 for M = 8, 1.94 for M = 12), conjugation and signs not at all, so with the argument of
 * general-tails.ts the error is at most A^N (16N + 3) Σ_{j≤k} G^j/j!.
 */
import { gcdOf } from '../../number/integer.ts';
import type { EvaluationContext } from '../family.ts';
import { addMultiple, centralInverses, powersOf, pulse, type TailsSize, tailsSize } from './double-tails.ts';
import type { Core, Plan } from './plan.ts';
import { greatestCommonDivisor } from './roots.ts';

export type RingOrder = 8 | 12;

const DEGREE = 4;
const STEP = 16;

/** ζ^e in the basis 1, ζ, ζ², ζ³. */
function rootCoordinates(exponent: number, order: RingOrder): number[] {
  let x = [1, 0, 0, 0];
  for (let k = 0; k < ((exponent % order) + order) % order; k++) {
    const top = x[3] as number;
    // ζ⁴ = −1 for order 8, ζ² − 1 for order 12.
    x = [-top, x[0] as number, (x[1] as number) + (order === 12 ? top : 0), x[2] as number];
  }
  return x;
}

function ringProduct(a: readonly number[], b: readonly number[], order: RingOrder): number[] {
  const result = [0, 0, 0, 0];
  a.forEach((x, i) => {
    b.forEach((y, j) => {
      rootCoordinates(i + j, order).forEach((c, l) => {
        result[l] = (result[l] as number) + c * x * y;
      });
    });
  });
  return result;
}

/** Entries of the matrix of the product with αβ, over `norm`. */
interface RingMap {
  readonly rows: readonly (readonly number[])[];
  readonly norm: bigint;
}

/** 1/(1 − ζ^e) = −(1/m) Σ_{k<m} k ζ^{ek}, m the order of ζ^e. */
function tailMap(core: Core, order: RingOrder): RingMap {
  let factor = rootCoordinates(-(core.last - 1), order);
  let norm = 1;
  if (core.first !== 0) {
    const e = core.first - 1;
    norm = order / greatestCommonDivisor(order, e);
    const alpha = [0, 0, 0, 0];
    for (let k = 1; k < norm; k++) {
      rootCoordinates(e * k, order).forEach((c, l) => {
        alpha[l] = (alpha[l] as number) - k * c;
      });
    }
    factor = ringProduct(factor, alpha, order);
  }
  const common = Number(gcdOf([...factor.map(BigInt), BigInt(norm)]));
  const reduced = factor.map((c) => c / common);
  const columns = [0, 1, 2, 3].map((j) => ringProduct(reduced, rootCoordinates(j, order), order));
  return { rows: [0, 1, 2, 3].map((l) => columns.map((column) => column[l] as number)), norm: BigInt(norm / common) };
}

/** Sizes of a pass with a radius of at most 2^−bits. */
export function ringSize(plan: Plan, order: RingOrder, bits: number): TailsSize {
  let log2Growth = 0;
  for (const { first } of plan.cores) {
    if (first === 0) continue;
    for (let k = 1; k < order; k += 2) {
      if (greatestCommonDivisor(order, k) !== 1) continue;
      const distance = 2 * Math.abs(Math.sin((Math.PI * k * (first - 1)) / order));
      log2Growth = Math.max(log2Growth, -Math.log2(distance) + 1e-9);
    }
  }
  return tailsSize(bits, plan.length, STEP, log2Growth);
}

/** J₀ of every core: four coordinates in units of 2^−work. */
export function ringTails(plan: Plan, order: RingOrder, size: TailsSize, context: EvaluationContext): bigint[][] {
  const { cores, quotients } = plan;
  const empty = centralInverses(size.steps, size.work);
  const zero = (): bigint[] => [0n, 0n, 0n, 0n];
  const values = cores.map(zero);
  const shares = quotients.map(zero);
  const maps = cores.map((core) => tailMap(core, order));
  const conjugation = [0, 1, 2, 3].map((j) => rootCoordinates(-j, order));
  const singles = cores.map((core) =>
    core.word.length > 1 ? null : rootCoordinates(core.first - 1, order).map((c, l) => (l === 0 ? 1 : 0) - 2 * c),
  );
  for (let n = size.steps; n >= 1; n--) {
    const powers = powersOf(n, plan.maxExponent);
    quotients.forEach(({ core, exponent }, q) => {
      const divisor = powers[exponent] as bigint;
      const share = shares[q] as bigint[];
      if (core < 0) share[0] = (empty[n] as bigint) / divisor;
      else for (let l = 0; l < DEGREE; l++) share[l] = ((values[core] as bigint[])[l] as bigint) / divisor;
    });
    cores.forEach((core, c) => {
      const sum = [...(values[c] as bigint[])];
      const single = singles[c];
      for (const { quotient, factor, conjugate } of core.references) {
        const share = shares[quotient] as bigint[];
        if (single !== null && single !== undefined) addScaled(sum, single, share[0] as bigint);
        else if (conjugate) {
          for (let j = 0; j < DEGREE; j++) {
            const part = factor === 1 ? (share[j] as bigint) : BigInt(factor) * (share[j] as bigint);
            addScaled(sum, conjugation[j] as number[], part);
          }
        } else {
          for (let l = 0; l < DEGREE; l++) sum[l] = addMultiple(sum[l] as bigint, factor, share[l] as bigint);
        }
      }
      applyMap(maps[c] as RingMap, sum, values[c] as bigint[]);
    });
    pulse(n, size.steps, context);
  }
  return values;
}

function applyMap({ rows, norm }: RingMap, from: readonly bigint[], to: bigint[]): void {
  for (let l = 0; l < DEGREE; l++) {
    const row = rows[l] as readonly number[];
    let x = 0n;
    for (let j = 0; j < DEGREE; j++) x = addMultiple(x, row[j] as number, from[j] as bigint);
    to[l] = norm === 1n ? x : x / norm;
  }
}

function addScaled(sum: bigint[], coefficients: readonly number[], x: bigint): void {
  for (let l = 0; l < DEGREE; l++) sum[l] = addMultiple(sum[l] as bigint, coefficients[l] as number, x);
}
