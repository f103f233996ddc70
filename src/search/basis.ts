/** From what a user names as a basis to checked terms. */
import { weightOf } from '../constants/evaluate.ts';
import { familyOf } from '../constants/registry.ts';
import { isOperation, operand } from '../constants/structure.ts';
import type { Term } from '../constants/term.ts';
import { termText } from '../constants/term-text.ts';
import { parseWithSpans, type Spans } from '../expression/parse.ts';
import { toLatex } from '../expression/print-latex.ts';
import { InputError, spotIn } from '../number/errors.ts';
import { spaceOf } from '../spaces/registry.ts';
import type { BasisSpec, PastedConstant, SpaceSpec } from './request.ts';

export interface BasisElement {
  /** Canonical typed text, or the name of a pasted constant. */
  readonly text: string;
  readonly latex: string;
  readonly weight: number | null;
  /** Title of the family of a single constant, `Product` or `Algebraic` otherwise. */
  readonly family: string;
  readonly source: { readonly term: Term } | { readonly pasted: PastedConstant };
}

const MOST_CONSTANTS = 400;

/**
 * The elements of a basis in order. Throws InputError for an empty basis, an unknown name (with its column), a space
 * that does not exist or is asked past its weights, and a constant that is named twice.
 */
export function resolveBasis(spec: BasisSpec): readonly BasisElement[] {
  const entries = isSpace(spec) ? spaceTexts(spec) : spec;
  if (entries.length === 0)
    throw new InputError('empty-basis', 'The basis is empty: name at least one constant or choose a space.');
  if (entries.length > MOST_CONSTANTS) {
    throw new InputError(
      'basis-too-large',
      `A basis may have at most ${MOST_CONSTANTS} constants; this one has ${entries.length}.`,
    );
  }
  const elements = entries.map((entry) => (typeof entry === 'string' ? typed(entry) : pasted(entry)));
  const seen = new Set<string>();
  for (const { text } of elements) {
    if (seen.has(text)) throw new InputError('named-twice', `${text} stands twice in the basis; name it once.`);
    seen.add(text);
  }
  return elements;
}

function isSpace(spec: BasisSpec): spec is SpaceSpec {
  return !Array.isArray(spec);
}

function spaceTexts(spec: SpaceSpec): readonly string[] {
  const space = spaceOf(spec.space);
  const { weight, lower, parity, times } = spec;
  if (!Number.isInteger(weight) || weight < 0 || weight > space.maxWeight) {
    throw new InputError(
      'bad-weight',
      `${space.title} are known here for weights 0 to ${space.maxWeight}, not ${weight}.`,
    );
  }
  return space.basis(weight, {
    ...(lower === undefined ? {} : { lower }),
    ...(parity === undefined ? {} : { parity }),
    ...(times === undefined ? {} : { times }),
  });
}

function typed(text: string): BasisElement {
  const term = readTyped(text);
  return {
    text: termText(term),
    latex: toLatex(term),
    weight: weightOf(term),
    family: familyTitle(term),
    source: { term },
  };
}

/** Parses a typed expression and checks every name in it. Throws InputError pointing at the name. */
export function readTyped(text: string): Term {
  const { term, spans } = parseWithSpans(text);
  checkNames(term, text, spans);
  return term;
}

function checkNames(term: Term, text: string, spans: Spans): void {
  switch (term.kind) {
    case 'rational':
      return;
    case 'sum':
      for (const t of term.terms) checkNames(t, text, spans);
      return;
    case 'product':
      for (const t of term.factors) checkNames(t, text, spans);
      return;
    case 'power':
      checkNames(term.base, text, spans);
      checkNames(term.exponent, text, spans);
      return;
    default: {
      const span = spans.get(term);
      try {
        if (!isOperation(term)) familyOf(term);
        else if (term.kind === 'call') checkNames(operand(term), text, spans);
      } catch (error) {
        if (!(error instanceof InputError) || span === undefined || error.at !== undefined) throw error;
        const spot = spotIn(text, span.offset, span.length);
        throw new InputError(error.code, `${error.message.replace(/\.$/, '')} (column ${spot.column}).`, spot);
      }
    }
  }
}

function familyTitle(term: Term): string {
  if (term.kind === 'symbol' || term.kind === 'call')
    return isOperation(term) ? 'Algebraic' : familyOf(term).family.title;
  if (term.kind === 'rational') return 'Rational';
  if (term.kind === 'power' && term.base.kind === 'rational') return 'Algebraic';
  return term.kind === 'sum' ? 'Sum' : 'Product';
}

function pasted(entry: PastedConstant): BasisElement {
  if (!/^[A-Za-z][A-Za-z0-9_]{0,31}$/.test(entry.name)) {
    throw new InputError(
      'bad-name',
      'A pasted constant needs a name of letters, digits and underscores that starts with a letter.',
    );
  }
  return {
    text: entry.name,
    latex: entry.latex ?? `\\mathrm{${entry.name.replace(/_/g, '\\_')}}`,
    weight: null,
    family: 'Pasted digits',
    source: { pasted: entry },
  };
}
