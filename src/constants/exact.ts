/** Bernoulli numbers and polynomials, characters and small factorisations, exact. */
import { gcd } from '../number/integer.ts';

export interface Fraction {
  readonly p: bigint;
  readonly q: bigint;
}

export function fraction(p: bigint, q: bigint): Fraction {
  const common = gcd(p, q);
  const divisor = q < 0n ? -common : common;
  return { p: p / divisor, q: q / divisor };
}

export function addFractions(a: Fraction, b: Fraction): Fraction {
  return fraction(a.p * b.q + b.p * a.q, a.q * b.q);
}

export function binomial(n: number, k: number): bigint {
  let result = 1n;
  for (let j = 1; j <= k; j++) result = (result * BigInt(n - k + j)) / BigInt(j);
  return result;
}

export function factorial(n: number): bigint {
  let result = 1n;
  for (let k = 2; k <= n; k++) result *= BigInt(k);
  return result;
}

/** B_0 … B_n with B_1 = −1/2, by Σ_{k≤m} C(m+1, k) B_k = 0. */
export function bernoulliNumbers(n: number): Fraction[] {
  const numbers: Fraction[] = [{ p: 1n, q: 1n }];
  for (let m = 1; m <= n; m++) {
    let sum: Fraction = { p: 0n, q: 1n };
    for (let k = 0; k < m; k++) {
      const b = numbers[k] as Fraction;
      if (b.p !== 0n) sum = addFractions(sum, { p: binomial(m + 1, k) * b.p, q: b.q });
    }
    numbers.push(fraction(-sum.p, sum.q * BigInt(m + 1)));
  }
  return numbers;
}

/** The coefficients of B_n(x), that of x^k at index k. */
export function bernoulliPolynomial(n: number): Fraction[] {
  const numbers = bernoulliNumbers(n);
  return Array.from({ length: n + 1 }, (_, k) => {
    const b = numbers[n - k] as Fraction;
    return fraction(binomial(n, k) * b.p, b.q);
  });
}

/** A polynomial with exact coefficients at a/f. */
export function polynomialAt(coefficients: readonly Fraction[], a: bigint, f: bigint): Fraction {
  let sum: Fraction = { p: 0n, q: 1n };
  for (let k = coefficients.length - 1; k >= 0; k--) {
    sum = addFractions(fraction(sum.p * a, sum.q * f), coefficients[k] as Fraction);
  }
  return sum;
}

/** The Kronecker symbol (d/n) for n ≥ 1. */
export function kronecker(d: number, n: number): -1 | 0 | 1 {
  let result = 1;
  let odd = n;
  while (odd % 2 === 0) {
    if (d % 2 === 0) return 0;
    const residue = ((d % 8) + 8) % 8;
    if (residue === 3 || residue === 5) result = -result;
    odd /= 2;
  }
  let a = ((d % odd) + odd) % odd;
  let b = odd;
  while (a !== 0) {
    while (a % 2 === 0) {
      a /= 2;
      if (b % 8 === 3 || b % 8 === 5) result = -result;
    }
    [a, b] = [b, a];
    if (a % 4 === 3 && b % 4 === 3) result = -result;
    a %= b;
  }
  return b === 1 ? (result as -1 | 1) : 0;
}

/** Whether d is the discriminant of a quadratic field. */
export function isFundamentalDiscriminant(d: number): boolean {
  if (!Number.isSafeInteger(d) || d === 0 || d === 1) return false;
  const residue = ((d % 16) + 16) % 16;
  if (residue % 4 === 1) return isSquareFree(Math.abs(d));
  return (residue === 8 || residue === 12) && isSquareFree(Math.abs(d / 4));
}

function isSquareFree(n: number): boolean {
  for (let p = 2; p * p <= n; p++) if (n % (p * p) === 0) return false;
  return true;
}

/** n = Π prime^exponent · rest with all primes ≤ limit divided out. */
export function factorUpTo(n: bigint, limit: number): { factors: { prime: bigint; exponent: number }[]; rest: bigint } {
  const factors: { prime: bigint; exponent: number }[] = [];
  let rest = n;
  for (let k = 2n; k <= BigInt(limit) && rest > 1n; k++) {
    let exponent = 0;
    while (rest % k === 0n) {
      rest /= k;
      exponent++;
    }
    if (exponent > 0) factors.push({ prime: k, exponent });
  }
  return { factors, rest };
}
