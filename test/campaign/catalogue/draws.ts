/** Random members of the families of the catalogue, each with the expressions that PARI/GP and mpmath have for it. */
import type { Random } from '../../support/random.ts';

export interface Draw {
  readonly family: string;
  /** As typed here. */
  readonly text: string;
  /** The same number in PARI/GP, or none. */
  readonly pari?: string;
  /** The same number in mpmath, or none. */
  readonly mpmath?: string;
}

export interface Source {
  readonly family: string;
  /** Most digits asked of the outside programs, by what they can do in seconds. */
  readonly pariDigits: number;
  readonly mpmathDigits: number;
  draw(random: Random): Omit<Draw, 'family'>;
}

const pick = <T>(random: Random, list: readonly T[]): T => list[random.integer(0, list.length - 1)] as T;

function fractionBelow(random: Random, denominator: number): { p: number; q: number } {
  const q = random.integer(2, denominator);
  return { p: random.integer(1, q - 1), q };
}

/** Real algebraic numbers, typed and in PARI/GP's and mpmath's own words. */
const ALGEBRAIC = [
  'sqrt(2)',
  '(sqrt(5)-1)/2',
  'sqrt(3)/2',
  '2-sqrt(3)',
  'sqrt(7)/3',
  '1/(1+sqrt(2))',
  '(sqrt(6)-sqrt(2))/4',
];
const SMALL = ALGEBRAIC.slice(1);

/** Roots of unity: exponent/order as an angle. */
function rootOf(exponent: number, order: number, unit: string): string {
  return `exp(2*${unit}*${unit === 'I' ? 'Pi' : 'pi'}*${exponent}/${order})`;
}

const typedRoot = (exponent: number, order: number): string =>
  order === 1 ? '1' : order === 2 ? (exponent % 2 === 0 ? '1' : '-1') : `r${order}^${exponent}`;

function convergentIndices(random: Random, weight: number, signed: boolean): number[] {
  for (;;) {
    const list: number[] = [];
    for (let rest = weight; rest > 0; ) {
      const s = random.integer(1, rest);
      list.push(signed && random.integer(0, 1) === 1 ? -s : s);
      rest -= s;
    }
    if (list[0] !== 1 && list.length > 1 && list.some((s) => s < 0) === signed) return list;
  }
}

/** Letters of a word for H or G as PARI's polylogmult: indices and arguments, or null for a word of zeros at the end. */
function asNested(letters: readonly string[], z: string): { indices: number[]; points: string[] } {
  const indices: number[] = [];
  const points: string[] = [];
  let zeros = 0;
  let last = z;
  for (const letter of letters) {
    if (letter === '0') zeros++;
    else {
      indices.push(zeros + 1);
      points.push(`(${last})/(${letter})`);
      last = letter;
      zeros = 0;
    }
  }
  return { indices, points };
}

function word(random: Random, alphabet: readonly string[], ends: readonly string[]): string[] {
  const length = random.integer(2, 4);
  const letters = Array.from({ length: length - 1 }, () => pick(random, alphabet));
  return [...letters, pick(random, ends)];
}

const withPi = (text: string, name: string): string => text.replaceAll('pi', name);

export const sources: readonly Source[] = [
  {
    family: 'elementary constants',
    pariDigits: 3000,
    mpmathDigits: 3000,
    draw: (random) =>
      pick(random, [
        { text: 'pi', pari: 'Pi', mpmath: 'pi' },
        { text: 'e', pari: 'exp(1)', mpmath: 'e' },
        { text: 'euler_gamma', pari: 'Euler', mpmath: 'euler' },
        { text: 'catalan', pari: 'Catalan', mpmath: 'catalan' },
      ]),
  },
  {
    family: 'logarithms',
    pariDigits: 3000,
    mpmathDigits: 3000,
    draw: (random) => {
      const p = random.integer(2, 5000);
      const q = random.integer(1, 900);
      if (random.integer(0, 2) === 0) {
        const x = pick(random, ALGEBRAIC);
        return { text: `log(${x})`, pari: `log(${x})`, mpmath: `log(${x})` };
      }
      return { text: `log(${p}/${q})`, pari: `log(${p}/${q})`, mpmath: `log(mpf(${p})/${q})` };
    },
  },
  {
    family: 'elementary functions',
    pariDigits: 3000,
    mpmathDigits: 2000,
    draw: (random) => {
      const name = pick(random, [
        'exp',
        'sin',
        'cos',
        'tan',
        'atan',
        'sinh',
        'cosh',
        'tanh',
        'asinh',
        'asin',
        'acos',
        'atanh',
      ]);
      const bounded = name === 'asin' || name === 'acos' || name === 'atanh';
      const { p, q } = fractionBelow(random, 500);
      const k = bounded ? 0 : random.integer(-9, 9);
      return {
        text: `${name}(${k}+${p}/${q})`,
        pari: `${name}(${k}+${p}/${q})`,
        mpmath: `${name}(mpf(${k * q + p})/${q})`,
      };
    },
  },
  {
    family: 'powers and roots',
    pariDigits: 3000,
    mpmathDigits: 2000,
    draw: (random) => {
      const n = random.integer(2, 500);
      const d = random.integer(2, 9);
      const p = random.integer(-7, 7);
      return { text: `${n}^(${p}/${d})`, pari: `${n}.^(${p}/${d})`, mpmath: `mpf(${n})**(mpf(${p})/${d})` };
    },
  },
  {
    family: 'zeta values',
    pariDigits: 3000,
    mpmathDigits: 1000,
    draw: (random) => {
      const s = random.integer(0, 4) === 0 ? random.integer(40, 400) : random.integer(2, 40);
      return { text: `zeta(${s})`, pari: `zeta(${s})`, mpmath: `zeta(${s})` };
    },
  },
  {
    family: 'beta values',
    pariDigits: 1000,
    mpmathDigits: 300,
    draw: (random) => {
      const s = random.integer(2, 14);
      return {
        text: `beta(${s})`,
        pari: `(zetahurwitz(${s},1/4)-zetahurwitz(${s},3/4))/4^${s}`,
        mpmath: `(zeta(${s},mpf(1)/4)-zeta(${s},mpf(3)/4))/mpf(4)**${s}`,
      };
    },
  },
  {
    family: 'L-values',
    pariDigits: 200,
    mpmathDigits: 0,
    draw: (random) => {
      const d = pick(
        random,
        [-3, -4, -7, -8, -11, -15, -20, -23, -24, -43, -84, 5, 8, 12, 13, 17, 21, 24, 28, 33, 40, 60],
      );
      const s = random.integer(1, 7);
      return { text: `L(${d},${s})`, pari: `lfun(${d},${s})` };
    },
  },
  {
    family: 'polylogarithms at rationals',
    pariDigits: 2000,
    mpmathDigits: 300,
    draw: (random) => {
      const s = random.integer(2, 8);
      const { p, q } = fractionBelow(random, 30);
      const k = random.integer(-3, 2);
      const x = k * q + p;
      // PARI and mpmath continue from below for x > 1 too.
      return { text: `Li(${s},${x}/${q})`, pari: `polylog(${s},${x}/${q})`, mpmath: `polylog(${s},mpf(${x})/${q})` };
    },
  },
  {
    family: 'polylogarithms at algebraic points',
    pariDigits: 1000,
    mpmathDigits: 200,
    draw: (random) => {
      const s = random.integer(2, 6);
      const x = pick(random, [...SMALL, '-(3-sqrt(5))/2', '-sqrt(2)', '-sqrt(3)/2', 'sqrt(5)-2']);
      return { text: `Li(${s},${x})`, pari: `polylog(${s},${x})`, mpmath: `polylog(${s},${x})` };
    },
  },
  {
    family: 'polylogarithms at complex points',
    pariDigits: 600,
    mpmathDigits: 150,
    draw: (random) => {
      const s = random.integer(2, 6);
      const { p, q } = fractionBelow(random, 9);
      const r = random.integer(-3, 3);
      const b = pick(random, ['1', 'sqrt(2)', 'sqrt(3)', 'sqrt(7)']);
      const x = (unit: string): string => `(${r}*${p}/${q}+${unit}*${b}*${q}/${p + q})`;
      return {
        text: `Li(${s},${x('i')})`,
        pari: `polylog(${s},${x('I')})`,
        mpmath: `polylog(${s},mpf(1)*${r}*${p}/${q}+j*${b}*${q}/${p + q})`,
      };
    },
  },
  {
    family: 'polylogarithms at roots of unity',
    pariDigits: 600,
    mpmathDigits: 150,
    draw: (random) => {
      const s = random.integer(2, 6);
      const order = pick(random, [3, 4, 6, 8, 12]);
      const k = random.integer(1, order - 1);
      return {
        text: `Li(${s},${typedRoot(k, order)})`,
        pari: `polylog(${s},${rootOf(k, order, 'I')})`,
        mpmath: `polylog(${s},${rootOf(k, order, 'j')})`,
      };
    },
  },
  {
    family: 'Clausen values',
    pariDigits: 1000,
    mpmathDigits: 200,
    draw: (random) => {
      const s = random.integer(2, 7);
      const { p, q } = fractionBelow(random, 24);
      const angle = pick(random, [`${p}/${q}*pi`, `${p}/${q}*pi`, `${p}/${q}`, `acos(${p}/${q})`]);
      const part = s % 2 === 0 ? 'imag' : 'real';
      const name = s % 2 === 0 ? 'clsin' : 'clcos';
      return {
        text: `Cl(${s},${angle})`,
        pari: `${part}(polylog(${s},exp(I*(${withPi(angle, 'Pi')}))))`,
        mpmath: `${name}(${s},${angle.replace(`${p}/${q}`, `mpf(${p})/${q}`)})`,
      };
    },
  },
  {
    family: 'inverse tangent integrals',
    pariDigits: 1000,
    mpmathDigits: 150,
    draw: (random) => {
      const s = random.integer(1, 6);
      const { p, q } = fractionBelow(random, 12);
      const x = pick(random, [`${p}/${q}`, `${q}/${p}`, 'sqrt(3)', '2-sqrt(3)', '-sqrt(2)', '1']);
      return { text: `Ti(${s},${x})`, pari: `imag(polylog(${s},I*(${x})))` };
    },
  },
  {
    family: 'Hurwitz zeta values',
    pariDigits: 1000,
    mpmathDigits: 500,
    draw: (random) => {
      const s = random.integer(2, 9);
      const { p, q } = fractionBelow(random, 24);
      const a = random.integer(0, 3) * q + p;
      return {
        text: `hurwitz(${s},${a}/${q})`,
        pari: `zetahurwitz(${s},${a}/${q})`,
        mpmath: `zeta(${s},mpf(${a})/${q})`,
      };
    },
  },
  {
    family: 'polygamma values',
    pariDigits: 1000,
    mpmathDigits: 500,
    draw: (random) => {
      const n = random.integer(0, 6);
      const { p, q } = fractionBelow(random, 24);
      const a = random.integer(0, 3) * q + p;
      const sign = n % 2 === 0 ? -1 : 1;
      return {
        text: `polygamma(${n},${a}/${q})`,
        pari: n === 0 ? `psi(${a}/${q})` : `${sign}*${n}!*zetahurwitz(${n + 1},${a}/${q})`,
        mpmath: `psi(${n},mpf(${a})/${q})`,
      };
    },
  },
  {
    family: 'gamma values',
    pariDigits: 1500,
    mpmathDigits: 1000,
    draw: (random) => {
      const { p, q } = random.integer(0, 1) === 0 ? fractionBelow(random, 12) : fractionBelow(random, 60);
      const a = random.integer(-4, 4) * q + p;
      return { text: `Gamma(${a}/${q})`, pari: `gamma(${a}/${q})`, mpmath: `gamma(mpf(${a})/${q})` };
    },
  },
  {
    family: 'elliptic integrals',
    pariDigits: 3000,
    mpmathDigits: 1000,
    draw: (random) => {
      const { p, q } = fractionBelow(random, 60);
      const k = pick(random, [`${p}/${q}`, `-${p}/${q}`, ...SMALL]);
      const m = k.includes('sqrt') ? `(${k})**2` : `(mpf(1)*${k})**2`;
      return pick(random, [
        { text: `K(${k})`, pari: `ellK(${k})`, mpmath: `ellipk(${m})` },
        { text: `E(${k})`, pari: `ellE(${k})`, mpmath: `ellipe(${m})` },
      ]);
    },
  },
  {
    family: 'elliptic integrals of the third kind',
    pariDigits: 0,
    mpmathDigits: 1000,
    draw: (random) => {
      const { p, q } = fractionBelow(random, 60);
      const n = random.integer(-40, 9);
      return { text: `Pi(${n}/10,${p}/${q})`, mpmath: `ellippi(mpf(${n})/10,(mpf(${p})/${q})**2)` };
    },
  },
  {
    family: 'arithmetic-geometric means',
    pariDigits: 3000,
    mpmathDigits: 3000,
    draw: (random) => {
      const x = pick(random, ALGEBRAIC);
      const y = `${random.integer(1, 900)}/${random.integer(1, 900)}`;
      return { text: `agm(${x},${y})`, pari: `agm(${x},${y})`, mpmath: `agm(${x},mpf(1)*${y})` };
    },
  },
  {
    family: 'multiple zeta values',
    pariDigits: 1000,
    mpmathDigits: 0,
    draw: (random) => {
      const list = convergentIndices(random, random.integer(3, 10), false).join(',');
      return { text: `zeta(${list})`, pari: `zetamult([${list}])` };
    },
  },
  {
    family: 'alternating sums',
    pariDigits: 300,
    mpmathDigits: 0,
    draw: (random) => {
      const list = convergentIndices(random, random.integer(2, 8), true);
      const signs = list.map((s) => Math.sign(s)).join(',');
      return {
        text: `zeta(${list.join(',')})`,
        pari: `real(polylogmult([${list.map(Math.abs).join(',')}],[${signs}]))`,
      };
    },
  },
  {
    family: 'sums at roots of unity',
    pariDigits: 200,
    mpmathDigits: 0,
    draw: (random) => {
      // At 8th and 12th roots PARI/GP loses up to half of its digits; those are compared in the campaign of the sums.
      const order = pick(random, [3, 4, 6]);
      const depth = random.integer(1, 3);
      const indices = Array.from({ length: depth }, () => random.integer(1, 3));
      const exponents = indices.map((_, j) => random.integer(j === 0 ? 1 : 0, order - 1));
      return {
        text: `MPL(${indices.join(',')};${exponents.map((k) => typedRoot(k, order)).join(',')})`,
        pari: `polylogmult([${indices.join(',')}],[${exponents.map((k) => rootOf(k, order, 'I')).join(',')}])`,
      };
    },
  },
  {
    family: 'sums at algebraic points',
    pariDigits: 200,
    mpmathDigits: 0,
    draw: (random) => {
      const depth = random.integer(1, 3);
      const indices = Array.from({ length: depth }, () => random.integer(1, 3));
      const points = indices.map(() => pick(random, ['1/2', '-1/3', '2/3', '-1/2', 'sqrt(2)/2', '1/4']));
      return {
        text: `MPL(${indices.join(',')};${points.join(',')})`,
        pari: `real(polylogmult([${indices.join(',')}],[${points.join(',')}]))`,
      };
    },
  },
  {
    family: 'harmonic polylogarithms',
    pariDigits: 200,
    mpmathDigits: 0,
    draw: (random) => {
      const letters = word(random, ['0', '1', '-1'], ['1', '-1']);
      const z = pick(random, ['1/2', '1/3', '2/3', '-1/2', '(sqrt(5)-1)/2']);
      const { indices, points } = asNested(letters, z);
      // f(−1) = 1/(1 + t) is minus the form dt/(−1 − t).
      const sign = letters.filter((l) => l === '-1').length % 2 === 0 ? 1 : -1;
      return {
        text: `H(${letters.join(',')};${z})`,
        pari: `${sign}*real(polylogmult([${indices.join(',')}],[${points.join(',')}]))`,
      };
    },
  },
  {
    family: 'multiple polylogarithms G',
    pariDigits: 200,
    mpmathDigits: 0,
    draw: (random) => {
      const letters = word(random, ['0', '1', '-1', '2', '-3'], ['1', '-1', '2', '3/2']);
      const z = pick(random, ['1/2', '1/3', '2/3']);
      const { indices, points } = asNested(letters, z);
      const sign = indices.length % 2 === 0 ? 1 : -1;
      return {
        text: `G(${letters.join(',')};${z})`,
        pari: `${sign}*real(polylogmult([${indices.join(',')}],[${points.join(',')}]))`,
      };
    },
  },
  {
    family: 'inverse central binomial sums',
    pariDigits: 400,
    mpmathDigits: 0,
    draw: (random) => {
      const s = random.integer(1, 6);
      const sign = pick(random, [1, -1]);
      return { text: `binsum(${sign * s})`, pari: `suminf(n=1,(${sign})^n*1./(n^${s}*binomial(2*n,n)))` };
    },
  },
  {
    family: 'log-sine integrals',
    pariDigits: 50,
    mpmathDigits: 0,
    draw: (random) => {
      const n = random.integer(2, 4);
      const angle = pick(random, ['pi/3', '2*pi/3', 'pi/2']);
      return {
        text: `Ls(${n},${angle})`,
        pari: `-intnum(t=[0,-1/2],${withPi(angle, 'Pi')},log(abs(2*sin(t/2)))^${n - 1})`,
      };
    },
  },
  {
    family: 'Bessel moments',
    pariDigits: 40,
    mpmathDigits: 0,
    draw: (random) => {
      const [a, b] = pick(random, [
        [0, 3],
        [1, 3],
        [0, 4],
      ] as const);
      const k = random.integer(1, 3);
      return {
        text: `bessel(${k},${a},${b})`,
        pari: `intnum(t=0,[oo,${b - a}],t^${k}*besseli(0,t)^${a}*besselk(0,t)^${b})`,
      };
    },
  },
];
