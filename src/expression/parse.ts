/**
 * The grammar of typed constants, factors and basis entries:
 *
 *   sum     = product (("+" | "-") product)*
 *   product = signed (("*" | "/") signed)*
 *   signed  = "-" signed | "+" signed | power
 *   power   = atom ("^" signed)?                 right-associative; binds tighter than a leading minus
 *   atom    = number | name | name "(" groups ")" | "(" sum ")"
 *   groups  = sum ("," sum)* (";" sum ("," sum)*)*
 *
 * Rationals fold exactly; everything else stays as typed. Names are not looked up here.
 */
import { rational, symbol, type Term } from '../constants/term.ts';
import { InputError, spotIn } from '../number/errors.ts';
import { type Token, type TokenKind, tokenize } from './tokens.ts';

/** Where each symbol and call of a parsed text stands (its name). */
export type Spans = ReadonlyMap<Term, { readonly offset: number; readonly length: number }>;

const DEEPEST = 200;
/** Largest decimal exponent and largest bit size of a folded rational. */
const LARGEST_EXPONENT = 100_000;

/** Parses a typed expression. Throws InputError with the column of what is wrong. */
export function parseTerm(text: string): Term {
  return parseWithSpans(text).term;
}

/** As `parseTerm`, with the place of each name, so that a later check can point at it. */
export function parseWithSpans(text: string): { term: Term; spans: Spans } {
  const parser = new Parser(text);
  const term = parser.whole();
  return { term, spans: parser.spans };
}

class Parser {
  readonly spans = new Map<Term, { offset: number; length: number }>();
  private readonly text: string;
  private readonly tokens: readonly Token[];
  private index = 0;
  private depth = 0;

  constructor(text: string) {
    this.text = text;
    this.tokens = tokenize(text);
  }

  whole(): Term {
    if (this.tokens.length === 1) throw new InputError('empty', 'Nothing is typed here yet.', spotIn(this.text, 0, 0));
    const term = this.sum();
    const next: TokenKind = this.peek.kind;
    if (next === ')') this.fail('unmatched-bracket', 'closes a bracket that was never opened');
    if (next !== 'end') this.fail('unexpected', 'is not expected here; an operator such as * may be missing');
    return term;
  }

  private get peek(): Token {
    return this.tokens[this.index] as Token;
  }

  private accept(kind: TokenKind): Token | undefined {
    const token = this.peek;
    if (token.kind !== kind) return undefined;
    this.index += 1;
    return token;
  }

  private fail(code: string, complaint: string, token = this.peek): never {
    const spot = spotIn(this.text, token.offset, Math.max(1, token.text.length));
    const what = token.kind === 'end' ? 'The end of the expression' : `“${token.text}” at column ${spot.column}`;
    throw new InputError(code, `${what} ${complaint}.`, spot);
  }

  private sum(): Term {
    this.depth += 1;
    if (this.depth > DEEPEST) this.fail('too-deep', `stands inside more than ${DEEPEST} brackets`);
    const terms = [this.product()];
    for (;;) {
      if (this.accept('+')) terms.push(this.product());
      else if (this.accept('-')) terms.push(negative(this.product()));
      else break;
    }
    this.depth -= 1;
    return makeSum(terms);
  }

  private product(): Term {
    const factors = [this.signed()];
    for (;;) {
      if (this.accept('*')) factors.push(this.signed());
      else {
        const slash = this.accept('/');
        if (slash === undefined) break;
        const start = this.peek;
        const divisor = this.signed();
        if (isZero(divisor)) this.fail('division-by-zero', 'divides by zero', start);
        factors.push(makePower(divisor, rational(-1n)));
      }
    }
    return makeProduct(factors);
  }

  private signed(): Term {
    let minus = false;
    for (;;) {
      if (this.accept('-')) minus = !minus;
      else if (!this.accept('+')) break;
    }
    const term = this.power();
    return minus ? negative(term) : term;
  }

  private power(): Term {
    const start = this.peek;
    const base = this.atom();
    if (!this.accept('^')) return base;
    this.depth += 1;
    if (this.depth > DEEPEST) this.fail('too-deep', `is a power tower higher than ${DEEPEST}`);
    const exponent = this.signed();
    this.depth -= 1;
    if (isZero(base) && exponent.kind === 'rational' && exponent.p <= 0n) {
      this.fail('division-by-zero', 'is zero raised to a power that is not positive', start);
    }
    if (base.kind === 'rational' && exponent.kind === 'rational' && exponent.q === 1n) {
      const size = Math.max(base.p.toString(16).length, base.q.toString(16).length) * 4;
      const times = exponent.p < 0n ? -exponent.p : exponent.p;
      if (
        times > 1_000_000n ||
        (size > 4 || base.q !== 1n || base.p > 1n || base.p < -1n ? size * Number(times) > 400_000 : false)
      ) {
        this.fail('too-large', 'is a power with too many digits to be written out', start);
      }
    }
    return makePower(base, exponent);
  }

  private atom(): Term {
    const token = this.peek;
    if (this.accept('number')) return this.number(token);
    if (this.accept('name')) return this.named(token);
    if (this.accept('(')) {
      const inner = this.sum();
      this.close(token);
      return inner;
    }
    return this.fail('unexpected', 'stands where a number, a name or an opening bracket is expected');
  }

  private named(token: Token): Term {
    const opening = this.accept('(');
    let term: Term = symbol(token.text);
    if (opening !== undefined) {
      const groups: Term[][] = [[this.sum()]];
      for (;;) {
        if (this.accept(',')) groups.at(-1)?.push(this.sum());
        else if (this.accept(';')) groups.push([this.sum()]);
        else break;
      }
      this.close(opening);
      term = { kind: 'call', name: token.text, groups };
    }
    this.spans.set(term, { offset: token.offset, length: token.text.length });
    return term;
  }

  private close(opening: Token): void {
    if (this.accept(')')) return;
    if (this.peek.kind === 'end') this.fail('open-bracket', 'opens a bracket that is never closed', opening);
    this.fail('unexpected', 'stands where a closing bracket or an operator is expected');
  }

  private number(token: Token): Term {
    const [mantissa = '', exponentText = '0'] = token.text.toLowerCase().split('e');
    const [whole = '', fraction = ''] = mantissa.split('.');
    const exponent = Number(exponentText) - fraction.length;
    if (Math.abs(exponent) > LARGEST_EXPONENT)
      this.fail('too-large', 'has an exponent too large to be written out', token);
    const digits = BigInt(`${whole}${fraction}` || '0');
    return exponent >= 0 ? rational(digits * 10n ** BigInt(exponent)) : rational(digits, 10n ** BigInt(-exponent));
  }
}

function isZero(term: Term): boolean {
  return term.kind === 'rational' && term.p === 0n;
}

function negative(term: Term): Term {
  return makeProduct([rational(-1n), term]);
}

/** A flat sum; rationals are added up and stand where the first of them stood. */
export function makeSum(terms: readonly Term[]): Term {
  const flat = terms.flatMap((t) => (t.kind === 'sum' ? t.terms : [t]));
  const kept: Term[] = [];
  let at = -1;
  for (const term of flat) {
    const before = at < 0 ? undefined : kept[at];
    if (term.kind === 'rational' && before?.kind === 'rational') {
      kept[at] = rational(before.p * term.q + term.p * before.q, before.q * term.q);
    } else {
      if (term.kind === 'rational') at = kept.length;
      kept.push(term);
    }
  }
  const nonZero = kept.filter((t) => !isZero(t));
  if (nonZero.length === 0) return rational(0n);
  return nonZero.length === 1 ? (nonZero[0] as Term) : { kind: 'sum', terms: nonZero };
}

/** A flat product: one rational in front (left out when it is 1), then the factors, then those raised to negative integers. */
export function makeProduct(factors: readonly Term[]): Term {
  let p = 1n;
  let q = 1n;
  const kept: Term[] = [];
  for (const factor of factors.flatMap((f) => (f.kind === 'product' ? f.factors : [f]))) {
    if (factor.kind === 'rational') {
      p *= factor.p;
      q *= factor.q;
    } else kept.push(factor);
  }
  const coefficient = rational(p, q);
  if (p === 0n || kept.length === 0) return coefficient;
  const isDivisor = (t: Term): boolean =>
    t.kind === 'power' && t.exponent.kind === 'rational' && t.exponent.q === 1n && t.exponent.p < 0n;
  const ordered = [...kept.filter((t) => !isDivisor(t)), ...kept.filter(isDivisor)];
  if (p !== q) ordered.unshift(coefficient);
  return ordered.length === 1 ? (ordered[0] as Term) : { kind: 'product', factors: ordered };
}

/** A power; integer powers of rationals are carried out, the exponent 1 is dropped. */
export function makePower(base: Term, exponent: Term): Term {
  if (exponent.kind !== 'rational' || exponent.q !== 1n) return { kind: 'power', base, exponent };
  if (exponent.p === 1n) return base;
  if (exponent.p === 0n) return rational(1n);
  if (base.kind === 'rational') {
    const n = exponent.p < 0n ? -exponent.p : exponent.p;
    return exponent.p < 0n ? rational(base.q ** n, base.p ** n) : rational(base.p ** n, base.q ** n);
  }
  if (base.kind === 'power' && base.exponent.kind === 'rational' && base.exponent.q === 1n) {
    return makePower(base.base, rational(base.exponent.p * exponent.p));
  }
  return { kind: 'power', base, exponent };
}
