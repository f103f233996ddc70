/** Typed text to tokens, with the spot of each. */
import { InputError, spotIn } from '../number/errors.ts';

export type TokenKind = 'number' | 'name' | '+' | '-' | '*' | '/' | '^' | '(' | ')' | ',' | ';' | 'end';

export interface Token {
  readonly kind: TokenKind;
  readonly text: string;
  readonly offset: number;
}

/** Longest expression read, in characters; far beyond anything typed, small enough never to freeze a page. */
const LONGEST = 100_000;

/** Characters that people type or paste for the plain ones of the grammar. */
const ALIASES: Readonly<Record<string, string>> = {
  '−': '-',
  '–': '-',
  '·': '*',
  '×': '*',
  '⋅': '*',
  π: 'pi',
  ζ: 'zeta',
  γ: 'euler_gamma',
  β: 'beta',
  Γ: 'Gamma',
  ε: 'ep',
};

const NUMBER = /^(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/;
const NAME = /^[A-Za-z][A-Za-z0-9_]*/;

/** Splits a typed expression into tokens. Throws InputError at a character that the grammar has no use for. */
export function tokenize(text: string): readonly Token[] {
  if (text.length > LONGEST) {
    throw new InputError(
      'too-long',
      `An expression may have at most ${LONGEST} characters; this one has ${text.length}.`,
    );
  }
  const tokens: Token[] = [];
  let offset = 0;
  while (offset < text.length) {
    const char = text[offset] as string;
    if (/\s/.test(char)) {
      offset += 1;
      continue;
    }
    const token = readToken(text, offset);
    tokens.push(token.token);
    offset += token.length;
  }
  tokens.push({ kind: 'end', text: '', offset: text.length });
  return tokens;
}

function readToken(text: string, offset: number): { token: Token; length: number } {
  const char = text[offset] as string;
  const alias = ALIASES[char];
  if (alias !== undefined) {
    const kind: TokenKind = alias === '-' || alias === '*' ? alias : 'name';
    return { token: { kind, text: alias, offset }, length: 1 };
  }
  if ('+-*/^(),;'.includes(char)) return { token: { kind: char as TokenKind, text: char, offset }, length: 1 };
  const rest = text.slice(offset, offset + 60_000);
  const number = NUMBER.exec(rest)?.[0];
  if (number !== undefined) return { token: { kind: 'number', text: number, offset }, length: number.length };
  const name = NAME.exec(rest)?.[0];
  if (name !== undefined) return { token: { kind: 'name', text: name, offset }, length: name.length };
  const spot = spotIn(text, offset);
  throw new InputError('bad-character', `“${char}” at column ${spot.column} does not belong in an expression.`, spot);
}
