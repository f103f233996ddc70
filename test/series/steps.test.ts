import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Ball, overlaps } from '../../src/number/ball.ts';
import { applySteps, readSeries, type SeriesText, type Step } from '../../src/series/steps.ts';
import { referenceSeries } from './reference.ts';

const normalised = referenceSeries('series-sunrise-normalised');
const bare = referenceSeries('series-sunrise-bare');

function expectSame(from: SeriesText, steps: readonly Step[], to: SeriesText): void {
  const { result } = applySteps(from, steps);
  const wanted = readSeries(to);
  expect(result.coefficients).toHaveLength(wanted.coefficients.length);
  result.coefficients.forEach((c, k) => {
    expect(overlaps(c.value as Ball, wanted.coefficients[k] as Ball), `order ${k}`).toBe(true);
    expect(c.digits).toBeGreaterThanOrEqual(296);
    const target = to.coefficients[k] as string;
    // all digits printed but the last, which may be rounded differently, are those of the other series
    const text = c.text as string;
    expect(target.startsWith(text.slice(0, -3))).toBe(true);
  });
}

describe('the two sunrise series (PARI/GP, problems-open.json)', () => {
  it('turn into each other by exp(2*ep*euler_gamma)', () => {
    expectSame(bare, [{ kind: 'multiply', factor: 'exp(2*ep*euler_gamma)' }], normalised);
    expectSame(normalised, [{ kind: 'divide', factor: 'exp(2*ep*euler_gamma)' }], bare);
  });

  it('are what their typed closed form says', () => {
    const closed = 'Gamma(1-ep)^3*Gamma(1+2*ep)/(Gamma(1-3*ep)*(1-2*ep)*(1-3*ep)*(2-3*ep))';
    const one: SeriesText = { variable: 'ep', low: 0, coefficients: ['1', '0', '0', '0', '0', '0', '0'] };
    const { result } = applySteps(bare, [{ kind: 'subtract', expression: closed }]);
    for (const c of result.coefficients) {
      expect(c.text).toBeNull();
      expect(c.places).toBeGreaterThan(295);
    }
    const wanted = readSeries(bare);
    applySteps(one, [{ kind: 'multiply', factor: closed }]).result.coefficients.forEach((c, k) => {
      expect(overlaps(c.value as Ball, wanted.coefficients[k] as Ball)).toBe(true);
    });
  });

  it('report the cancellation and leave the original alone', () => {
    const before = JSON.stringify(bare);
    const steps: Step[] = [
      { kind: 'subtract', expression: '1/2 + 2.6727843350984671393934879*ep' },
      { kind: 'add', expression: 'ep', off: true },
    ];
    const { result, after } = applySteps(bare, steps);
    expect(result.coefficients[1]?.lost).toBeGreaterThan(20);
    expect(result.coefficients[2]?.lost).toBe(0);
    expect(after[1]).toBeNull();
    expect(JSON.stringify(bare)).toBe(before);
    expect(applySteps({ ...bare, trustedDigits: [] }, []).result.coefficients[3]?.text).toBe(bare.coefficients[3]);
  });
});

describe('steps', () => {
  const factors = [
    'exp(2*ep*euler_gamma)',
    'Gamma(1+ep)^3',
    'Gamma(1-ep)^2*Gamma(1+ep)/Gamma(1-2*ep)',
    '(1-2*ep)*(3-4*ep)',
    '2^(4*ep)',
    'pi^ep',
    'ep^2*Gamma(-1+2*ep)',
    'Gamma(1/2+ep)',
    'exp(i*pi*ep)',
  ];

  it('multiplying and dividing by the same factor gives the digits back', () => {
    const digits = fc.stringMatching(/^[1-9][0-9]{39}$/);
    const series = fc.record({
      low: fc.integer({ min: -4, max: 1 }),
      body: fc.array(fc.tuple(fc.boolean(), digits, fc.integer({ min: -3, max: 5 })), { minLength: 1, maxLength: 7 }),
    });
    fc.assert(
      fc.property(series, fc.constantFrom(...factors), ({ low, body }, factor) => {
        const coefficients = body.map(([minus, d, e]) => `${minus ? '-' : ''}${d[0]}.${d.slice(1)}e${e}`);
        const given: SeriesText = { variable: 'ep', low, coefficients };
        const { result } = applySteps(given, [
          { kind: 'multiply', factor },
          { kind: 'divide', factor },
        ]);
        const wanted = readSeries(given);
        expect(result.low).toBe(low);
        result.coefficients.forEach((c, k) => {
          const value = 're' in c.value ? c.value.re : c.value;
          expect(overlaps(value, wanted.coefficients[k] as Ball)).toBe(true);
          expect(c.places).toBeGreaterThan(39 - 5 - 12);
        });
      }),
      { numRuns: 60, seed: 5 },
    );
  });

  it('change the variable', () => {
    const s: SeriesText = { variable: 'ep', low: -2, coefficients: ['1', '1/3', '2.5', '-7'] };
    const { result } = applySteps(s, [{ kind: 'rescale', factor: '-2' }]);
    expect(result.coefficients.map((c) => c.text)[0]).toBe('0.25');
    expect(result.coefficients[1]?.text).toMatch(/^-0\.1666666/);
    expect(result.coefficients[3]?.text).toBe('14');
    const back = applySteps(s, [
      { kind: 'rescale', factor: 'pi/3' },
      { kind: 'rescale', factor: '3/pi' },
    ]).result;
    back.coefficients.forEach((c, k) => {
      expect(overlaps(c.value as Ball, readSeries(s).coefficients[k] as Ball)).toBe(true);
    });
  });

  it('add and subtract series', () => {
    const s: SeriesText = { variable: 'ep', low: -1, coefficients: ['1.25', '3', '4'] };
    const { result } = applySteps(s, [{ kind: 'subtract-series', series: s }]);
    expect(result.coefficients[1]?.text).toBe('0');
    expect(result.coefficients[0]?.text).toBeNull();
    const other: SeriesText = { variable: 'ep', low: -3, coefficients: ['1', '1', '1', '5'] };
    const sum = applySteps(s, [{ kind: 'add-series', series: other }]).result;
    expect([sum.low, sum.end]).toEqual([-3, 1]);
    expect(sum.coefficients.map((c) => c.text)).toEqual(['1', '1', '2.25', '8']);
  });

  it.each([
    ['log(ep)', 'logarithm of the variable'],
    ['ep^ep', 'logarithm of the variable'],
    ['exp(1/ep)', 'no Laurent expansion'],
    ['zeta(ep)', 'cannot be expanded'],
    ['Gamma(pi+ep)', 'rational'],
    ['ep-ep', 'zero'],
    ['0', 'zero'],
    ['foo*ep', 'no constant or function'],
    ['Gamma(1/ep)', 'pole'],
    ['(1', 'never closed'],
  ])('refuse %s', (factor, message) => {
    const s: SeriesText = { variable: 'ep', low: 0, coefficients: ['1.5', '2.5'] };
    expect(() => applySteps(s, [{ kind: 'multiply', factor }])).toThrow(message);
    expect(() => applySteps(s, [{ kind: 'multiply', factor }])).toThrow(/^Step 1: /);
  });
});
