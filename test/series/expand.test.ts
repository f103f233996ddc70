import { describe, expect, it } from 'vitest';
import { accuracyOf } from '../../src/constants/accurate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { type Ball, containsZero, overlaps, widen } from '../../src/number/ball.ts';
import { exactBall, parseDecimal } from '../../src/number/decimal.ts';
import { expandTerm } from '../../src/series/expand.ts';

/** Coefficients printed by PARI/GP 2.15 at 60 digits, e.g. Vec(gamma(1/3-x)); the last printed digit is left out here. */
const PRINTED: readonly (readonly [string, number, readonly string[]])[] = [
  [
    'Gamma(1+x)^3*Gamma(1/2+x)/Gamma(1-2*x)',
    0,
    [
      '1.7724538509055160272981674833411451827975494561223871282138',
      '-8.5956715472018111542357552653105021685033994445020928638236',
      '23.758304021412932109507963503543173381710188648069328733687',
      '-60.615749095887710572039477579498174231616872901951327804052',
    ],
  ],
  [
    'Gamma(-2+3*x)*exp(2*x*euler_gamma)',
    -1,
    [
      '0.16666666666666666666666666666666666666666666666666666666666',
      '0.65379738918307785656558131831959959482630677734334606686570',
      '3.4535536284439967380926253187856540875208776856376252744599',
      '10.078364340909030045650051228311301644439149679448995297341',
    ],
  ],
  [
    'Gamma(1/3-x)',
    0,
    [
      '2.6789385347077476336556929409746776441286893779573011009504',
      '8.3905259853041068767653782084268012514561334719835228497472',
      '26.662447494153115411868867805370224527670821606188139113217',
      '80.683148377697721145299521156954258031079937070085397543631',
    ],
  ],
  [
    'sin(pi*x)/(pi*x)*(4*pi)^x',
    0,
    [
      '1.0000000000000000000000000000000000000000000000000000000000',
      '2.5310242469692907929778915942694118477982950816358220797549',
      '1.5581078025250063204489573210853058040958735242739954835171',
      '-1.4610424627115000506363313322094964394641999685301583830660',
    ],
  ],
  [
    '(1-2*x)^(1/2)*2^(4*x)/(3-4*x)',
    0,
    [
      '0.33333333333333333333333333333333333333333333333333333333333',
      '1.0353073518577048570007539397220132018784446235914514499386',
      '1.5707549321788831958903024945562221030187338565603831594023',
      '1.3684547369328706281303434686290026576927313517165983533130',
    ],
  ],
];

describe('expandTerm', () => {
  it.each(PRINTED)('%s agrees with PARI/GP', (text, low, digits) => {
    const s = expandTerm(parseTerm(text), 'x', digits.length, 400);
    expect(s.low).toBe(low);
    digits.forEach((printed, k) => {
      const c = s.coefficients[k] as Ball;
      const d = parseDecimal(printed);
      const outside = exactBall(d, 400);
      const unit = exactBall({ ...d, coefficient: 1n }, 400).mid;
      expect(overlaps(c, widen(outside, unit)), `${text} order ${k}`).toBe(true);
      expect(accuracyOf(c)).toBeGreaterThanOrEqual(400);
    });
  });

  it('finds the leading power behind cancelling terms', () => {
    const s = expandTerm(parseTerm('exp(x)-1-x'), 'x', 2, 100);
    expect(s.low).toBe(2);
    // that γ cancels cannot be proved by balls: the term stays, and may be zero
    const rest = expandTerm(parseTerm('Gamma(x)-1/x+euler_gamma'), 'x', 1, 100);
    expect(rest.low).toBe(0);
    expect(containsZero(rest.coefficients[0] as Ball)).toBe(true);
  });
});
