/**
 * Complete elliptic integrals of the modulus k, and the arithmetic-geometric mean, in ball arithmetic.
 *
 * a₀ = 1, g₀ = √(1 − k²), c₀ = k; a, g the means, c_{n+1} = (a_n − g_n)/2. K = π/2M; E = K(1 − Σ 2^{n−1} c_n²). Once c_n ≤ a_n/2,
 * c_{n+1} = c_n²/(4a_{n+1}) ≤ c_n/8, so what is left of the sum is less than 2^{n−1} c_n²; Π: |Q_{n+1}| ≤ |Q_n|/2, so what is left
 * after Q_n is less than |Q_n|. Both are added to the radius.
 */
import {
  add,
  type Ball,
  divide,
  fromInteger,
  magnitude,
  multiply,
  subtract,
  timesPowerOfTwo,
  widen,
  withBits,
} from '../number/ball.ts';
import { toComplex } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import { absolute } from '../number/integer.ts';
import { piBall } from '../number/reduction.ts';
import { agm, geometricMean, root } from '../number/roots.ts';
import { toAccuracy } from './accurate.ts';
import { compareSample, elementaryArgument, elementaryValue, isRealElementary } from './arguments.ts';
import type { Family } from './family.ts';
import type { Term } from './term.ts';
import { termLatex } from './term-latex.ts';
import { termText } from './term-text.ts';

const ONE = fromInteger(1n);

function real(term: Term, bits: number): Ball {
  return toComplex(elementaryValue(term, bits)).re;
}

/** k² and √(1 − k²). */
function moduli(k: Term, work: number): { square: Ball; complement: Ball } {
  const value = real(k, work + 8);
  const square = multiply(value, value, 2 * work);
  return { square, complement: root(subtract(ONE, square), 2, work) };
}

function integralK(k: Term, work: number): Ball {
  const { complement } = moduli(k, work + 8);
  return divide(timesPowerOfTwo(piBall(work + 8), -1), agm(ONE, complement, work + 8), work);
}

interface Means {
  a: Ball;
  g: Ball;
}

function step({ a, g }: Means, work: number): Means {
  return { a: withBits(timesPowerOfTwo(add(a, g), -1), work), g: geometricMean(a, g, work) };
}

function integralE(k: Term, work: number): Ball {
  const { square, complement } = moduli(k, work + 8);
  let means: Means = { a: withBits(ONE, work), g: complement };
  let sum = timesPowerOfTwo(square, -1);
  for (let n = 1; ; n++) {
    const c = timesPowerOfTwo(subtract(means.a, means.g), -1);
    means = step(means, work);
    const term = timesPowerOfTwo(multiply(c, c, 2 * work), n - 1);
    sum = add(sum, term);
    const small = (2n * (absolute(c.mid) + c.rad)) << BigInt(means.a.bits) <= means.a.mid << BigInt(c.bits);
    if (small && magnitude(term) < -work) {
      const total = widen(withBits(subtract(ONE, sum), work), 1n);
      const mean = agm(means.a, means.g, work);
      return multiply(divide(timesPowerOfTwo(piBall(work), -1), mean, work), total, work);
    }
  }
}

/** DLMF 19.8.7: Π = π/(4M) (2 + n/(1 − n) Σ Q_j). */
function integralPi(characteristic: Term, k: Term, work: number): Ball {
  const { complement } = moduli(k, work + 8);
  const n = real(characteristic, work + 8);
  const rest = subtract(ONE, n);
  let means: Means = { a: withBits(ONE, work), g: complement };
  let p = root(rest, 2, work);
  let q: Ball = withBits(ONE, work);
  let sum = q;
  while (magnitude(q) > -work + 2) {
    const square = multiply(p, p, work);
    const product = multiply(means.a, means.g, work);
    const both = add(square, product);
    q = timesPowerOfTwo(multiply(q, divide(subtract(square, product), both, work), work), -1);
    q = withBits(q, work);
    p = divide(both, timesPowerOfTwo(p, 1), work);
    means = step(means, work);
    sum = add(sum, q);
  }
  sum = widen(sum, absolute(q.mid) + q.rad);
  const mean = agm(means.a, means.g, work);
  const total = add(fromInteger(2n), multiply(divide(n, rest, work), sum, work));
  return multiply(divide(timesPowerOfTwo(piBall(work), -2), mean, work), total, work);
}

interface EllipticArgs {
  readonly name: string;
  readonly list: readonly Term[];
}

/** Real elementary arguments in one group. Throws InputError. */
function realArguments(name: string, example: string, count: number, term: Parameters<Family['parse']>[0]): Term[] {
  const list: readonly Term[] = term.kind === 'call' && term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  if (list.length !== count) {
    throw new InputError(
      'wrong-arguments',
      `${name} takes ${count} argument${count === 1 ? '' : 's'}, as in ${example}.`,
    );
  }
  return list.map((t) => {
    const argument = elementaryArgument(name, t);
    if (!isRealElementary(argument)) {
      throw new InputError('bad-argument', `${name} takes real arguments, as in ${example}.`);
    }
    return argument;
  });
}

function checkModulus(name: string, k: Term, closed: boolean): void {
  const above = compareSample(k, 1n);
  const below = compareSample(k, -1n);
  if (above > 0 || below < 0 || (!closed && (above === 0 || below === 0))) {
    throw new InputError(
      'bad-modulus',
      `${name} takes a modulus k with |k| < 1 (the modulus, not the parameter m = k^2); ${termText(k)} is outside.`,
    );
  }
}

const common = {
  weight: () => null,
  text: ({ name, list }: EllipticArgs) => `${name}(${list.map(termText).join(',')})`,
  isReal: () => true,
} as const;

const firstKind: Family<EllipticArgs> = {
  ...common,
  key: 'elliptic-k',
  title: 'Complete elliptic integral of the first kind',
  names: ['K'],
  parse: (term) => {
    const list = realArguments('K', 'K(1/2)', 1, term);
    checkModulus('K', list[0] as Term, false);
    return { name: 'K', list };
  },
  latex: ({ list }) => `K\\bigl(${termLatex(list[0] as Term)}\\bigr)`,
  evaluate: ({ list }, bits) => toAccuracy(bits, 16, (work) => integralK(list[0] as Term, work)),
  definition:
    'K(k)=\\int_0^{\\pi/2}\\frac{d\\theta}{\\sqrt{1-k^2\\sin^2\\theta}}\\quad\\text{(}k\\text{ is the modulus)}',
  source: 'DLMF 19.2.8, 19.8.5.',
  examples: ['K(1/2)', 'K(1/3)', 'K(sqrt(2)/2)', 'K(sqrt(3)/2)', 'K((sqrt(6)-sqrt(2))/4)'],
};

const secondKind: Family<EllipticArgs> = {
  ...common,
  key: 'elliptic-e',
  title: 'Complete elliptic integral of the second kind',
  names: ['E'],
  parse: (term) => {
    const list = realArguments('E', 'E(1/2)', 1, term);
    checkModulus('E', list[0] as Term, true);
    return { name: 'E', list };
  },
  latex: ({ list }) => `E\\bigl(${termLatex(list[0] as Term)}\\bigr)`,
  evaluate: ({ list }, bits) => {
    const k = list[0] as Term;
    if (compareSample(k, 1n) === 0 || compareSample(k, -1n) === 0) return ONE;
    return toAccuracy(bits, 24, (work) => integralE(k, work));
  },
  definition: 'E(k)=\\int_0^{\\pi/2}\\sqrt{1-k^2\\sin^2\\theta}\\,d\\theta\\quad\\text{(}k\\text{ is the modulus)}',
  source: 'DLMF 19.2.8, 19.8.6.',
  examples: ['E(1/2)', 'E(1/3)', 'E(sqrt(2)/2)', 'E(sqrt(3)/2)', 'E((sqrt(6)-sqrt(2))/4)'],
};

const thirdKind: Family<EllipticArgs> = {
  ...common,
  key: 'elliptic-pi',
  title: 'Complete elliptic integral of the third kind',
  names: ['Pi'],
  parse: (term) => {
    const list = realArguments('Pi', 'Pi(1/3,1/2)', 2, term);
    const [n, k] = list as [Term, Term];
    if (compareSample(n, 1n) >= 0) {
      throw new InputError(
        'bad-argument',
        'The characteristic of Pi, its first argument, must be less than 1, as in Pi(1/3,1/2).',
      );
    }
    checkModulus('Pi', k, false);
    return { name: 'Pi', list };
  },
  latex: ({ list }) => `\\Pi\\bigl(${list.map(termLatex).join(',')}\\bigr)`,
  evaluate: ({ list }, bits) => toAccuracy(bits, 32, (work) => integralPi(list[0] as Term, list[1] as Term, work)),
  definition:
    '\\Pi(n,k)=\\int_0^{\\pi/2}\\frac{d\\theta}{(1-n\\sin^2\\theta)\\sqrt{1-k^2\\sin^2\\theta}}\\quad\\text{(}k\\text{ is the modulus)}',
  source: 'DLMF 19.2.8 with n = α², 19.8.7.',
  examples: ['Pi(1/3,1/2)', 'Pi(-1/2,1/3)', 'Pi(1/4,sqrt(2)/2)'],
};

const mean: Family<EllipticArgs> = {
  ...common,
  key: 'agm',
  title: 'Arithmetic-geometric mean',
  names: ['agm'],
  parse: (term) => {
    const list = realArguments('agm', 'agm(1,sqrt(2))', 2, term);
    if (list.some((t) => compareSample(t, 0n) <= 0)) {
      throw new InputError('bad-argument', 'agm takes two positive numbers, as in agm(1,sqrt(2)).');
    }
    return { name: 'agm', list };
  },
  latex: ({ list }) => `\\operatorname{agm}\\bigl(${list.map(termLatex).join(',')}\\bigr)`,
  evaluate: ({ list }, bits) =>
    toAccuracy(bits, 16, (work) => agm(real(list[0] as Term, work + 8), real(list[1] as Term, work + 8), work)),
  definition: '\\operatorname{agm}(a,b):\\ a\\mapsto\\tfrac{a+b}2,\\ b\\mapsto\\sqrt{ab}',
  source: 'DLMF 19.8(i).',
  examples: ['agm(1,sqrt(2))', 'agm(1,1/2)'],
};

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const ellipticFamilies: readonly Family<any>[] = [firstKind, secondKind, thirdKind, mean];
