/**
 * Seeded random integers of cryptographic quality: ChaCha20 (RFC 8439) in counter mode. Linear congruential generators will not do
 * here: consecutive outputs satisfy short integer relations, which a relation engine finds.
 */
import { createHash } from 'node:crypto';

export interface Random {
  readonly seed: string;
  /** Uniform in 0 … 2^bits − 1. */
  bits(bits: number): bigint;
  /** Uniform in 0 … limit − 1. */
  below(limit: bigint): bigint;
  /** Uniform integer in low … high. */
  integer(low: number, high: number): number;
  /** Uniform in [0, 1) with 53 bits. */
  unit(): number;
}

/** The stream of the key SHA-256(seed). */
export function randomFrom(seed: string): Random {
  const key = createHash('sha256').update(seed).digest();
  const state = new Uint32Array(16);
  state.set([0x61707865, 0x3320646e, 0x79622d32, 0x6b206574]);
  for (let i = 0; i < 8; i++) state[4 + i] = key.readUInt32LE(4 * i);
  let block = chacha20Block(state);
  let at = 0;
  const word = (): number => {
    if (at === 16) {
      state[12] = (state[12] as number) + 1;
      if (state[12] === 0) state[13] = (state[13] as number) + 1;
      block = chacha20Block(state);
      at = 0;
    }
    return block[at++] as number;
  };
  const bits = (count: number): bigint => {
    let value = 0n;
    for (let have = 0; have < count; have += 32) value = (value << 32n) | BigInt(word());
    return value & ((1n << BigInt(count)) - 1n);
  };
  const below = (limit: bigint): bigint => {
    const size = limit.toString(2).length;
    for (;;) {
      const value = bits(size);
      if (value < limit) return value;
    }
  };
  return {
    seed,
    bits,
    below,
    integer: (low, high) => low + Number(below(BigInt(high - low + 1))),
    unit: () => Number(bits(53)) / 2 ** 53,
  };
}

/** One block of the ChaCha20 function on 16 words. */
export function chacha20Block(input: Uint32Array): Uint32Array {
  const x = new Uint32Array(input);
  const quarter = (a: number, b: number, c: number, d: number): void => {
    const mix = (to: number, from: number, into: number, turn: number): void => {
      x[to] = (x[to] as number) + (x[from] as number);
      const v = (x[into] as number) ^ (x[to] as number);
      x[into] = (v << turn) | (v >>> (32 - turn));
    };
    mix(a, b, d, 16);
    mix(c, d, b, 12);
    mix(a, b, d, 8);
    mix(c, d, b, 7);
  };
  for (let round = 0; round < 10; round++) {
    for (let k = 0; k < 4; k++) quarter(k, 4 + k, 8 + k, 12 + k);
    for (let k = 0; k < 4; k++) quarter(k, 4 + ((k + 1) & 3), 8 + ((k + 2) & 3), 12 + ((k + 3) & 3));
  }
  for (let i = 0; i < 16; i++) x[i] = (x[i] as number) + (input[i] as number);
  return x;
}
