import { describe, expect, it } from 'vitest';
import { chacha20Block, randomFrom } from './random.ts';

describe('the seeded generator of the tests', () => {
  it('is the ChaCha20 block function (RFC 8439, section 2.3.2; vector from memory)', () => {
    const state = new Uint32Array(16);
    state.set([0x61707865, 0x3320646e, 0x79622d32, 0x6b206574]);
    for (let k = 0; k < 8; k++) state[4 + k] = (4 * k) | ((4 * k + 1) << 8) | ((4 * k + 2) << 16) | ((4 * k + 3) << 24);
    state.set([1, 0x09000000, 0x4a000000, 0], 12);
    expect([...chacha20Block(state)].slice(0, 4)).toEqual([0xe4e7f110, 0x15593bd1, 0x1fdd0f50, 0xc47120a3]);
  });

  it('repeats itself for the same seed only, and stays in range', () => {
    expect(randomFrom('a').bits(500)).toBe(randomFrom('a').bits(500));
    expect(randomFrom('a').bits(500)).not.toBe(randomFrom('b').bits(500));
    const random = randomFrom('range');
    const seen = new Set<number>();
    for (let k = 0; k < 500; k++) seen.add(random.integer(-3, 3));
    expect([...seen].sort((x, y) => x - y)).toEqual([-3, -2, -1, 0, 1, 2, 3]);
    for (let k = 0; k < 50; k++) expect(random.bits(37) < 1n << 37n).toBe(true);
  });
});
