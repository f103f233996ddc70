/** Where in a typed text an input error sits; `offset` and `length` count UTF-16 units, `line` and `column` start at 1. */
export interface TextSpot {
  readonly offset: number;
  readonly length: number;
  readonly line: number;
  readonly column: number;
}

/**
 * The user gave something that cannot be used. The message is one plain sentence fit to be shown as it stands:
 * what is wrong, and where. `code` is stable (kebab-case) and survives the trip between worker and page.
 */
export class InputError extends Error {
  override readonly name = 'InputError';
  readonly code: string;
  readonly at: TextSpot | undefined;

  constructor(code: string, message: string, at?: TextSpot) {
    super(message);
    this.code = code;
    this.at = at;
  }
}

/** The numbers carry too few right bits for what was asked (for example a division by a ball that contains zero). */
export class PrecisionError extends Error {
  override readonly name = 'PrecisionError';
  readonly code = 'precision';
}

/** The spot of `length` units at `offset` in `text`, with its line and column worked out. */
export function spotIn(text: string, offset: number, length = 1): TextSpot {
  const before = text.slice(0, offset);
  const line = before.split('\n').length;
  return { offset, length, line, column: offset - (before.lastIndexOf('\n') + 1) + 1 };
}
