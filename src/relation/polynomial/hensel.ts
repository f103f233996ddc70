/** Hensel lifting of a factorisation modulo p to one modulo a power of p: von zur Gathen and Gerhard, Modern Computer Algebra, alg. 15.10. */
import { type Polynomial, product, trimmed } from './integer.ts';
import * as modular from './modular.ts';

/**
 * Monic factors of f modulo p (f square-free there, p ∤ lead f), lifted to monic factors modulo p^(2^k) > `bound`:
 * f ≡ lead(f)·Π factors.
 */
export function liftFactors(
  f: Polynomial,
  factors: readonly number[][],
  prime: number,
  bound: bigint,
): { factors: bigint[][]; modulus: bigint } {
  let modulus = BigInt(prime);
  let steps = 0;
  while (modulus <= bound) {
    modulus *= modulus;
    steps++;
  }
  const lead = inverseModulo(f.at(-1) as bigint, modulus);
  const image = reduce(
    f.map((c) => c * lead),
    modulus,
  );
  return { factors: liftTree(image, factors, prime, steps), modulus };
}

function liftTree(f: bigint[], factors: readonly number[][], prime: number, steps: number): bigint[][] {
  if (factors.length === 1) return [f];
  const half = factors.length >> 1;
  const multiplied = (list: readonly number[][]): number[] => list.reduce((g, h) => modular.multiply(g, h, prime), [1]);
  const [left, right] = [factors.slice(0, half), factors.slice(half)];
  const [g, h] = liftPair(f, multiplied(left), multiplied(right), prime, steps);
  return [...liftTree(g, left, prime, steps), ...liftTree(h, right, prime, steps)];
}

/** f ≡ g·h modulo p lifted through `steps` squarings of the modulus; f, g, h monic. */
function liftPair(f: bigint[], g0: number[], h0: number[], prime: number, steps: number): [bigint[], bigint[]] {
  const start = bezout(g0, h0, prime);
  let g = g0.map(BigInt);
  let h = h0.map(BigInt);
  let s = start.s.map(BigInt);
  let t = start.t.map(BigInt);
  let modulus = BigInt(prime);
  for (let k = 0; k < steps; k++) {
    modulus *= modulus;
    const e = reduce(difference(f, product(g, h)), modulus);
    const first = divideMonic(reduce(product(s, e), modulus), h, modulus);
    g = reduce(sum(sum(g, product(t, e)), product(first.quotient, g)), modulus);
    h = reduce(sum(h, first.remainder), modulus);
    const b = reduce(difference(sum(product(s, g), product(t, h)), [1n]), modulus);
    const second = divideMonic(reduce(product(s, b), modulus), h, modulus);
    s = reduce(difference(s, second.remainder), modulus);
    t = reduce(difference(difference(t, product(t, b)), product(second.quotient, g)), modulus);
  }
  return [g, h];
}

/** s·g + t·h = 1 modulo p, with deg s < deg h, deg t < deg g. */
function bezout(g: number[], h: number[], prime: number): { s: number[]; t: number[] } {
  let [r0, r1]: number[][] = [g, h] as [number[], number[]];
  let [s0, s1, t0, t1]: number[][] = [[1], [], [], [1]] as [number[], number[], number[], number[]];
  while ((r1 as number[]).length > 0) {
    const { quotient, remainder } = modular.divide(r0 as number[], r1 as number[], prime);
    [r0, r1] = [r1, remainder];
    [s0, s1] = [s1, modular.subtract(s0 as number[], modular.multiply(quotient, s1 as number[], prime), prime)];
    [t0, t1] = [t1, modular.subtract(t0 as number[], modular.multiply(quotient, t1 as number[], prime), prime)];
  }
  const unit = modular.inverse((r0 as number[])[0] as number, prime);
  const scale = (p: number[]): number[] => p.map((c) => (c * unit) % prime);
  return { s: scale(s0 as number[]), t: scale(t0 as number[]) };
}

function reduce(p: Polynomial, modulus: bigint): bigint[] {
  return trimmed(p.map((c) => ((c % modulus) + modulus) % modulus));
}

function sum(p: Polynomial, q: Polynomial): bigint[] {
  return Array.from({ length: Math.max(p.length, q.length) }, (_, k) => (p[k] ?? 0n) + (q[k] ?? 0n));
}

function difference(p: Polynomial, q: Polynomial): bigint[] {
  return Array.from({ length: Math.max(p.length, q.length) }, (_, k) => (p[k] ?? 0n) - (q[k] ?? 0n));
}

function divideMonic(p: Polynomial, q: Polynomial, modulus: bigint): { quotient: bigint[]; remainder: bigint[] } {
  const rest = [...p];
  const quotient = new Array<bigint>(Math.max(0, p.length - q.length + 1)).fill(0n);
  for (let k = p.length - q.length; k >= 0; k--) {
    const factor = (rest[k + q.length - 1] as bigint) % modulus;
    quotient[k] = factor;
    if (factor === 0n) continue;
    q.forEach((c, i) => {
      rest[k + i] = ((rest[k + i] as bigint) - factor * c) % modulus;
    });
  }
  return { quotient: reduce(quotient, modulus), remainder: reduce(rest.slice(0, q.length - 1), modulus) };
}

function inverseModulo(a: bigint, modulus: bigint): bigint {
  let [r0, r1, s0, s1] = [modulus, ((a % modulus) + modulus) % modulus, 0n, 1n];
  while (r1 !== 0n) {
    const q = r0 / r1;
    [r0, r1, s0, s1] = [r1, r0 - q * r1, s1, s0 - q * s1];
  }
  return ((s0 % modulus) + modulus) % modulus;
}
