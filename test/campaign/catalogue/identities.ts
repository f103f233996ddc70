/** Identities that tie families together; each left side minus right side must be a ball around zero. Sources beside them. */
import type { Random } from '../../support/random.ts';

export interface Identity {
  readonly name: string;
  draw(random: Random): string;
}

function point(random: Random, denominator: number): { p: number; q: number } {
  const q = random.integer(2, denominator);
  return { p: random.integer(1, q - 1), q };
}

const range = (n: number): number[] => Array.from({ length: n }, (_, k) => k);

export const identities: readonly Identity[] = [
  {
    name: 'dilogarithm reflection (Lewin 1981, 1.11)',
    draw: (random) => {
      const { p, q } = point(random, 40);
      return `Li(2,${p}/${q}) + Li(2,${q - p}/${q}) - pi^2/6 + log(${p}/${q})*log(${q - p}/${q})`;
    },
  },
  {
    name: 'Landen (Lewin 1981, 1.12)',
    draw: (random) => {
      const { p, q } = point(random, 40);
      return `Li(2,-${p}/${q}) + Li(2,${p}/${p + q}) + 1/2*log(${p + q}/${q})^2`;
    },
  },
  {
    name: 'duplication of polylogarithms (Lewin 1981, 7.42)',
    draw: (random) => {
      const { p, q } = point(random, 30);
      const s = random.integer(2, 7);
      return `Li(${s},${p}/${q}) + Li(${s},-${p}/${q}) - 2^(1-${s})*Li(${s},${p * p}/${q * q})`;
    },
  },
  {
    name: 'trilogarithm of the golden ratio (Landen; Lewin 1981, 6.13)',
    draw: () => 'Li(3,(3-sqrt(5))/2) - 4/5*zeta(3) - 2/3*log((1+sqrt(5))/2)^3 + 2/15*pi^2*log((1+sqrt(5))/2)',
  },
  {
    name: 'Li_3(1/2) (Landen 1780)',
    draw: () => 'Li(3,1/2) - 7/8*zeta(3) - log(2)^3/6 + pi^2*log(2)/12',
  },
  {
    name: 'Clausen duplication (Lewin 1981, 4.17)',
    draw: (random) => {
      const { p, q } = point(random, 24);
      return `Cl(2,${2 * p}/${q}*pi) - 2*Cl(2,${p}/${q}*pi) + 2*Cl(2,${q - p}/${q}*pi)`;
    },
  },
  {
    name: 'Clausen and polylogarithm on the unit circle',
    draw: (random) => {
      const { p, q } = point(random, 12);
      const s = 2 * random.integer(1, 3);
      return `Cl(${s},${p}/${q}*pi) - im(Li(${s},exp(${p}/${q}*pi*i)))`;
    },
  },
  {
    name: 'multiplication of Hurwitz values (DLMF 25.11.15)',
    draw: (random) => {
      const m = random.integer(2, 12);
      const s = random.integer(2, 6);
      const { p, q } = point(random, 5);
      const sum = range(m).map((k) => `hurwitz(${s},${p + k * q}/${m * q})`);
      return `${sum.join(' + ')} - ${m}^${s}*hurwitz(${s},${p}/${q})`;
    },
  },
  {
    name: 'L-values from Hurwitz values (DLMF 25.15.3)',
    draw: (random) => {
      const s = random.integer(2, 7);
      return `L(-7,${s}) - 7^(-${s})*(${[1, 2, 4].map((a) => `hurwitz(${s},${a}/7)`).join('+')}-${[3, 5, 6].map((a) => `hurwitz(${s},${a}/7)`).join('-')})`;
    },
  },
  {
    name: 'reflection of Gamma (DLMF 5.5.3)',
    draw: (random) => {
      const { p, q } = point(random, 60);
      return `Gamma(${p}/${q})*Gamma(${q - p}/${q})*sin(${p}/${q}*pi) - pi`;
    },
  },
  {
    name: 'multiplication of Gamma (DLMF 5.5.6)',
    draw: (random) => {
      const n = random.integer(2, 9);
      const { p, q } = point(random, 7);
      const product = range(n).map((k) => `Gamma(${p + k * q}/${n * q})`);
      return `${product.join('*')} - (2*pi)^(${n - 1}/2)*${n}^(1/2-${p}/${q})*Gamma(${p}/${q})`;
    },
  },
  {
    name: 'reflection of digamma (DLMF 5.15.6)',
    draw: (random) => {
      const { p, q } = point(random, 30);
      return `polygamma(0,${q - p}/${q}) - polygamma(0,${p}/${q}) - pi*cos(${p}/${q}*pi)/sin(${p}/${q}*pi)`;
    },
  },
  {
    name: 'Legendre’s relation (DLMF 19.7.1)',
    draw: (random) => {
      const { p, q } = point(random, 40);
      const k = `${p}/${q}`;
      const c = `sqrt(1-(${k})^2)`;
      return `E(${k})*K(${c}) + E(${c})*K(${k}) - K(${k})*K(${c}) - pi/2`;
    },
  },
  {
    name: 'K and the arithmetic-geometric mean (DLMF 19.8.5)',
    draw: (random) => {
      const { p, q } = point(random, 40);
      return `K(${p}/${q})*agm(1,sqrt(1-(${p}/${q})^2)) - pi/2`;
    },
  },
  {
    name: 'third kind at n = k² (DLMF 19.6.2)',
    draw: (random) => {
      const { p, q } = point(random, 40);
      return `Pi((${p}/${q})^2,${p}/${q}) - E(${p}/${q})/(1-(${p}/${q})^2)`;
    },
  },
  {
    name: 'lemniscate: K(1/√2) = Γ(1/4)²/(4√π) (DLMF 19.6, 23.5)',
    draw: () => 'K(sqrt(2)/2) - Gamma(1/4)^2/(4*sqrt(pi))',
  },
  {
    name: 'Machin’s formula (1706)',
    draw: () => '4*atan(1/5) - atan(1/239) - pi/4',
  },
  {
    name: 'inversion of Ti_2 (Lewin 1981, 2.6)',
    draw: (random) => {
      const { p, q } = point(random, 12);
      return `Ti(2,${p}/${q}) - Ti(2,${q}/${p}) - pi/2*log(${p}/${q})`;
    },
  },
  {
    name: 'inversion of polylogarithms on the cut',
    draw: (random) => {
      const { p, q } = point(random, 20);
      // Li_3(x) − Li_3(1/x) = −log³(−x)/6 − π² log(−x)/6 with log(−x) = log x + iπ from below.
      return `re(Li(3,${q}/${p})) - Li(3,${p}/${q}) + log(${q}/${p})^3/6 - pi^2/3*log(${q}/${p})`;
    },
  },
  {
    name: 'sum theorem (Granville 1997)',
    draw: (random) => {
      const w = random.integer(4, 9);
      const depthTwo = range(w - 2).map((k) => `zeta(${w - 1 - k},${k + 1})`);
      return `${depthTwo.join(' + ')} - zeta(${w})`;
    },
  },
  {
    name: 'stuffle of two zeta values',
    draw: (random) => {
      const [a, b] = [random.integer(2, 6), random.integer(2, 6)];
      return `zeta(${a})*zeta(${b}) - zeta(${a},${b}) - zeta(${b},${a}) - zeta(${a + b})`;
    },
  },
  {
    name: 'η and ζ',
    draw: (random) => {
      const s = random.integer(2, 12);
      return `zeta(-${s}) + (1-2^(1-${s}))*zeta(${s})`;
    },
  },
];
