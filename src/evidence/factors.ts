/** Small prime factors of coefficients: real relations have denominators made of small primes. */

/** Primes below 10^4 that divide n, with multiplicity, and what is left. */
export function smallFactors(n: bigint): {
  readonly primes: readonly (readonly [number, number])[];
  readonly rest: bigint;
} {
  let rest = n < 0n ? -n : n;
  const primes: [number, number][] = [];
  if (rest === 0n) return { primes, rest };
  for (let d = 2; d < 10_000; d += d === 2 ? 1 : 2) {
    const divisor = BigInt(d);
    if (divisor * divisor > rest) break;
    let count = 0;
    while (rest % divisor === 0n) {
      rest /= divisor;
      count += 1;
    }
    if (count > 0) primes.push([d, count]);
  }
  if (rest > 1n && rest < 100_000_000n) {
    primes.push([Number(rest), 1]);
    rest = 1n;
  }
  return { primes, rest };
}

/** `2^4·3^2`, with an unfactored rest in brackets; `1` for ±1. */
export function factoredText(n: bigint): string {
  const { primes, rest } = smallFactors(n);
  const parts = primes.map(([p, k]) => (k === 1 ? `${p}` : `${p}^${k}`));
  if (rest > 1n) parts.push(`(${rest})`);
  return parts.length === 0 ? '1' : parts.join('·');
}
