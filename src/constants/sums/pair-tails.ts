/** The double-tails pass at 3rd, 4th and 6th roots of unity, in two coordinates; see double-tails.ts for the method and the proof of its radius. */
import { gcdOf } from '../../number/integer.ts';
import type { EvaluationContext } from '../family.ts';
import {
  addMultiple,
  type Bracket,
  centralInverses,
  gatherBracket,
  powersOf,
  pulse,
  type TailsSize,
  timesPolynomial,
} from './double-tails.ts';
import type { Core, Plan } from './plan.ts';

/** The number x + yτ of ℤ[τ], where τ = i (order 4) or τ = e^{iπ/3} (order 6). */
export interface Pair {
  readonly x: number;
  readonly y: number;
}

/** A ring of two coordinates: τ² = trace·τ − 1. */
export interface PairRing {
  readonly order: 4 | 6;
  readonly trace: 0 | 1;
}

export const gaussian: PairRing = { order: 4, trace: 0 };
export const eisenstein: PairRing = { order: 6, trace: 1 };

function pairProduct(a: Pair, b: Pair, ring: PairRing): Pair {
  const yy = a.y * b.y;
  return { x: a.x * b.x - yy, y: a.x * b.y + a.y * b.x + ring.trace * yy };
}

function pairConjugate(a: Pair, ring: PairRing): Pair {
  return { x: a.x + ring.trace * a.y, y: -a.y };
}

/** τ^e. */
export function pairRoot(exponent: number, ring: PairRing): Pair {
  let root: Pair = { x: 1, y: 0 };
  for (let k = 0; k < exponent; k++) root = pairProduct(root, { x: 0, y: 1 }, ring);
  return root;
}

/** The product with (x + yτ)/norm as a matrix on coordinates. */
interface PairMap {
  readonly xx: number;
  readonly xy: number;
  readonly yx: number;
  readonly yy: number;
  readonly norm: bigint;
}

/** The product with αβ = 1/((1 − a)b). */
function tailMap(first: number, last: number, ring: PairRing): PairMap {
  const root = pairRoot(last - 1, ring);
  let factor = pairConjugate(root, ring);
  let norm = 1;
  if (first !== 0) {
    const a = pairRoot(first - 1, ring);
    const difference = { x: 1 - a.x, y: -a.y };
    const conjugate = pairConjugate(difference, ring);
    norm = pairProduct(difference, conjugate, ring).x;
    factor = pairProduct(factor, conjugate, ring);
  }
  const common = Number(gcdOf([BigInt(factor.x), BigInt(factor.y), BigInt(norm)]));
  const x = factor.x / common;
  const y = factor.y / common;
  return { xx: x, xy: -y, yx: y, yy: x + ring.trace * y, norm: BigInt(norm / common) };
}

/** J₀ of every core as coordinates in ℤ[τ] in units of 2^−work, for letters 0 and e^{2πi·(code − 1)/order}. */
export function pairTails(
  plan: Plan,
  ring: PairRing,
  size: TailsSize,
  context: EvaluationContext,
): { x: bigint[]; y: bigint[] } {
  const { cores } = plan;
  const empty = centralInverses(size.steps, size.work);
  let now = { x: cores.map(() => 0n), y: cores.map(() => 0n) };
  let next = { x: cores.map(() => 0n), y: cores.map(() => 0n) };
  const maps = cores.map((core) => tailMap(core.first, core.last, ring));
  const brackets = cores.map((core) => gatherBracket(core, plan, 1));
  const singles = cores.map((core) => singleFactor(core, ring));
  for (let n = size.steps; n >= 1; n--) {
    const powers = powersOf(n, plan.maxExponent);
    for (let c = 0; c < cores.length; c++) {
      const { exponent, terms } = brackets[c] as Bracket;
      const single = singles[c];
      let bracketX = 0n;
      let bracketY = 0n;
      for (const { core, conjugate, polynomial } of terms) {
        if (core < 0) {
          const share = timesPolynomial(polynomial, n, empty[n] as bigint);
          bracketX = addMultiple(bracketX, single?.x ?? 1, share);
          bracketY = addMultiple(bracketY, single?.y ?? 0, share);
          continue;
        }
        const partX = timesPolynomial(polynomial, n, now.x[core] as bigint);
        const partY = timesPolynomial(polynomial, n, now.y[core] as bigint);
        bracketX += conjugate && ring.trace === 1 ? partX + partY : partX;
        bracketY = conjugate ? bracketY - partY : bracketY + partY;
      }
      const divisor = powers[exponent] as bigint;
      const sumX = (now.x[c] as bigint) + bracketX / divisor;
      const sumY = (now.y[c] as bigint) + bracketY / divisor;
      const { xx, xy, yx, yy, norm } = maps[c] as PairMap;
      const newX = addMultiple(multiple(xx, sumX), xy, sumY);
      const newY = addMultiple(multiple(yx, sumX), yy, sumY);
      next.x[c] = norm === 1n ? newX : newX / norm;
      next.y[c] = norm === 1n ? newY : newY / norm;
    }
    [now, next] = [next, now];
    pulse(n, size.steps, context);
  }
  return now;
}

/** 1 − 2a for a core of one letter a. */
function singleFactor(core: Core, ring: PairRing): Pair | null {
  if (core.word.length > 1) return null;
  const a = pairRoot(core.first - 1, ring);
  return { x: 1 - 2 * a.x, y: -2 * a.y };
}

function multiple(factor: number, x: bigint): bigint {
  if (factor === 1) return x;
  if (factor === -1) return -x;
  return factor === 0 ? 0n : BigInt(factor) * x;
}
