/**
 * Polynomials over 𝔽_p for small odd primes p < 2^15 (sums of a few thousand products stay exact in doubles), lowest degree first.
 * Factorisation by distinct and equal degrees: Cantor and Zassenhaus, Math. Comp. 36 (1981) 587.
 */
export type Residues = readonly number[];

export function reduceModulo(p: readonly bigint[], prime: number): number[] {
  const modulus = BigInt(prime);
  return trim(p.map((c) => Number(((c % modulus) + modulus) % modulus)));
}

function trim(f: number[]): number[] {
  while (f.length > 0 && f.at(-1) === 0) f.pop();
  return f;
}

export function inverse(a: number, prime: number): number {
  let [r0, r1, s0, s1] = [prime, ((a % prime) + prime) % prime, 0, 1];
  while (r1 !== 0) {
    const q = Math.floor(r0 / r1);
    [r0, r1, s0, s1] = [r1, r0 - q * r1, s1, s0 - q * s1];
  }
  return ((s0 % prime) + prime) % prime;
}

export function monic(f: Residues, prime: number): number[] {
  if (f.length === 0) return [];
  const factor = inverse(f.at(-1) as number, prime);
  return f.map((c) => (c * factor) % prime);
}

export function subtract(f: Residues, g: Residues, prime: number): number[] {
  const length = Math.max(f.length, g.length);
  return trim(Array.from({ length }, (_, k) => ((f[k] ?? 0) - (g[k] ?? 0) + prime) % prime));
}

export function multiply(f: Residues, g: Residues, prime: number): number[] {
  if (f.length === 0 || g.length === 0) return [];
  const result = new Float64Array(f.length + g.length - 1);
  for (let i = 0; i < f.length; i++) {
    const factor = f[i] as number;
    if (factor === 0) continue;
    for (let j = 0; j < g.length; j++) result[i + j] = (result[i + j] as number) + factor * (g[j] as number);
  }
  return trim(Array.from(result, (c) => c % prime));
}

/** Quotient and remainder by g ≠ 0. */
export function divide(f: Residues, g: Residues, prime: number): { quotient: number[]; remainder: number[] } {
  // Products of residues below 2^15 stay within int32.
  const rest = Int32Array.from(f);
  const divisor = Int32Array.from(g);
  const quotient = new Array<number>(Math.max(0, f.length - g.length + 1)).fill(0);
  const lead = inverse(g.at(-1) as number, prime);
  for (let k = f.length - g.length; k >= 0; k--) {
    const factor = ((rest[k + g.length - 1] as number) * lead) % prime;
    quotient[k] = factor;
    if (factor === 0) continue;
    const minus = prime - factor;
    for (let i = 0; i < divisor.length; i++) {
      rest[k + i] = ((rest[k + i] as number) + minus * (divisor[i] as number)) % prime;
    }
  }
  return { quotient: trim(quotient), remainder: trim(Array.from(rest.subarray(0, Math.min(f.length, g.length - 1)))) };
}

export function commonDivisor(f: Residues, g: Residues, prime: number): number[] {
  let [a, b] = [[...f], [...g]];
  while (b.length > 0) [a, b] = [b, divide(a, b, prime).remainder];
  return monic(a, prime);
}

export function derivative(f: Residues, prime: number): number[] {
  return trim(f.slice(1).map((c, k) => (c * (k + 1)) % prime));
}

/** base^exponent modulo f. */
export function powerModulo(base: Residues, exponent: bigint, f: Residues, prime: number): number[] {
  let result: number[] = [1];
  let square = divide(base, f, prime).remainder;
  for (let e = exponent; e > 0n; e >>= 1n) {
    if (e & 1n) result = divide(multiply(result, square, prime), f, prime).remainder;
    if (e > 1n) square = divide(multiply(square, square, prime), f, prime).remainder;
  }
  return result;
}

/** The images x^(i·p) modulo f of 1, x, x², …: the p-th power of any h is then Σ hᵢ·x^(i·p), as (g + h)^p = g^p + h^p. */
function frobeniusImages(f: Residues, prime: number): number[][] {
  const step = powerModulo([0, 1], BigInt(prime), f, prime);
  const images: number[][] = [[1]];
  while (images.length < f.length - 1)
    images.push(divide(multiply(images.at(-1) as number[], step, prime), f, prime).remainder);
  return images;
}

function frobenius(h: Residues, images: readonly number[][], prime: number): number[] {
  const result = new Float64Array(images.length);
  h.forEach((factor, i) => {
    if (factor === 0) return;
    const image = images[i] as number[];
    for (let k = 0; k < image.length; k++) result[k] = (result[k] as number) + factor * (image[k] as number);
  });
  return trim(Array.from(result, (c) => c % prime));
}

/** Products of all irreducible factors of equal degree, for square-free monic f. */
export function distinctDegrees(f: Residues, prime: number): { degree: number; product: number[] }[] {
  const parts: { degree: number; product: number[] }[] = [];
  const images = frobeniusImages(f, prime);
  let rest = [...f];
  let power: number[] = [0, 1];
  for (let d = 1; rest.length - 1 >= 2 * d; d++) {
    power = frobenius(power, images, prime);
    const product = commonDivisor(rest, subtract(power, [0, 1], prime), prime);
    if (product.length <= 1) continue;
    parts.push({ degree: d, product });
    rest = divide(rest, product, prime).quotient;
  }
  if (rest.length > 1) parts.push({ degree: rest.length - 1, product: rest });
  return parts;
}

/**
 * The irreducible factors of a product of irreducibles of one degree, p odd. Splits by gcd(h^((p^d−1)/2) − 1, f) for h = x + a, x² + a·x + 1, …
 * in turn, so that the result does not depend on chance.
 */
export function equalDegree(f: Residues, degree: number, prime: number): number[][] {
  const pending: number[][] = [monic(f, prime)];
  const done: number[][] = [];
  const exponent = (BigInt(prime) ** BigInt(degree) - 1n) / 2n;
  for (let trial = 1; pending.length > 0; trial++) {
    const g = pending.pop() as number[];
    if (g.length - 1 === degree) {
      done.push(g);
      continue;
    }
    const probe = probePolynomial(trial, g.length - 2, prime);
    const split = commonDivisor(g, subtract(powerModulo(probe, exponent, g, prime), [1], prime), prime);
    if (split.length <= 1 || split.length === g.length) pending.push(g);
    else pending.push(split, divide(g, split, prime).quotient);
  }
  return done;
}

/** A fixed sequence of polynomials that differ in all coefficients (multiplicative scrambling of the trial number). */
function probePolynomial(trial: number, degreeLimit: number, prime: number): number[] {
  const length = Math.max(2, Math.min(degreeLimit + 1, 2 + (trial % 7)));
  let state = trial;
  return trim(
    Array.from({ length }, () => {
      state = (Math.imul(state, 0x9e3779b1) ^ (state >>> 15)) >>> 0;
      return state % prime;
    }),
  );
}
