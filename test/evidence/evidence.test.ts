import { describe, expect, it } from 'vitest';
import { vectorsLog10 } from '../../src/evidence/counting.ts';
import { factoredText } from '../../src/evidence/factors.ts';
import { decide, type Findings } from '../../src/evidence/verdict.ts';

/** Vectors by trial, up to sign, zero excluded. */
function byTrial(m: number, squared: number): number {
  const top = Math.floor(Math.sqrt(squared));
  const count = (left: number, budget: number): number => {
    if (left === 0) return 1;
    let total = 0;
    for (let x = -top; x <= top; x++) if (x * x <= budget) total += count(left - 1, budget - x * x);
    return total;
  };
  return (count(m, squared) - 1) / 2;
}

describe('counting integer vectors', () => {
  it('is exact for small norms (by trial of all vectors)', () => {
    for (const m of [1, 2, 3, 4]) {
      for (const squared of [1, 2, 5, 9, 20]) {
        expect(10 ** vectorsLog10(m, Math.log10(squared) / 2)).toBeCloseTo(byTrial(m, squared), 6);
      }
    }
  });

  it('passes smoothly from counting to the volume of the ball', () => {
    for (const m of [2, 5, 9, 20, 41]) {
      const exact = vectorsLog10(m, Math.log10(2000) / 2 - 1e-9);
      const volume = vectorsLog10(m, Math.log10(2001) / 2);
      expect(Math.abs(exact - volume)).toBeLessThan(0.05);
    }
  });
});

describe('verdict rules', () => {
  const sound: Findings = {
    surplusDigits: 40,
    heldOutOffered: 9,
    heldOutPredicted: 9,
    stable: true,
    firstWrongDigit: null,
    searchesLog10: 0,
  };

  it.each<[string, Partial<Findings>, string, string]>([
    ['a sound relation', {}, 'holds', 'holds'],
    ['too little surplus', { surplusDigits: 3 }, 'spurious', 'no-surplus'],
    ['surplus eaten up by the number of searches', { surplusDigits: 9, searchesLog10: 4 }, 'spurious', 'no-surplus'],
    ['little surplus', { surplusDigits: 8 }, 'tentative', 'thin'],
    ['nothing held out', { heldOutOffered: 0, heldOutPredicted: 0 }, 'tentative', 'thin'],
    ['a wrong tail', { firstWrongDigit: 55, heldOutPredicted: 4 }, 'holds', 'wrong-tail'],
    ['contradicted with little surplus', { firstWrongDigit: 52, surplusDigits: 7 }, 'spurious', 'contradicted'],
    ['another answer at another precision', { stable: false }, 'tentative', 'unstable'],
    ['no repetition possible', { stable: null }, 'holds', 'holds'],
  ])('%s', (_, change, verdict, key) => {
    const rule = decide({ ...sound, ...change });
    expect([rule.verdict, rule.key]).toEqual([verdict, key]);
  });
});

describe('factors of coefficients', () => {
  it('are written out', () => {
    expect(factoredText(5184n)).toBe('2^6·3^4');
    expect(factoredText(-28259n)).toBe('7·11·367');
    expect(factoredText(1n)).toBe('1');
    expect(factoredText(2n * (10n ** 40n + 121n))).toContain('(');
  });
});
