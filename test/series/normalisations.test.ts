import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fromRational } from '../../src/number/ball.ts';
import { commonNormalisations, compareNormalisations, rationalIn } from '../../src/series/normalisations.ts';
import { applySteps, type SeriesText } from '../../src/series/steps.ts';
import { referenceSeries } from './reference.ts';

const ONE: SeriesText = { variable: 'ep', low: 0, coefficients: ['1', '0', '0', '0', '0'] };

/** The series of a typed expression, as digits. */
function digitsOf(expression: string): SeriesText {
  const { result } = applySteps(ONE, [{ kind: 'multiply', factor: expression }]);
  return { variable: 'ep', low: result.low, coefficients: result.coefficients.map((c) => c.text ?? '0') };
}

describe('compareNormalisations', () => {
  it('puts exp(2*ep*euler_gamma) before the bare form for the sunrise: γ is gone at order 1', () => {
    const reports = compareNormalisations(referenceSeries('series-sunrise-bare'), commonNormalisations('ep', 2));
    const of = (factor: string): number => reports.find((r) => r.factor === factor)?.rationalOrders ?? -1;
    expect(of('1')).toBe(1);
    expect(of('exp(2*ep*euler_gamma)')).toBe(2);
    expect(reports[0]?.rationalOrders).toBeGreaterThanOrEqual(2);
    expect(reports[0]?.ratios[1]).toBe('13/2');
  });

  it('finds the factor that takes out γ and ζ(2)', () => {
    const given = digitsOf('Gamma(1+ep)^2*(1+3*ep)/(1-ep)');
    const best = compareNormalisations(given, commonNormalisations('ep', 2))[0];
    expect(best?.factor).toBe('1/Gamma(1+ep)^2');
    expect(best?.ratios).toEqual(['1', '4', '4', '4', '4']);
  });
});

describe('rationalIn', () => {
  it('finds the fraction that a ball was made of', () => {
    const fraction = fc.tuple(fc.integer({ min: -99999, max: 99999 }), fc.integer({ min: 1, max: 99999 }));
    fc.assert(
      fc.property(fraction, ([p, q]) => {
        const text = rationalIn(fromRational(BigInt(p), BigInt(q), 120));
        const [a = '', b = '1'] = (text ?? '').split('/');
        expect(BigInt(a) * BigInt(q)).toBe(BigInt(b) * BigInt(p));
      }),
      { numRuns: 500, seed: 7 },
    );
  });

  it('finds none in random digits', () => {
    fc.assert(
      fc.property(fc.noBias(fc.bigInt({ min: 1n << 119n, max: (1n << 120n) - 1n })), (mid) => {
        expect(rationalIn({ mid, rad: 1n, bits: 120 })).toBeNull();
      }),
      { numRuns: 1000, seed: 8 },
    );
  });
});
